/** What all rows of a board share of a block: where it lies in class time and how its rungs are drawn. */
import type { BoardDto, BoardRow } from '@/server/contract/board'
import { blockPlan, roundReps } from '@/server/engine/pace/block-plan'
import { compile } from '@/server/engine/timeline/compile'

export interface BlockShape {
  block: string
  /** The body's start and length in planned class time, milliseconds. */
  startMs: number
  lengthMs: number
  /** Rounds can be logged in it. */
  counted: boolean
  /** Reps of the forecast's first and last round, a station's mean. */
  wedge: { fromReps: number; toReps: number } | null
  longestReps: number
  /** The block a member is in, by their class time. */
  presentBlock: (row: BoardRow) => string | null
}

export function blockShapes(dto: BoardDto): Map<string, BlockShape> {
  const { segments } = compile(dto.version)
  const presentBlock = (row: BoardRow): string | null => {
    const classMs = row.tally?.classMs ?? 0
    const open = row.tally?.blocks.find((one) => !one.over)
    const within = segments.find((one) => classMs >= one.startMs && classMs < one.endMs)
    return within?.block ?? open?.block ?? null
  }
  const shapes = new Map<string, BlockShape>()
  for (const block of dto.version.spec.blocks) {
    const body = segments.filter(
      (one) => one.block === block.id && one.kind !== 'brief' && one.kind !== 'count-in',
    )
    const startMs = body[0]?.startMs ?? 0
    const lengthMs = Math.max(1, (body.at(-1)?.endMs ?? startMs) - startMs)
    const plan = blockPlan(dto.version, block)
    const forecast = dto.forecast.find((one) => one.block === block.id)
    const most = dto.rows.reduce(
      (rounds, row) =>
        Math.max(
          rounds,
          row.tally?.blocks.find((one) => one.block === block.id)?.logged.at(-1)?.round ?? 0,
        ),
      1,
    )
    const mean = (round: number) =>
      plan ? roundReps(plan, round) / Math.max(1, plan.stations.length) : 1
    const last = Math.max(1, (forecast?.rounds ?? 0) + (forecast && forecast.reps > 0 ? 1 : 0))
    const rounds = Math.min(200, Math.max(last, most))
    let longestReps = 1
    for (let round = 1; round <= rounds; round += 1)
      longestReps = Math.max(longestReps, mean(round))
    shapes.set(block.id, {
      block: block.id,
      startMs,
      lengthMs,
      counted: plan !== null,
      wedge: plan && forecast ? { fromReps: mean(1), toReps: mean(last) } : null,
      longestReps,
      presentBlock,
    })
  }
  return shapes
}
