/** What a block will come to at the planned tempo: full rounds, reps of the unfinished one, finish. */
import type { PublishedVersion } from '../spec/version'
import { blockPlan, roundReps, type BlockPlan, type PaceDefaults } from './block-plan'

/** How much slower a rep gets over a whole block: planned time × (1 + f·t/T). */
export const TIRING = { fresh: 0, expected: 0.25, tiring: 0.6 } as const

export interface ForecastInput extends PaceDefaults {
  tiring: number
  /** Option in force, by `block/station`; as planned where absent. */
  options?: Readonly<Record<string, string>>
}

export interface BlockForecast {
  block: string
  /** Full rounds done at the end of the block. */
  rounds: number
  /** Reps of the unfinished round. */
  reps: number
  totalReps: number
  /** Reps of the whole block, by station. */
  perStation: number[]
  /** `for-time` with all rounds done at or before the cap: seconds into the block; else null. */
  finishSeconds: number | null
}

/** Sums of tenths of seconds in floating point stay far closer than this to the true instant. */
const TOLERANCE_SECONDS = 1e-6

/** Forecast of every `rounds` and `for-time` block, in the order of the spec. `tiring` is f, 0 or more. */
export function forecast(version: PublishedVersion, input: ForecastInput): BlockForecast[] {
  return version.spec.blocks.flatMap((block) => {
    const { format } = block
    const stations = format.type === 'rest' ? [] : format.stations
    const options = stations.map((_, index) => optionFor(input.options, `${block.id}/${index}`))
    const plan = blockPlan(version, block, options, input)
    return plan ? [forecastBlock(plan, input.tiring, format.type === 'for-time')] : []
  })
}

function optionFor(options: ForecastInput['options'], key: string): string | undefined {
  return options && Object.hasOwn(options, key) ? options[key] : undefined
}

function forecastBlock(plan: BlockPlan, tiring: number, isForTime: boolean): BlockForecast {
  const perStation = plan.stations.map(() => 0)
  let rounds = 0
  let reps = 0
  let finishSeconds: number | null = null
  walk(plan, tiring, 0, 1, (station, round, done, endSeconds, isLastOfRound) => {
    perStation[station] = (perStation[station] ?? 0) + done
    reps += done
    if (!isLastOfRound) return
    rounds = round
    reps = 0
    if (isForTime && round === plan.roundLimit) finishSeconds = rounded(endSeconds)
  })
  const totalReps = perStation.reduce((sum, one) => sum + one, 0)
  return { block: plan.block, rounds, reps, totalReps, perStation, finishSeconds }
}

/** Clears what floating point leaves behind; a microsecond is far below what a forecast can mean. */
function rounded(seconds: number): number {
  return Math.round(seconds * 1e6) / 1e6
}

/**
 * Goes through the block from `startSeconds` at the start of round `firstRound` and gives each
 * station's reps that end in time. `visit` gets, per station visited: how many were done, when the
 * last ended, and whether the round is done with them.
 */
function walk(
  plan: BlockPlan,
  tiring: number,
  startSeconds: number,
  firstRound: number,
  visit: (
    station: number,
    round: number,
    done: number,
    endSeconds: number,
    isLastOfRound: boolean,
  ) => void,
): void {
  const latest = plan.seconds + TOLERANCE_SECONDS
  const slowing = Math.max(0, tiring) / plan.seconds
  const lastStation = plan.stations.length - 1
  let at = startSeconds
  for (let round = firstRound; round <= plan.roundLimit; round += 1) {
    for (const [index, station] of plan.stations.entries()) {
      const planned = station.repsIn(round)
      let done = 0
      while (done < planned) {
        const end = at + station.secondsPerRep * (1 + slowing * at)
        if (end > latest) break
        at = end
        done += 1
      }
      const isAll = done === planned
      visit(index, round, done, at, isAll && index === lastStation)
      if (!isAll) return
      const isVeryLast = index === lastStation && round === plan.roundLimit
      if (lastStation > 0 && !isVeryLast) at += station.changeSeconds * (1 + slowing * at)
      if (at > latest) return
    }
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

/** The last round that the forecast reaches, the unfinished one included; what the rungs are drawn up to. */
export function lastForecastRound(block: Pick<BlockForecast, 'rounds' | 'reps'>): number {
  return block.rounds + (block.reps > 0 ? 1 : 0)
}

export interface Rung {
  round: number
  reps: number
}

/**
 * The rungs to draw for a block: rounds 1 to `upTo`, or to its last round where that comes first, with
 * the reps of each over all stations.
 */
export function rungs(plan: BlockPlan, upTo: number): Rung[] {
  const count = Math.max(0, Math.min(Math.floor(upTo), plan.roundLimit))
  return Array.from({ length: count }, (_, index) => ({
    round: index + 1,
    reps: roundReps(plan, index + 1),
  }))
}
