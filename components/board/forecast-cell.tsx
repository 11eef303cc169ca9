import { RungCell, type CellRung } from '@/components/lane/rung-cell'
import type { BoardDto } from '@/server/contract/board'
import { blockPlan, roundReps } from '@/server/engine/pace/block-plan'
import type { Block } from '@/server/engine/spec/schema'
import { hasResult, scoreText } from '@/server/engine/tally/score'
import { forecastBasisText, forecastText } from '@/server/contract/block-text'
import type { BlockShape } from './block-shapes'

interface ForecastCellProps {
  dto: BoardDto
  block: Block
  shape: BlockShape | undefined
}

/** What the class said would be done: open rungs, the last dashed, and the score. */
export function ForecastCell({ dto, block, shape }: ForecastCellProps) {
  const forecast = dto.forecast.find((one) => one.block === block.id)
  const plan = blockPlan(dto.version, block)
  if (!forecast || !plan || !shape) return null
  const rounds = Math.min(forecast.rounds + (forecast.reps > 0 ? 1 : 0), 60)
  const endMs = forecast.finishMs ?? shape.lengthMs
  const rungs: CellRung[] = Array.from({ length: rounds }, (_, index) => ({
    atMs: ((index + 1) * endMs) / (rounds + 0.5),
    reps: roundReps(plan, index + 1) / Math.max(1, plan.stations.length),
    state: index === rounds - 1 ? 'forecast-last' : 'coming',
  }))
  const score = forecastText(forecast)
  const done = middleScore(dto, block.id)
  return (
    <div className="flex items-center gap-1.5">
      <RungCell
        className="h-9 min-w-10 flex-1"
        lengthMs={shape.lengthMs}
        rungs={rungs}
        wedge={shape.wedge}
        longestReps={shape.longestReps}
        label={`Forecast ${score}`}
      />
      <span
        className="font-display text-[15px] leading-tight tabular-nums"
        title={`Forecast ${forecastBasisText(forecast)}`}
      >
        {score}
        {done ? <span className="block whitespace-nowrap text-text-quiet">done {done}</span> : null}
      </span>
    </div>
  )
}

/** The score in the middle of those who are through with the block. */
function middleScore(dto: BoardDto, blockId: string): string | null {
  const done = dto.rows
    .flatMap(({ tally }) => tally?.blocks.find((one) => one.block === blockId) ?? [])
    .filter((one) => one.over && one.skipped === null && hasResult(one))
    .sort((a, b) => a.totalReps - b.totalReps || (b.finishMs ?? 0) - (a.finishMs ?? 0))
  const middle = done[Math.floor((done.length - 1) / 2)]
  return middle ? scoreText(middle) : null
}
