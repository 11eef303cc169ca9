/** What a block will come to at the planned tempo: full rounds, reps of the unfinished one, finish. */
import type { PublishedVersion } from '../spec/version'
import { blockPlan, roundReps, type BlockPlan, type PaceDefaults } from './block-plan'
import { FROM_THE_START, walk } from './walk'

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
  walk(plan, tiring, FROM_THE_START, {
    station(_round, station, done) {
      perStation[station] = (perStation[station] ?? 0) + done
      reps += done
    },
    round(round, endSeconds) {
      rounds = round
      reps = 0
      if (isForTime && round === plan.roundLimit) finishSeconds = rounded(endSeconds)
    },
  })
  const totalReps = perStation.reduce((sum, one) => sum + one, 0)
  return { block: plan.block, rounds, reps, totalReps, perStation, finishSeconds }
}

/** Clears what floating point leaves behind; a microsecond is far below what a forecast can mean. */
function rounded(seconds: number): number {
  return Math.round(seconds * 1e6) / 1e6
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
