/** The figure as SVG, without motion: shared by the still and the moving one. */
import type { CSSProperties, Ref } from 'react'
import { armOf } from '@/server/engine/figure/pose'
import { figureOf, motionOf } from '@/server/engine/figure/motion'
import type { FigureData, FigureTiming } from '@/server/engine/figure/types'
import {
  extentOf,
  GAP,
  outlineOf,
  UNITS_PER_STATURE,
  type Extent,
  type Outline,
  type PartName,
} from './outline'

export interface FigureLook {
  /** Slug of a figure (server/engine/figure/slugs.ts); an unknown one stands. */
  figure: string
  timing?: FigureTiming | undefined
  /** The side that works: on the left the figure is mirrored and faces left. */
  side?: 'left' | 'right' | undefined
  /** Text for those who cannot see it; without it the figure's own description, '' hides it from them. */
  label?: string | undefined
  /**
   * `own`: the drawing's box closely holds this movement. `stature`: the box is as high for every
   * figure, so that several drawn at one height are people of one size.
   */
  frame?: 'own' | 'stature' | undefined
  className?: string | undefined
}

interface Paint {
  part: PartName
  fill: string
  gap: boolean
}

const FAR_KIT = 'color-mix(in srgb, var(--kit) 58%, var(--ground))'
const WOOD = 'color-mix(in srgb, var(--kit) 72%, var(--ground))'

const SIDE_ORDER: readonly Paint[] = [
  { part: 'behind', fill: WOOD, gap: false },
  { part: 'farKit', fill: FAR_KIT, gap: true },
  { part: 'farArm', fill: 'var(--figure-far)', gap: true },
  { part: 'farLeg', fill: 'var(--figure-far)', gap: true },
  { part: 'body', fill: 'var(--figure)', gap: true },
  { part: 'nearLegCut', fill: 'none', gap: true },
  { part: 'nearLeg', fill: 'var(--figure)', gap: false },
  { part: 'nearArm', fill: 'var(--figure)', gap: true },
  { part: 'nearKit', fill: 'var(--kit)', gap: true },
  { part: 'hands', fill: 'var(--figure)', gap: false },
  { part: 'before', fill: WOOD, gap: true },
]
const FRONT_ORDER: readonly Paint[] = [
  { part: 'behind', fill: WOOD, gap: false },
  { part: 'farLeg', fill: 'var(--figure)', gap: true },
  { part: 'nearLeg', fill: 'var(--figure)', gap: true },
  { part: 'nearLegCut', fill: 'none', gap: false },
  { part: 'body', fill: 'var(--figure)', gap: false },
  { part: 'farArm', fill: 'var(--figure)', gap: true },
  { part: 'nearArm', fill: 'var(--figure)', gap: true },
  { part: 'farKit', fill: 'var(--kit)', gap: true },
  { part: 'nearKit', fill: 'var(--kit)', gap: true },
  { part: 'hands', fill: 'var(--figure)', gap: false },
  { part: 'before', fill: WOOD, gap: true },
]

export const paintOrder = (data: FigureData): readonly Paint[] =>
  data.view === 'front' ? FRONT_ORDER : SIDE_ORDER

export function openHands(data: FigureData): { near: boolean; far: boolean } {
  return {
    near: armOf(data.keys[0], 'near').open !== undefined,
    far: armOf(data.keys[0], 'far').open !== undefined,
  }
}

const SAMPLES = 24
const extents = new Map<string, Extent>()

/** The room that a figure needs, sampled over its own movement once. */
export function figureExtent(slug: string): Extent {
  const motion = motionOf(slug)
  const kept = extents.get(motion.slug)
  if (kept) return kept
  const poses = Array.from({ length: SAMPLES }, (_, index) =>
    motion.at((motion.cycleMs * index) / SAMPLES),
  )
  const extent = extentOf(poses, figureOf(slug))
  extents.set(motion.slug, extent)
  return extent
}

/** The common height: a person who reaches overhead with a dumbbell. */
export const STATURE_FRAME = 1.34 * UNITS_PER_STATURE

export function outlineAt(slug: string, ms: number, timing: FigureTiming | undefined): Outline {
  const data = figureOf(slug)
  return outlineOf(motionOf(slug, timing).at(ms), data, openHands(data))
}

const partStyle: CSSProperties = { paintOrder: 'stroke' }

/** The paths of a figure, for use inside an SVG that has its own place and scale. */
export function FigureParts({ figure, outline }: { figure: string; outline: Outline }) {
  return paintOrder(figureOf(figure)).map(({ part, fill, gap }) => (
    <path
      key={part}
      data-part={part}
      d={outline[part]}
      fill={fill}
      stroke={gap ? 'var(--ground)' : 'none'}
      strokeWidth={gap ? GAP * 2 : 0}
      strokeLinejoin="round"
      style={partStyle}
    />
  ))
}

interface FigureDrawingProps extends FigureLook {
  outline: Outline
  svgRef?: Ref<SVGSVGElement> | undefined
}

export function FigureDrawing({
  figure,
  outline,
  side = 'right',
  label,
  frame = 'own',
  className,
  svgRef,
}: FigureDrawingProps) {
  const extent = figureExtent(figure)
  const height = frame === 'stature' ? STATURE_FRAME : -extent.top
  const width = extent.right - extent.left
  const text = label ?? figureOf(figure).description
  const hidden = text === ''
  const left = side === 'left' ? -extent.right : extent.left
  return (
    <svg
      ref={svgRef}
      viewBox={`${left.toFixed(1)} ${(-height).toFixed(1)} ${width.toFixed(1)} ${height.toFixed(1)}`}
      preserveAspectRatio="xMidYMax meet"
      className={className}
      role={hidden ? undefined : 'img'}
      aria-label={hidden ? undefined : text}
      aria-hidden={hidden ? true : undefined}
      focusable="false"
    >
      <g transform={side === 'left' ? 'scale(-1 1)' : undefined}>
        <FigureParts figure={figure} outline={outline} />
      </g>
    </svg>
  )
}
