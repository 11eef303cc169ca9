/** GET: one attempt with its events and tally (`AttemptDto`), for the member whose it is and the gym's coaches. */
import { getAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'
import { answer, handler } from '@/server/http/handler'

export const GET = handler<{ attemptId: string }>(async (_request, { attemptId }, { viewer }) =>
  answer(await getAttempt(viewer, { attemptId }, defaultDb())),
)
