/** GET: the board as CSV (RFC 4180), with the sorting and filters of the board's own address. For the gym's coaches. */
import { parseBoardView } from '@/server/contract/board-view'
import { getBoard } from '@/server/data/boards'
import { defaultDb } from '@/server/data/db'
import { boardCsv, csvFileName } from '@/server/http/board-csv'
import { handler } from '@/server/http/handler'

export const GET = handler<{ scheduledClassId: string }>(
  async (request, { scheduledClassId }, { viewer }) => {
    const now = new Date()
    const board = await getBoard(viewer, { scheduledClassId, now }, defaultDb())
    const view = parseBoardView(new URL(request.url).searchParams)
    return new Response(boardCsv(board, view, now.getTime()), {
      headers: {
        'content-type': 'text/csv; charset=utf-8',
        'content-disposition': `attachment; filename="${csvFileName(board)}"`,
        'cache-control': 'no-store',
      },
    })
  },
)
