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
  height: string
  line: string
  text: string
  present: string
  overhang: string
}
/** Painted lines of one weight: 4 px on pages; on the player 6 px at 1440 and 8 px at 1920. */
const MEASURES: Record<NonNullable<LaneProps['size']>, Measure> = {
  small: { height: '1.5rem', line: '3px', text: '0.78rem', present: '7px', overhang: '5px' },
  head: { height: '2.7rem', line: '4px', text: '1rem', present: '11px', overhang: '9px' },
  tv: {
    height: 'clamp(3rem, 5vw, 6rem)',
    line: 'clamp(4px, 0.417vw, 8px)',
    text: 'clamp(1rem, 1.35vw, 1.7rem)',
    present: 'clamp(9px, 0.83vw, 16px)',
    overhang: 'clamp(8px, 0.8vw, 16px)',
  },
}

/** Set by `placePresent` over what was rendered, so that a render never sets the line back. */
const PRESENT = 'var(--present-now, var(--present-x))'

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
    '--lane-height': measure.height,
    '--lane-line': measure.line,
    '--lane-present': measure.present,
    '--lane-overhang': measure.overhang,
    '--lane-inset': inset,
    '--present-x': part.toFixed(6),
    fontSize: measure.text,
  }
  const sight: Sight = {
    lengthMs: Math.max(lengthMs, 1),
    view,
    shownPart: lengthMs > 0 ? shownMs / lengthMs : 1,
    hasLine: presentMs !== null,
  }
  const track = bays.map((bay) => <BayMark key={bay.block} bay={bay} sight={sight} />)
  const line = presentMs === null ? null : <PresentLine />
  return (
    <div
      ref={ref}
      className={clsx('relative overflow-x-clip', className)}
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
                className="pointer-events-none absolute inset-0 will-change-transform"
                style={runsAlong}
              >
                {line}
              </div>
            ) : null}
          </div>
        ) : (
          <>
            <div className="absolute inset-0 overflow-hidden">
              <div
                className="absolute inset-y-0 will-change-transform"
                style={slidesUnder(lengthMs, shownMs)}
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

const runsAlong: CSSProperties = { transform: `translateX(calc(${PRESENT} * 100%))` }

const slidesUnder = (lengthMs: number, shownMs: number): CSSProperties => ({
  left: percent(CLOSE_AT, 1),
  width: percent(lengthMs, shownMs),
  transform: `translateX(calc(${PRESENT} * -100%))`,
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

/** Shown only where there is room, else no width at all: `room` is what is left over, a CSS length. */
const shownWhere = (room: string): string => `max(0px, calc(${room} * 9999))`

const NUMBER_EM = 1.45
const SECOND_DIGIT_EM = 0.55
const EDGE_EM = 0.8

interface Wording {
  number: number | null
  name: string
  needEm: number
}

/** From the fullest to the barest; the first that fits is shown. */
function wordingsOf({ number, title }: Bay): Wording[] {
  const numberEm = number === null ? 0 : NUMBER_EM + (number > 9 ? SECOND_DIGIT_EM : 0)
  const short = shortName(title)
  const named = (name: string): Wording => ({
    number,
    name,
    needEm: numberEm + nameWidthEm(name) + EDGE_EM,
  })
  const wordings = [named(title)]
  if (nameWidthEm(short) < nameWidthEm(title)) wordings.push(named(short))
  if (number !== null) wordings.push({ number, name: '', needEm: numberEm })
  return wordings
}

/** How the lane is seen: what the words have to keep clear of. */
interface Sight {
  lengthMs: number
  view: NonNullable<LaneProps['view']>
  /** Part of the class that the close view shows. */
  shownPart: number
  hasLine: boolean
}

/** Where a wording stands in its bay, and how much room is left over there. */
interface Place {
  left: string
  room: string
}
const CLEAR_OF_LINE_EM = 0.35

/**
 * In the bay with the present line the words keep clear of it: before it where they fit, else behind
 * it; in the close view behind it first, since what lies before it slides away. In the close view
 * words that the edge of the screen would cut are left out.
 */
function placeOf(bay: Bay, needEm: number, { lengthMs, view, shownPart, hasLine }: Sight): Place {
  const start = bay.startMs / lengthMs
  const width = (bay.endMs - bay.startMs) / lengthMs
  const inBay = (offset: number) =>
    `((${PRESENT} - ${(start - offset).toFixed(6)}) / ${width.toFixed(6)} * 100%)`
  const close = view === 'close'
  const rightEdge = inBay(shownPart * (1 - CLOSE_AT))
  const leftEdge = inBay(-shownPart * CLOSE_AT)
  const uncut = close ? [`${rightEdge} - ${needEm}em`] : []
  if (!hasLine || bay.state !== 'present') {
    const rooms = [`100% - ${needEm}em`, ...uncut, ...(close ? [`-1 * ${leftEdge}`] : [])]
    return { left: '0px', room: `min(${rooms.join(', ')})` }
  }
  const at = inBay(0)
  const behind = `(${at} + var(--lane-present) / 2 + ${CLEAR_OF_LINE_EM}em)`
  const before = `(${at} - var(--lane-present) / 2 - ${needEm}em)`
  const after = `(100% - ${behind} - ${needEm}em)`
  if (!close) {
    return {
      left: `clamp(0px, ${before} * -9999, ${behind})`,
      room: `max(${before}, ${after})`,
    }
  }
  return {
    left: `clamp(0px, ${after} * 9999, ${behind})`,
    room: `max(${after}, min(${before}, -1 * ${leftEdge}))`,
  }
}

function BayNames({ bay, sight }: BayMarkProps) {
  const placed = wordingsOf(bay).map((wording) => ({
    wording,
    place: placeOf(bay, wording.needEm, sight),
  }))
  return placed.map(({ wording, place }, index) => {
    const fuller = placed[index - 1]?.place.room
    return (
      <div
        key={wording.name}
        className={clsx(
          'absolute flex items-center overflow-hidden condensed leading-none whitespace-nowrap',
          bay.paint === 'low' ? 'top-[8%] h-[56%] text-text-quiet' : 'inset-y-0 text-text',
        )}
        style={{
          left: place.left,
          maxWidth: shownWhere(fuller ? `min(${place.room}, -1 * ${fuller})` : place.room),
        }}
      >
        {wording.number === null ? null : (
          <span className="pl-[0.5em] figures text-[1.06em] leading-none">{wording.number}</span>
        )}
        {wording.name ? <span className="pl-[0.5em] leading-[1.3]">{wording.name}</span> : null}
      </div>
    )
  })
}

interface BayMarkProps {
  bay: Bay
  sight: Sight
}

const EDGE = 'bg-line absolute inset-y-0 w-[min(var(--lane-line),16%)]'

function BayMark({ bay, sight }: BayMarkProps) {
  const { lengthMs } = sight
  return (
    <div
      data-bay={bay.block}
      className="absolute inset-y-0"
      style={{
        left: percent(bay.startMs, lengthMs),
        width: percent(bay.endMs - bay.startMs, lengthMs),
      }}
    >
      <div className={clsx(EDGE, 'left-0 -translate-x-1/2')} />
      <div className={clsx(EDGE, 'right-0 translate-x-1/2')} />
      {bay.paint === 'open' ? null : (
        <div className="absolute inset-x-[min(calc(var(--lane-line)*1.15),16%)] inset-y-[calc(var(--lane-line)*1.65)]">
          {bay.pieces.map((piece) => (
            <div
              key={piece.startMs}
              className="absolute inset-y-0"
              style={pieceStyle(bay, piece)}
            />
          ))}
          {bay.paint === 'hatched' ? null : <BayNames bay={bay} sight={sight} />}
        </div>
      )}
    </div>
  )
}

function BayTimes({ bays, lengthMs }: { bays: readonly Bay[]; lengthMs: number }) {
  return (
    <div aria-hidden className="relative h-[1.9em] condensed text-text-quiet tabular-nums">
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
              <span
                className="overflow-hidden"
                style={{ maxWidth: shownWhere(`(100% - ${text.length * 0.5 + 0.25}em)`) }}
              >
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
