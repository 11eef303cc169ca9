/** The one way through a block with rounds: every rep and change with its time, as it tires. */
import { roundReps, type BlockPlan } from './block-plan'

/** How much slower a rep gets over a whole block: planned time × (1 + f·t/T). */
export const TIRING = { fresh: 0, expected: 0.25, tiring: 0.6 } as const

/** Sums of tenths of seconds in floating point stay far closer than this to the true instant. */
const TOLERANCE_SECONDS = 1e-6

/** A place in a block with rounds, at an instant of its body. */
export interface PaceStart {
  round: number
  /** From 0. */
  station: number
  /** Reps of the station that are done. */
  reps: number
  /** On the way to the station, from the one before. */
  isChanging: boolean
  /** Seconds into the body. */
  atSeconds: number
}

export const FROM_THE_START: PaceStart = {
  round: 1,
  station: 0,
  reps: 0,
  isChanging: false,
  atSeconds: 0,
}

/** A rep, or a change on the way to `station`. Seconds into the body. */
export interface PaceStep {
  kind: 'rep' | 'change'
  round: number
  station: number
  /** From 1, both sides counted on where they are done in turn; 0 of a change. */
  rep: number
  startSeconds: number
  endSeconds: number
}

export interface Visitor {
  /** Each rep and change, the one that the end of the block cuts off among them (`isInTime` false). */
  step?: (step: PaceStep, isInTime: boolean) => void
  /** A station was left, or time ran out in it, after `done` of its reps. */
  station?: (round: number, station: number, done: number) => void
  /** The last rep of a round. */
  round?: (round: number, endSeconds: number) => void
}

/** When something that begins at `atSeconds` and takes `seconds` ends; later where a rest lies in it. */
export type EndOf = (atSeconds: number, seconds: number) => number

const straightOn: EndOf = (atSeconds, seconds) => atSeconds + seconds

/**
 * Goes through `plan` from a place in it; a rep counts where it ends at or before the block's end. What
 * starts at t of T seconds takes its planned time × (1 + f·t/T), f being `tiring` (0 or more). A
 * change is paid at every station but after the very last rep of all, and never by a block with one.
 */
export function walk(
  plan: BlockPlan,
  tiring: number,
  from: PaceStart,
  visit: Visitor,
  endOf: EndOf = straightOn,
): void {
  const latest = plan.seconds + TOLERANCE_SECONDS
  const slowing = Math.max(0, tiring) / plan.seconds
  const lastStation = plan.stations.length - 1
  let at = from.atSeconds
  let first = from.station
  let done = from.reps
  /** True where it ended in time; then the next begins at its end. */
  const pass = (
    kind: PaceStep['kind'],
    round: number,
    station: number,
    rep: number,
    planned: number,
  ): boolean => {
    const endSeconds = endOf(at, planned * (1 + slowing * at))
    const isInTime = endSeconds <= latest
    visit.step?.({ kind, round, station, rep, startSeconds: at, endSeconds }, isInTime)
    if (isInTime) at = endSeconds
    return isInTime
  }
  if (from.isChanging && lastStation > 0) {
    const before = plan.stations[(first + lastStation) % plan.stations.length]
    if (before && !pass('change', from.round, first, 0, before.changeSeconds)) return
  }
  for (let round = from.round; round <= plan.roundLimit; round += 1) {
    for (let index = first; index <= lastStation; index += 1) {
      const station = plan.stations[index]
      if (!station) return
      const planned = station.repsIn(round)
      while (done < planned && pass('rep', round, index, done + 1, station.secondsPerRep)) done += 1
      visit.station?.(round, index, done)
      if (done < planned) return
      done = 0
      const isLast = index === lastStation
      if (isLast) visit.round?.(round, at)
      if (lastStation === 0 || (isLast && round === plan.roundLimit)) continue
      const next = isLast ? 0 : index + 1
      if (!pass('change', isLast ? round + 1 : round, next, 0, station.changeSeconds)) return
    }
    first = 0
    // A round without a rep takes no time: options whose own ladder has run out must not spin here.
    if (roundReps(plan, round) === 0) return
  }
}

/**
 * Where the expected pace puts the start of station `station` (from 0) of round `round`, in
 * milliseconds into the body, for a member who began that round at `roundStartMs`. Null where that is
 * past the end of the block.
 */
export function expectedStationStartMs(
  plan: BlockPlan,
  round: number,
  station: number,
  roundStartMs: number,
): number | null {
  if (station === 0) return Math.round(roundStartMs)
  const slowing = TIRING.expected / plan.seconds
  let at = roundStartMs / 1_000
  for (const one of plan.stations.slice(0, station)) {
    const steps = one.repsIn(round)
    for (let rep = 0; rep < steps; rep += 1) at += one.secondsPerRep * (1 + slowing * at)
    at += one.changeSeconds * (1 + slowing * at)
    if (at >= plan.seconds) return null
  }
  return Math.round(at * 1_000)
}

/**
 * The station (from 0) that the expected pace has reached at `bodyMs` (milliseconds into the body), by
 * a member who began round `round` at `roundStartMs`; not before `from`, which they began `lateMs`
 * later than that pace.
 */
export function expectedStation(
  plan: BlockPlan,
  round: number,
  roundStartMs: number,
  bodyMs: number,
  from = 0,
  lateMs = 0,
): number {
  let station = from
  for (let next = from + 1; next < plan.stations.length; next += 1) {
    const startMs = expectedStationStartMs(plan, round, next, roundStartMs)
    if (startMs === null || bodyMs < startMs + lateMs) break
    station = next
  }
  return station
}
