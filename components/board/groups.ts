/** Rows under headings, as a coach reads them when nothing else was asked for. */
import type { BoardRow } from '@/server/contract/board'
import { boardState, looksFirst, type BoardView } from '@/server/contract/board-view'

export interface RowGroup {
  /** Null: no heading, the coach sorted by something. */
  title: string | null
  rows: readonly BoardRow[]
}

/** `rows` in the order of the view. `nowMs`: milliseconds since 1970. */
export function groupRows(rows: readonly BoardRow[], view: BoardView, nowMs: number): RowGroup[] {
  if (view.sort !== 'attention') return [{ title: null, rows }]
  const titleOf = (row: BoardRow): string => {
    if (looksFirst(row, nowMs)) return 'Look here first'
    switch (boardState(row, nowMs)) {
      case 'quiet':
        return 'No word'
      case 'in-class':
        return 'In class'
      case 'not-started':
        return 'Not here yet'
      default:
        return 'Finished'
    }
  }
  const groups: { title: string; rows: BoardRow[] }[] = []
  for (const row of rows) {
    const title = titleOf(row)
    const last = groups.find((group) => group.title === title)
    if (last) last.rows.push(row)
    else groups.push({ title, rows: [row] })
  }
  return groups
}
