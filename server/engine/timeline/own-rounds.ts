/** A member's own rounds in a block: what they are planned at, and which is the next. */
import { blockPlan, type BlockPlan } from '../pace/block-plan'
import type { Run } from './run-types'

/** With the options in force; null for a block without rounds of the member's own. */
export function planOf(run: Run, blockIndex: number): BlockPlan | null {
  const block = run.version.spec.blocks[blockIndex]
  return block ? blockPlan(run.version, block, run.blocks[blockIndex]?.options) : null
}

/** The lowest round (from 1) that is not done; `logged` in order of round. */
export function lowestUndone(logged: readonly { round: number }[]): number {
  let round = 1
  for (const one of logged) {
    if (one.round === round) round += 1
    else if (one.round > round) break
  }
  return round
}
