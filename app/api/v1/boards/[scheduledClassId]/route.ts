/** GET: the board of a scheduled class (`BoardDto`), for the gym's coaches. */
import { getBoard } from '@/server/data/boards'
import { defaultDb } from '@/server/data/db'
import { answer, handler } from '@/server/http/handler'

export const GET = handler<{ scheduledClassId: string }>(
  async (_request, { scheduledClassId }, { viewer }) =>
    answer(await getBoard(viewer, { scheduledClassId, now: new Date() }, defaultDb())),
)
