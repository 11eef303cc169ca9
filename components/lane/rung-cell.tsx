import clsx from 'clsx'
import type { CSSProperties } from 'react'
import { percent } from './bays'
import { rungLength } from './rung-window'

export interface CellRung {
  /** Milliseconds into the block at which the round was logged. */
  atMs: number
  reps: number
  state: 'done' | 'coming' | 'forecast-last'
}

export interface RungCellProps {
  lengthMs: number
  rungs: readonly CellRung[]
  /** Reps of the forecast's first and last rung: the tinted wedge behind. Null: no forecast. */
  wedge: { fromReps: number; toReps: number } | null
  /** Longest rung of this block on the whole board, so that rows can be compared. */
  longestReps: number
  /** Where the member is, and the reps of the round they are in. */
  present?: { atMs: number; reps: number } | null
  /** Where the member stopped. */
  stoppedAtMs?: number | null
  label: string
  className?: string
}

const half = (reps: number, longest: number): number => rungLength(reps, longest) * 50

/** A member's block as a cell of the board: logged rounds at their moments before the forecast's wedge. */
export function RungCell({
  lengthMs,
  rungs,
  wedge,
  longestReps,
  present = null,
  stoppedAtMs = null,
  label,
  className,
}: RungCellProps) {
  const longest = Math.max(longestReps, wedge?.toReps ?? 0, wedge?.fromReps ?? 0, 1)
  return (
    <div role="img" aria-label={label} className={clsx('relative', className)}>
      {wedge ? (
        <div className="absolute inset-0 bg-fill opacity-65" style={wedgeStyle(wedge, longest)} />
      ) : null}
      {rungs.map((rung, index) => (
        <div
          key={index}
          className={clsx(
            'absolute w-2 -translate-x-1/2',
            rung.state === 'done' && 'bg-text',
            rung.state === 'coming' && 'border-2 border-line-lesser',
            rung.state === 'forecast-last' && 'border-2 border-dashed border-line-lesser',
          )}
          style={barStyle(rung.atMs, rung.reps, lengthMs, longest)}
        />
      ))}
      {present ? (
        <>
          <div
            className="absolute -inset-y-0.5 w-0.5 -translate-x-1/2 bg-text"
            style={{ left: percent(present.atMs, lengthMs) }}
          />
          <div
            className="absolute w-3 -translate-x-1/2 border-2 border-on-present bg-present"
            style={barStyle(present.atMs, present.reps, lengthMs, longest)}
          />
        </>
      ) : null}
      {stoppedAtMs === null ? null : (
        <div
          className="absolute -inset-y-1 w-2.5 -translate-x-1/2 bg-stop"
          style={{ left: percent(stoppedAtMs, lengthMs) }}
        />
      )}
    </div>
  )
}

function barStyle(atMs: number, reps: number, lengthMs: number, longest: number): CSSProperties {
  const inset = `${(50 - half(reps, longest)).toFixed(1)}%`
  return {
    left: percent(Math.min(Math.max(atMs, 0), lengthMs), lengthMs),
    top: inset,
    bottom: inset,
  }
}

function wedgeStyle(wedge: { fromReps: number; toReps: number }, longest: number): CSSProperties {
  const from = half(wedge.fromReps, longest)
  const to = half(wedge.toReps, longest)
  const y = (value: number) => `${value.toFixed(1)}%`
  return {
    clipPath: `polygon(0 ${y(50 - from)}, 100% ${y(50 - to)}, 100% ${y(50 + to)}, 0 ${y(50 + from)})`,
  }
}
