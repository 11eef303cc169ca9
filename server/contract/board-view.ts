/** How a coach looks at a board: sorting and filtering, kept in the address. Pure; the page and the CSV share it. */
import { z } from 'zod'
import type { BlockTally } from '../engine/tally/types'
import type { BoardDto, BoardRow } from './board'

/** What a coach asks first: who needs a look, who is at it, who is done, who has not come. */
export const BOARD_STATES = ['stopped', 'in-class', 'quiet', 'finished', 'not-started'] as const
export type BoardState = (typeof BOARD_STATES)[number]

export const BOARD_STATE_TEXT: Record<BoardState, string> = {
  stopped: 'Stopped',
  'in-class': 'In class',
  quiet: 'No word',
  finished: 'Finished',
  'not-started': 'Not started',
}

/** Nothing heard for this long, from somebody who has not finished: perhaps off-line, perhaps gone. */
export const QUIET_AFTER_MS = 20 * 60_000

const sortSchema = z.union([
  z.enum(['attention', 'name', 'state', 'rpe', 'heard', 'rest']),
  z.string().regex(/^block:[a-z0-9-]{1,40}$/),
])
export const OPTION_FILTERS = ['any', 'easier', 'planned', 'harder'] as const

export const boardViewSchema = z.object({
  sort: sortSchema.catch('attention'),
  order: z.enum(['up', 'down']).catch('up'),
  state: z.union([z.enum(BOARD_STATES), z.literal('all')]).catch('all'),
  option: z.enum(OPTION_FILTERS).catch('any'),
  /** Only members with pain, a stop or a note. */
  flagged: z
    .enum(['yes', 'no'])
    .catch('no')
    .transform((value) => value === 'yes'),
  name: z.string().max(80).catch(''),
})
export type BoardView = z.infer<typeof boardViewSchema>

/** Anything unreadable in an address falls back to the plain view. */
export function parseBoardView(params: URLSearchParams): BoardView {
  return boardViewSchema.parse({
    sort: params.get('sort') ?? 'attention',
    order: params.get('order') ?? 'up',
    state: params.get('state') ?? 'all',
    option: params.get('option') ?? 'any',
    flagged: params.get('flagged') ?? 'no',
    name: params.get('name') ?? '',
  })
}

/** The address's query for a view; what is plain is left out. */
export function boardViewQuery(view: BoardView): string {
  const params = new URLSearchParams()
  if (view.sort !== 'attention') params.set('sort', view.sort)
  if (view.order !== 'up') params.set('order', view.order)
  if (view.state !== 'all') params.set('state', view.state)
  if (view.option !== 'any') params.set('option', view.option)
  if (view.flagged) params.set('flagged', 'yes')
  if (view.name) params.set('name', view.name)
  return params.toString()
}

/** Where a member stands as a coach would say it. `nowMs`: the reader's clock, milliseconds since 1970. */
export function boardState(row: BoardRow, nowMs: number): BoardState {
  const state = row.tally?.state ?? 'not-started'
  if (state === 'stopped' || state === 'finished' || state === 'not-started') return state
  const heardMs = row.lastEventAt === null ? 0 : Date.parse(row.lastEventAt)
  return nowMs - heardMs > QUIET_AFTER_MS ? 'quiet' : 'in-class'
}

export function hasPain(row: BoardRow): boolean {
  const tally = row.tally
  return !!tally && (tally.hurts.length > 0 || (tally.rating?.hurts.length ?? 0) > 0)
}

/** Stop and pain come before everything else. */
export function looksFirst(row: BoardRow, nowMs: number): boolean {
  return boardState(row, nowMs) === 'stopped' || hasPain(row)
}

function isFlagged(row: BoardRow, nowMs: number): boolean {
  return looksFirst(row, nowMs) || !!row.tally?.rating?.note || !!row.todayNote
}

/** Milliseconds of rest that the coach had not planned: as needed inside work, and rests lengthened. */
export function restBeyondPlanMs(blocks: readonly BlockTally[]): number {
  return blocks.reduce((sum, block) => sum + block.restTakenMs + block.restLengthenedMs, 0)
}

/** How much of a block was done, as one number to sort by; -1 where there is nothing. */
function blockRank(row: BoardRow, blockId: string): number {
  const block = row.tally?.blocks.find((one) => one.block === blockId)
  if (!block || block.skipped) return -1
  if (block.format === 'for-time') {
    return block.finishMs === null ? block.totalReps : 1_000_000_000 - block.finishMs
  }
  return block.pieces ? block.pieces.done : block.totalReps
}

function levelsUsed(row: BoardRow, dto: BoardDto): Set<string> {
  const levels = new Set<string>()
  for (const blockTally of row.tally?.blocks ?? []) {
    const format = dto.version.spec.blocks.find((one) => one.id === blockTally.block)?.format
    if (!format || format.type === 'rest') continue
    for (const used of blockTally.options) {
      const movement = dto.version.movements.find(
        (one) => one.slug === format.stations[used.station]?.movement,
      )
      for (const slug of used.used) {
        levels.add(movement?.options.find((one) => one.option === slug)?.level ?? 'as-planned')
      }
    }
  }
  return levels
}

const ATTENTION: Record<BoardState, number> = {
  stopped: 0,
  quiet: 2,
  'in-class': 3,
  finished: 4,
  'not-started': 5,
}

/** Rows that the view shows, in its order. Names break ties, so the order never wavers. */
export function arrangeRows(dto: BoardDto, view: BoardView, nowMs: number): BoardRow[] {
  const wanted = view.name.trim().toLocaleLowerCase()
  const level = { easier: 'easier', planned: 'as-planned', harder: 'harder', any: null }[
    view.option
  ]
  const rows = dto.rows.filter(
    (row) =>
      (view.state === 'all' || boardState(row, nowMs) === view.state) &&
      (!view.flagged || isFlagged(row, nowMs)) &&
      (level === null || levelsUsed(row, dto).has(level)) &&
      (wanted === '' || row.memberName.toLocaleLowerCase().includes(wanted)),
  )
  const attention = (row: BoardRow) =>
    looksFirst(row, nowMs)
      ? boardState(row, nowMs) === 'stopped'
        ? 0
        : 1
      : ATTENTION[boardState(row, nowMs)]
  const rank = (row: BoardRow): number => {
    switch (view.sort) {
      case 'name':
        return 0
      case 'attention':
        return attention(row)
      case 'state':
        return BOARD_STATES.indexOf(boardState(row, nowMs))
      case 'rpe':
        return -(row.tally?.rating?.rpe ?? -1)
      case 'heard':
        return -(row.lastEventAt === null ? 0 : Date.parse(row.lastEventAt))
      case 'rest':
        return -restBeyondPlanMs(row.tally?.blocks ?? [])
      default:
        return -blockRank(row, view.sort.slice('block:'.length))
    }
  }
  const direction = view.order === 'up' ? 1 : -1
  return rows
    .map((row) => ({ row, rank: rank(row) }))
    .sort(
      (a, b) =>
        direction * (a.rank - b.rank) ||
        (view.sort === 'name' ? direction : 1) * a.row.memberName.localeCompare(b.row.memberName),
    )
    .map(({ row }) => row)
}
