import clsx from 'clsx'
import type { CSSProperties, Ref } from 'react'
import type { Segment } from '@/server/engine/timeline/types'
import {
  baysOf,
  clockText,
  laneLengthMs,
  nameWidthEm,
  percent,
  shortName,
  type Bay,
  type LaneBlock,
} from './bays'
import { LaneFigures, type BlockFigures } from './lane-figures'

export interface LaneProps {
  /** Compiled segments of the whole class. */
  segments: readonly Segment[]
  blocks: readonly LaneBlock[]
  /** Where the class is, in class time; null: no present line. Set again when a segment changes, the frames between by `placePresent`. */
  presentMs?: number | null
  /** `whole`: the line runs along the lane. `close`: the lane slides under a standing line. */
  view?: 'whole' | 'close'
  /** What the close view shows, in milliseconds of class. */
  windowMs?: number
  /** `small`: on a phone or as a page's strip; `head`: a table's or page's picture; `tv`: across the player. */
  size?: 'small' | 'head' | 'tv'
  /** Length of every bay below it. */
  showTimes?: boolean
  /** Figures that stand on the lane, over their blocks. */
  figures?: readonly BlockFigures[]
  /** CSS length by which time begins and ends inside the rails. */
  inset?: string
  /** Text for those who cannot see it. */
  label?: string
  ref?: Ref<HTMLDivElement>
  className?: string
}

interface Measure {
  heightRem: number
  linePx: number
  textRem: number
  presentPx: number
  overhangPx: number
}
/** `line`: painted lines of one weight, 4 px at desk size and more on a TV. */
const MEASURES: Record<NonNullable<LaneProps['size']>, Measure> = {
  small: { heightRem: 1.5, linePx: 3, textRem: 0.78, presentPx: 7, overhangPx: 5 },
  head: { heightRem: 2.7, linePx: 4, textRem: 1, presentPx: 11, overhangPx: 9 },
  tv: { heightRem: 4.6, linePx: 6, textRem: 1.5, presentPx: 13, overhangPx: 12 },
}

const FINEST_PART = 1 / 260
const CLOSE_AT = 0.3

type Style = CSSProperties & { [property: `--${string}`]: string | number }

/** The class as a painted lane: blocks to scale, work filled, finishers hatched, rests open, the present upright. */
export function Lane({
  segments,
  blocks,
  presentMs = null,
  view = 'whole',
  windowMs = 8 * 60_000,
  size = 'head',
  showTimes = false,
  figures,
  inset = '0px',
  label,
  ref,
  className,
}: LaneProps) {
  const lengthMs = laneLengthMs(segments)
  const shownMs = view === 'close' ? Math.min(windowMs, Math.max(lengthMs, 1)) : lengthMs
  const bays = baysOf(segments, blocks, presentMs, shownMs * FINEST_PART)
  const measure = MEASURES[size]
  const part =
    presentMs === null || lengthMs === 0 ? 0 : Math.min(1, Math.max(0, presentMs / lengthMs))
  const style: Style = {
    '--lane-height': `${measure.heightRem}rem`,
    '--lane-line': `${measure.linePx}px`,
    '--lane-present': `${measure.presentPx}px`,
    '--lane-overhang': `${measure.overhangPx}px`,
    '--lane-inset': inset,
    fontSize: `${measure.textRem}rem`,
  }
  const track = bays.map((bay) => <BayMark key={bay.block} bay={bay} lengthMs={lengthMs} />)
  const line = presentMs === null ? null : <PresentLine />
  return (
    <div
      ref={ref}
      className={clsx('relative', className)}
      style={style}
      role="img"
      aria-label={label ?? laneText(bays, presentMs)}
    >
      {figures && view === 'whole' ? (
        <LaneFigures bays={bays} lengthMs={lengthMs} figures={figures} />
      ) : null}
      <div aria-hidden className="relative h-(--lane-height)">
        <div className="absolute inset-x-0 top-0 h-(--lane-line) bg-line" />
        <div className="absolute inset-x-0 bottom-0 h-(--lane-line) bg-line" />
        {view === 'whole' ? (
          <div className="absolute inset-y-0" style={insets}>
            {track}
            {line ? (
              <div
                data-lane-mover
                className="pointer-events-none absolute inset-0"
                style={runsAlong(part)}
              >
                {line}
              </div>
            ) : null}
          </div>
        ) : (
          <>
            <div className="absolute inset-0 overflow-hidden">
              <div
                data-lane-mover
                className="absolute inset-y-0 will-change-transform"
                style={slidesUnder(part, lengthMs, shownMs)}
              >
                {track}
              </div>
            </div>
            {line ? (
              <div
                className="pointer-events-none absolute inset-y-0"
                style={{ left: percent(CLOSE_AT, 1) }}
              >
                {line}
              </div>
            ) : null}
          </>
        )}
      </div>
      {showTimes && view === 'whole' ? <BayTimes bays={bays} lengthMs={lengthMs} /> : null}
    </div>
  )
}

const insets: CSSProperties = { left: 'var(--lane-inset)', right: 'var(--lane-inset)' }

const runsAlong = (part: number): Style => ({
  '--present-x': part.toFixed(6),
  transform: 'translateX(calc(var(--present-x) * 100%))',
})

const slidesUnder = (part: number, lengthMs: number, shownMs: number): Style => ({
  '--present-x': part.toFixed(6),
  left: percent(CLOSE_AT, 1),
  width: percent(lengthMs, shownMs),
  transform: 'translateX(calc(var(--present-x) * -100%))',
})

/** Yellow with an edge in ink that also parts it from the lane's own lines. */
function PresentLine() {
  return (
    <div
      data-lane-present
      className="absolute bg-present outline-2 outline-on-present"
      style={{
        left: 'calc(var(--lane-present) / -2)',
        width: 'var(--lane-present)',
        top: 'calc(-1 * var(--lane-overhang))',
        bottom: 'calc(-1 * var(--lane-overhang))',
      }}
    />
  )
}

const FILL: Record<Bay['state'], string> = {
  done: 'color-mix(in srgb, var(--fill) 52%, var(--ground))',
  present: 'var(--fill-strong)',
  coming: 'var(--fill)',
}

function pieceStyle(bay: Bay, piece: { startMs: number; endMs: number }): Style {
  const lengthMs = bay.endMs - bay.startMs
  const tone = FILL[bay.state]
  return {
    left: percent(piece.startMs - bay.startMs, lengthMs),
    width: percent(piece.endMs - piece.startMs, lengthMs),
    ...(bay.paint === 'hatched'
      ? {
          backgroundImage: `repeating-linear-gradient(-45deg, ${tone} 0 calc(var(--lane-line) * 1.9), transparent calc(var(--lane-line) * 1.9) calc(var(--lane-line) * 3.8))`,
        }
      : { backgroundColor: tone }),
    ...(bay.paint === 'low' ? { top: '66%' } : {}),
  }
}

/** Shown only where the bay is at least this wide (and less than `below`), else no width at all. */
function fits(atLeastEm: number, belowEm?: number): Style {
  const shown = `calc((100% - ${atLeastEm}em) * 9999)`
  return {
    maxWidth:
      belowEm === undefined
        ? `max(0px, ${shown})`
        : `max(0px, min(${shown}, calc((${belowEm}em - 100%) * 9999)))`,
  }
}

const NUMBER_EM = 1.5
const ROOM_EM = 1.1

function BayMark({ bay, lengthMs }: { bay: Bay; lengthMs: number }) {
  const open = bay.paint === 'open'
  const numberEm = bay.number === null ? 0 : NUMBER_EM + (bay.number > 9 ? 0.6 : 0)
  const full = numberEm + nameWidthEm(bay.title) + ROOM_EM
  const short = shortName(bay.title)
  const shortEm = numberEm + nameWidthEm(short) + ROOM_EM
  const shorten = short !== bay.title && shortEm < full
  return (
    <div
      data-bay={bay.block}
      className="absolute inset-y-0"
      style={{
        left: percent(bay.startMs, lengthMs),
        width: percent(bay.endMs - bay.startMs, lengthMs),
      }}
    >
      <div className="absolute inset-y-0 -left-[calc(var(--lane-line)/2)] w-(--lane-line) bg-line" />
      <div className="absolute inset-y-0 -right-[calc(var(--lane-line)/2)] w-(--lane-line) bg-line" />
      {open ? null : (
        <>
          <div className="absolute inset-x-[calc(var(--lane-line)*1.15)] inset-y-[calc(var(--lane-line)*1.65)]">
            {bay.pieces.map((piece) => (
              <div
                key={piece.startMs}
                className="absolute inset-y-0"
                style={pieceStyle(bay, piece)}
              />
            ))}
          </div>
          {bay.paint === 'hatched' ? null : (
            <div
              className={clsx(
                'absolute inset-x-[calc(var(--lane-line)*1.15)] flex items-center condensed leading-none whitespace-nowrap',
                bay.paint === 'low'
                  ? 'top-[calc(var(--lane-line)*1.4)] h-[58%] text-text-quiet'
                  : 'inset-y-0 text-text',
              )}
            >
              {bay.number === null ? null : (
                <span
                  className="shrink-0 overflow-hidden figures text-[1.06em] leading-none"
                  style={fits(numberEm)}
                >
                  <span className="pl-[0.5em]">{bay.number}</span>
                </span>
              )}
              <span className="shrink-0 overflow-hidden leading-[1.3]" style={fits(full)}>
                <span className="pl-[0.5em]">{bay.title}</span>
              </span>
              {shorten ? (
                <span
                  className="shrink-0 overflow-hidden leading-[1.3]"
                  style={fits(shortEm, full)}
                >
                  <span className="pl-[0.5em]">{short}</span>
                </span>
              ) : null}
            </div>
          )}
        </>
      )}
    </div>
  )
}

function BayTimes({ bays, lengthMs }: { bays: readonly Bay[]; lengthMs: number }) {
  return (
    <div aria-hidden className="relative h-[1.9em] text-text-quiet tabular-nums">
      <div className="absolute inset-y-0" style={insets}>
        {bays.map((bay) => {
          const text = clockText(bay.endMs - bay.startMs)
          return (
            <div
              key={bay.block}
              className="absolute inset-y-0 flex items-end text-[0.92em] leading-none"
              style={{
                left: percent(bay.startMs, lengthMs),
                width: percent(bay.endMs - bay.startMs, lengthMs),
              }}
            >
              <span className="overflow-hidden" style={fits(text.length * 0.56 + 0.2)}>
                {text}
              </span>
            </div>
          )
        })}
      </div>
    </div>
  )
}

/** The lane in words. */
export function laneText(bays: readonly Bay[], presentMs: number | null): string {
  const parts = bays
    .filter((bay) => bay.paint !== 'open')
    .map(
      (bay) =>
        `${bay.number === null ? '' : `${bay.number} `}${bay.title} ${clockText(bay.endMs - bay.startMs)}`,
    )
  const now = bays.find((bay) => bay.state === 'present')
  const place =
    presentMs === null || !now ? '' : ` Now: ${now.paint === 'open' ? 'rest' : now.title}.`
  return `The class: ${parts.join(', ')}.${place}`
}
