/** What a coach should read beside a member's row, worst first, in words. */
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { STOP_SIGN_TEXT } from '@/server/engine/fit/stop-signs'
import { clockText } from '@/server/engine/tally/score'
import type { BoardDto, BoardRow } from '@/server/contract/board'
import { boardState, restBeyondPlanMs } from '@/server/contract/board-view'
import { optionsTaken } from './options-taken'

export interface Remark {
  weight: 'stop' | 'pain' | 'plain'
  text: string
  /** Second line, quieter. */
  more: string | null
}

function joined(parts: (string | null | undefined)[]): string | null {
  const said = parts.filter((part): part is string => !!part)
  return said.length > 0 ? said.join(' · ') : null
}

/** The remarks of one row; empty where there is nothing to know. `nowMs`: milliseconds since 1970. */
export function remarksOf(row: BoardRow, dto: BoardDto, nowMs: number): Remark[] {
  const remarks: Remark[] = []
  const tally = row.tally
  const blockTitle = (id: string | null) =>
    dto.version.spec.blocks.find((block) => block.id === id)?.title ?? null
  if (tally?.stop) {
    const { sign, note, where, redFlag } = tally.stop
    remarks.push({
      weight: 'stop',
      text: sign ? STOP_SIGN_TEXT[sign] : 'Stopped, no reason given',
      more: joined([
        `Stopped at ${clockText(tally.stop.classMs)}`,
        where,
        note,
        redFlag ? 'Call them' : null,
      ]),
    })
  }
  for (const hurt of tally?.hurts ?? []) {
    remarks.push({
      weight: 'pain',
      text: `${HURT_PLACE_TEXT[hurt.where]} hurts`,
      more: joined([blockTitle(hurt.block), clockText(hurt.classMs), hurt.note]),
    })
  }
  for (const hurt of tally?.rating?.hurts ?? []) {
    if (tally?.hurts.some((one) => one.where === hurt.where)) continue
    remarks.push({
      weight: 'pain',
      text: `${HURT_PLACE_TEXT[hurt.where]} hurt`,
      more: joined(['Said after class', hurt.note]),
    })
  }
  if (row.todayNote) remarks.push({ weight: 'pain', text: `Today: ${row.todayNote}`, more: null })
  if (row.healthNote) remarks.push({ weight: 'plain', text: row.healthNote, more: null })
  if (tally?.rating?.note)
    remarks.push({ weight: 'plain', text: `“${tally.rating.note}”`, more: null })
  const restMs = restBeyondPlanMs(tally?.blocks ?? [])
  if (restMs >= 1_000) {
    remarks.push({ weight: 'plain', text: `${clockText(restMs)} rest beyond plan`, more: null })
  }
  const taken = optionsTaken(row, dto)
  if (taken) remarks.push({ weight: 'plain', text: taken, more: null })
  if (row.late) remarks.push({ weight: 'plain', text: 'Done after the window closed', more: null })
  if (row.otherAttempts > 0) {
    remarks.push({
      weight: 'plain',
      text: row.otherAttempts === 1 ? 'One more attempt' : `${row.otherAttempts} more attempts`,
      more: null,
    })
  }
  if (boardState(row, nowMs) === 'quiet') {
    remarks.push({
      weight: 'plain',
      text: 'Nothing heard for a while',
      more: 'Perhaps off-line: rounds come in when the connection is back',
    })
  }
  return remarks
}
