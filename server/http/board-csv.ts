import 'server-only'
/** A board as CSV: a row a member, as the page shows them. */
import Papa from 'papaparse'
import type { BoardDto, BoardRow } from '@/server/contract/board'
import {
  arrangeRows,
  BOARD_STATE_TEXT,
  boardState,
  restBeyondPlanMs,
  type BoardView,
} from '@/server/contract/board-view'
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { STOP_SIGN_TEXT } from '@/server/engine/fit/stop-signs'
import { AS_PLANNED } from '@/server/engine/spec/names'
import { hasResult, scoreText } from '@/server/engine/tally/score'

/** Rows and order as the view has them. `nowMs`: milliseconds since 1970. Cells that a spreadsheet would run are quoted with an apostrophe. */
export function boardCsv(board: BoardDto, view: BoardView, nowMs: number): string {
  const blocks = board.version.spec.blocks.filter((block) => block.format.type !== 'rest')
  const head = [
    'Member',
    'Standing',
    'Started',
    'Finished',
    'RPE',
    'Rest beyond plan (s)',
    'Stopped',
    'Hurts',
    'Note',
    'Late',
    'More attempts',
    ...blocks.flatMap((block) => [block.title, `${block.title}: option`, `${block.title}: remark`]),
  ]
  const rows = arrangeRows(board, view, nowMs).map((row) => [
    row.memberName,
    BOARD_STATE_TEXT[boardState(row, nowMs)],
    row.startedAt ?? '',
    row.finishedAt ?? '',
    row.tally?.rating?.rpe ?? '',
    row.tally ? Math.round(restBeyondPlanMs(row.tally.blocks) / 1_000) : '',
    stopText(row),
    hurtsText(row),
    row.tally?.rating?.note ?? '',
    row.late ? 'late' : '',
    row.otherAttempts || '',
    ...blocks.flatMap((block) => blockCells(board, row, block.id)),
  ])
  return Papa.unparse([head, ...rows], { newline: '\r\n', escapeFormulae: true })
}

function stopText(row: BoardRow): string {
  const stop = row.tally?.stop
  if (!stop) return ''
  return [stop.sign ? STOP_SIGN_TEXT[stop.sign] : 'no reason given', stop.where, stop.note]
    .filter(Boolean)
    .join('; ')
}

function hurtsText(row: BoardRow): string {
  const places = [...(row.tally?.hurts ?? []), ...(row.tally?.rating?.hurts ?? [])]
  return [...new Set(places.map((hurt) => HURT_PLACE_TEXT[hurt.where]))].join('; ')
}

function blockCells(board: BoardDto, row: BoardRow, blockId: string): string[] {
  const tally = row.tally?.blocks.find((one) => one.block === blockId)
  const format = board.version.spec.blocks.find((one) => one.id === blockId)?.format
  if (!tally || !format || format.type === 'rest') return ['', '', '']
  const options = tally.options.flatMap(({ station, used }) =>
    used
      .filter((slug) => slug !== AS_PLANNED)
      .map((slug) => {
        const movement = board.version.movements.find(
          (one) => one.slug === format.stations[station]?.movement,
        )
        return `${movement?.name ?? ''}: ${movement?.options.find((one) => one.option === slug)?.name ?? slug}`
      }),
  )
  const remarks = [
    tally.skipped ? `skipped${tally.skipped.reason ? `: ${tally.skipped.reason}` : ''}` : '',
    tally.countedAfterwards ? 'counted after class' : '',
  ].filter(Boolean)
  return [
    tally.skipped && !hasResult(tally) ? '' : scoreText(tally),
    options.join('; '),
    remarks.join('; '),
  ]
}

/** 'slipway-2026-12-01.csv'. */
export function csvFileName(board: BoardDto): string {
  const title = board.scheduledClass.title
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '')
  return `${title || 'class'}-${board.scheduledClass.day}.csv`
}
