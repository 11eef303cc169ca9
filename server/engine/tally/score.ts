/** Scores as the trade writes them. */
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent } from './events'
import { fold } from './fold'
import type { BlockTally } from './types'

interface BlockScore {
  block: string
  rounds: number
  reps: number
  totalReps: number
  /** Seconds into the body at which the block was worked off; null where it was not. */
  finishSeconds: number | null
}

/** Minutes and whole seconds of a duration in milliseconds: `6:12`. Part seconds are dropped, as on a stopwatch. */
export function clockText(ms: number): string {
  const seconds = Math.max(0, Math.floor(ms / 1_000))
  return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`
}

/**
 * `8 + 5` for rounds; for time `6:12`, at the cap `cap, 4 + 7`, and `4 + 7` while it runs or where it
 * was left before the cap; `9 of 10` for timed pieces; empty for a rest.
 */
export function scoreText(tally: BlockTally): string {
  if (tally.pieces) return `${tally.pieces.done} of ${tally.pieces.of}`
  if (tally.format === 'rest') return ''
  const rounds = `${tally.rounds} + ${tally.reps}`
  if (tally.format !== 'for-time') return rounds
  if (tally.finishMs !== null) return clockText(tally.finishMs)
  return tally.over && tally.skipped === null ? `cap, ${rounds}` : rounds
}

/** True where something of a block was done; what was done before it was skipped stays. */
export function hasResult(tally: BlockTally): boolean {
  return tally.totalReps > 0 || (tally.pieces?.done ?? 0) > 0 || (tally.pieces?.partDone ?? 0) > 0
}

/**
 * The score of every `rounds` and `for-time` block in the order of the spec, from the events of one
 * attempt. Every option is reckoned as planned.
 */
export function scoreBlocks(
  version: PublishedVersion,
  events: readonly ClassEvent[],
): BlockScore[] {
  return fold(version, events, { asPlanned: true })
    .blocks.filter((block) => block.format === 'rounds' || block.format === 'for-time')
    .map(({ block, rounds, reps, totalReps, finishMs }) => ({
      block,
      rounds,
      reps,
      totalReps,
      finishSeconds: finishMs === null ? null : finishMs / 1_000,
    }))
}
