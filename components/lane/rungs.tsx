import clsx from 'clsx'
import { rungLength, type Rung, type RungWindow } from './rung-window'

export interface RungsProps extends RungWindow {
  /** The numbers of reps below. */
  showNumbers?: boolean
  /** Rails run on to the right edge, as to the player's upright. */
  runOut?: boolean
  /** Text for those who cannot see it. */
  label?: string
  className?: string
}

const STEP = 92
const HEIGHT = 236
const NUMBERS = 78
const BAR = 26
const LINE = 8
const MIDDLE = HEIGHT / 2

interface Spot {
  rung: Rung
  x: number
  half: number
}

/** Rounds as rungs along the direction of time, each as long as its reps, between two rails. */
export function Rungs({
  rungs,
  before,
  after,
  showNumbers = true,
  runOut = false,
  label,
  className,
}: RungsProps) {
  const longest = rungs.reduce((most, rung) => Math.max(most, rung.reps), 0)
  const spots: Spot[] = rungs.map((rung, index) => ({
    rung,
    x: 60 + index * STEP,
    half: (rungLength(rung.reps, longest) * (HEIGHT - 40)) / 2,
  }))
  const width =
    60 + Math.max(0, rungs.length - 1) * STEP + (runOut || after || rungs.length === 1 ? 76 : 40)
  const height = HEIGHT + (showNumbers ? NUMBERS : 0)
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      preserveAspectRatio="xMidYMid meet"
      role="img"
      aria-label={label ?? rungsText(rungs)}
      focusable="false"
      className={className}
    >
      <Rails
        spots={spots}
        width={width}
        begins={before > 0}
        runsOn={runOut || after || rungs.length === 1}
      />
      {spots.map((spot) => (
        <RungBar key={spot.rung.round} spot={spot} />
      ))}
      {showNumbers
        ? spots.map(({ rung, x }) => (
            <text
              key={rung.round}
              x={x}
              y={HEIGHT + 58}
              textAnchor="middle"
              fontSize={longest > 99 ? 40 : 52}
              className={clsx('condensed', numberFill[rung.state])}
            >
              {rung.reps}
            </text>
          ))
        : null}
    </svg>
  )
}

const numberFill: Record<Rung['state'], string> = {
  done: 'fill-text',
  present: 'fill-text in-data-[ground=hall]:fill-present',
  coming: 'fill-text-quiet',
  'forecast-last': 'fill-text-quiet',
}

function RungBar({ spot: { rung, x, half } }: { spot: Spot }) {
  const top = MIDDLE - half
  const box = { x: x - BAR / 2, y: top, width: BAR, height: half * 2 }
  if (rung.state === 'present') {
    return (
      <g>
        <rect
          x={x - 35}
          y={top - 14}
          width={70}
          height={half * 2 + 28}
          className="fill-present"
          stroke="var(--on-present)"
          strokeWidth={3}
        />
        <rect
          x={x - 24}
          y={top - 3}
          width={48}
          height={half * 2 + 6}
          fill="none"
          stroke="var(--on-present)"
          strokeWidth={5}
        />
      </g>
    )
  }
  if (rung.state === 'done') return <rect {...box} className="fill-text" />
  const inner = {
    x: box.x + LINE / 2,
    y: box.y + LINE / 2,
    width: BAR - LINE,
    height: half * 2 - LINE,
  }
  if (rung.state === 'forecast-last') {
    return (
      <rect
        {...inner}
        className="fill-ground stroke-text"
        strokeWidth={LINE}
        strokeDasharray="11 8"
      />
    )
  }
  return <rect {...inner} className="fill-ground stroke-line-lesser" strokeWidth={LINE} />
}

function Rails({
  spots,
  width,
  begins,
  runsOn,
}: {
  spots: readonly Spot[]
  width: number
  begins: boolean
  runsOn: boolean
}) {
  const first = spots[0]
  const last = spots[spots.length - 1]
  if (!first || !last) return null
  const next = spots[1]
  const rise = next ? (next.half - first.half) / (next.x - first.x) : 0
  const startX = begins ? 0 : 4
  const start = Math.max(10, first.half - rise * (first.x - startX))
  const reached = spots.filter(
    (spot) => spot.rung.state === 'done' || spot.rung.state === 'present',
  )
  const lastReached = reached[reached.length - 1]
  const points: { x: number; half: number }[] = [{ x: startX, half: start }, ...spots]
  const stretch = (
    from: { x: number; half: number },
    to: { x: number; half: number },
    way: 1 | -1,
  ) => (
    <line
      key={`${from.x}-${way}`}
      x1={from.x}
      y1={MIDDLE + way * (from.half - LINE / 2)}
      x2={to.x}
      y2={MIDDLE + way * (to.half - LINE / 2)}
      strokeWidth={LINE}
      className={lastReached && to.x <= lastReached.x ? 'stroke-text' : 'stroke-line-lesser'}
    />
  )
  return (
    <g>
      {points.slice(1).flatMap((to, index) => {
        const from = points[index]
        return from ? [stretch(from, to, -1), stretch(from, to, 1)] : []
      })}
      {runsOn
        ? [
            stretch(last, { x: width, half: last.half }, -1),
            stretch(last, { x: width, half: last.half }, 1),
          ]
        : null}
    </g>
  )
}

/** The rungs in words. */
export function rungsText(rungs: readonly Rung[]): string {
  const done = rungs.filter((rung) => rung.state === 'done').length
  const present = rungs.find((rung) => rung.state === 'present')
  const last = rungs.find((rung) => rung.state === 'forecast-last')
  const words = [`${done} ${done === 1 ? 'round' : 'rounds'} done`]
  if (present) words.push(`now round ${present.round}, ${present.reps} reps`)
  if (last) words.push(`the forecast ends in round ${last.round}`)
  return `${words.join('; ')}.`
}
