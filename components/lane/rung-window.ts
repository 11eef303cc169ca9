/** Which rungs are painted, and how each looks. Pure. */

export type RungState = 'done' | 'present' | 'coming' | 'forecast-last'

export interface Rung {
  round: number
  reps: number
  state: RungState
}

export interface RungWindowInput {
  /** Reps of round n (from 1); null where there is no such rung. */
  repsOf: (round: number) => number | null
  /** Rounds logged as done. */
  done: readonly number[]
  /** The round being worked on; null before the block and where it is worked off. */
  present: number | null
  /** Full rounds that the forecast gives; null: no forecast. The rung after them is its last, dashed. */
  forecastRounds: number | null
  /** How many rungs there is room for. */
  limit: number
}

export interface RungWindow {
  rungs: Rung[]
  /** Rungs before or after the window that are not painted. */
  before: number
  after: boolean
}

/** The forecast is in the round after its full ones when time runs out. */
const forecastLast = (forecastRounds: number | null): number | null =>
  forecastRounds === null ? null : forecastRounds + 1

/**
 * The rungs to paint: all of them where there is room, else those around the present with the next
 * ones in sight.
 */
export function rungWindow({
  repsOf,
  done,
  present,
  forecastRounds,
  limit,
}: RungWindowInput): RungWindow {
  const doneRounds = new Set(done)
  const highest = Math.max(0, present ?? 0, ...done)
  const wantedLast = Math.max(
    highest + (present === null ? 0 : 1),
    forecastLast(forecastRounds) ?? 0,
    Math.min(limit, 4),
  )
  let last = 0
  while (last < wantedLast && repsOf(last + 1) !== null) last += 1
  const room = Math.max(1, limit)
  const focus = present ?? Math.min(highest + 1, last)
  const ahead = Math.min(Math.max(1, Math.floor(room * 0.45)), Math.max(0, last - focus))
  const first = Math.max(1, Math.min(focus + ahead - room + 1, last - room + 1))
  const rungs: Rung[] = []
  for (let round = first; round <= last && rungs.length < room; round += 1) {
    const reps = repsOf(round)
    if (reps === null) break
    rungs.push({
      round,
      reps,
      state: rungState(round, doneRounds, present, forecastLast(forecastRounds)),
    })
  }
  const lastShown = rungs[rungs.length - 1]?.round ?? 0
  return { rungs, before: first - 1, after: repsOf(lastShown + 1) !== null }
}

function rungState(
  round: number,
  done: ReadonlySet<number>,
  present: number | null,
  forecastLastRound: number | null,
): RungState {
  if (done.has(round)) return 'done'
  if (round === present) return 'present'
  return round === forecastLastRound ? 'forecast-last' : 'coming'
}

/** Length of a rung against the longest painted: never so short that it cannot be seen. */
export function rungLength(reps: number, longest: number): number {
  return longest > 0 ? 0.26 + 0.74 * (reps / longest) : 1
}
