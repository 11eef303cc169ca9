import type { CSSProperties } from 'react'
import { motionOf } from '@/server/engine/figure/motion'
import { figureExtent, FigureParts, outlineAt } from '@/components/figure/drawing'
import type { Bay } from './bays'
import { placeFigures } from './place-figures'

export interface BlockFigures {
  block: string
  /** Figure slugs of its stations, in order. */
  figures: readonly string[]
}

interface Strip {
  /** Lane's width over the height of a person. */
  statures: number
  className: string
}
/** A wide page holds a small crowd; a phone has room for a few, drawn larger. */
const STRIPS: readonly Strip[] = [
  { statures: 6.9, className: 'max-sm:hidden' },
  { statures: 3.4, className: 'sm:hidden' },
]
const GAP_UNITS = 34
const HEADROOM = 1.12

interface LaneFiguresProps {
  bays: readonly Bay[]
  lengthMs: number
  figures: readonly BlockFigures[]
}

/** A class as people on its lane: each stands over the block it belongs to. */
export function LaneFigures({ bays, lengthMs, figures }: LaneFiguresProps) {
  return STRIPS.map((strip) => {
    const room = strip.statures * 1000
    const wanted = figures.flatMap(({ block, figures: slugs }) => {
      const bay = bays.find((each) => each.block === block)
      if (!bay || lengthMs === 0) return []
      return slugs.map((figure, index) => {
        const extent = figureExtent(figure)
        const at = bay.startMs + ((bay.endMs - bay.startMs) * (index + 0.5)) / slugs.length
        return {
          figure,
          centre: (at / lengthMs) * room,
          width: extent.right - extent.left,
          rank: (bay.paint === 'low' ? 0 : 10) - index,
        }
      })
    })
    const placed = placeFigures(wanted, room, GAP_UNITS)
    const overhead = Math.max(
      HEADROOM * 1000,
      ...placed.map((each) => -figureExtent(each.figure).top),
    )
    return (
      <div key={strip.statures} aria-hidden className={strip.className} style={insets}>
        <svg
          viewBox={`0 ${-overhead} ${room} ${overhead}`}
          className="block h-auto w-full overflow-visible"
          focusable="false"
        >
          {placed.map((each, index) => (
            <g
              key={`${each.figure}-${index}`}
              transform={`translate(${(each.left - figureExtent(each.figure).left).toFixed(1)} 0)`}
            >
              <FigureParts
                figure={each.figure}
                outline={outlineAt(each.figure, motionOf(each.figure).stillMs, undefined)}
              />
            </g>
          ))}
        </svg>
      </div>
    )
  })
}

const insets: CSSProperties = {
  paddingLeft: 'var(--lane-inset)',
  paddingRight: 'var(--lane-inset)',
}
