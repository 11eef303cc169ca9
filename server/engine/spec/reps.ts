/** Reps by round: whole numbers, ladders and lists. */
import type { Reps } from './schema'

/**
 * The rungs before a ladder or list holds, repeats or ends: how many there are, or null where a ladder
 * has no end or the reps are one number.
 */
export function rungCount(reps: Reps): number | null {
  if (typeof reps === 'number') return null
  if ('list' in reps) return reps.list.length
  if (reps.to === undefined) return null
  if (reps.step === 0) return 1
  return Math.max(1, Math.floor((reps.to - reps.from) / reps.step) + 1)
}

function rung(reps: Exclude<Reps, number>, index: number): number {
  return 'list' in reps ? (reps.list[index] ?? 0) : reps.from + reps.step * index
}

/**
 * Reps of round `round` (whole, from 1). Null where there is no rung: after the last one of a `done`
 * ladder or list, and for a round below 1.
 */
export function repsInRound(reps: Reps, round: number): number | null {
  if (!(round >= 1)) return null
  if (typeof reps === 'number') return reps
  const index = round - 1
  const rungs = rungCount(reps)
  if (rungs === null || index < rungs) return rung(reps, index)
  const then = reps.then ?? ('list' in reps ? 'repeat' : 'hold')
  if (then === 'done') return null
  return rung(reps, then === 'hold' ? rungs - 1 : index % rungs)
}
