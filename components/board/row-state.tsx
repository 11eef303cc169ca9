import type { BoardDto, BoardRow } from '@/server/contract/board'
import { boardState, BOARD_STATE_TEXT } from '@/server/contract/board-view'
import type { BlockShape } from './block-shapes'
import { agoText, timeOfDay } from '@/server/contract/format'

interface RowStateProps {
  row: BoardRow
  dto: BoardDto
  shapes: Map<string, BlockShape>
  nowMs: number
}

/** One line under a name: where the member is now, or when they came, finished or stopped. */
export function RowState({ row, dto, shapes, nowMs }: RowStateProps) {
  const state = boardState(row, nowMs)
  return (
    <span
      className={
        state === 'stopped'
          ? 'block text-[13px] font-semibold text-stop'
          : 'block text-sm text-text-quiet'
      }
    >
      {stateLine(row, dto, shapes, nowMs)}
    </span>
  )
}

/** As `RowState` shows it, in words. */
export function stateLine(
  row: BoardRow,
  dto: BoardDto,
  shapes: Map<string, BlockShape>,
  nowMs: number,
): string {
  const state = boardState(row, nowMs)
  const zone = dto.timeZone
  const at = (instant: string | null) => (instant ? ` ${timeOfDay(instant, zone)}` : '')
  switch (state) {
    case 'not-started':
      return BOARD_STATE_TEXT[state]
    case 'stopped':
      return `Stopped${at(row.lastEventAt)}`
    case 'finished':
      return `Finished${at(row.finishedAt)}`
    case 'quiet':
      return `Nothing heard for ${agoText(nowMs - Date.parse(row.lastEventAt ?? row.startedAt ?? dto.readAt))}`
    case 'in-class': {
      if (row.tally?.state === 'paused') return 'Paused'
      const blockId = [...shapes.values()][0]?.presentBlock(row)
      const block = dto.version.spec.blocks.find((one) => one.id === blockId)
      return block ? `In ${block.title}` : 'In class'
    }
  }
}
