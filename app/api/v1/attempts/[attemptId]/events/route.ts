/**
 * POST: stores what a member did in class. Body `RecordEventsInput` (1 to 500 events), answer
 * `RecordEventsResult` with the ids that are stored. Repeating a request changes nothing. The attempt's
 * id is a UUIDv7 that the client made; its first events make it.
 */
import { AppError } from '@/server/contract/errors'
import { recordEventsInput, uuidV7Schema } from '@/server/contract/attempts'
import { recordEvents } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'
import { answer, handler, readJson } from '@/server/http/handler'

export const POST = handler<{ attemptId: string }>(async (request, { attemptId }, { viewer }) => {
  const id = uuidV7Schema.safeParse(attemptId)
  if (!id.success) throw new AppError('bad-input', 'The attempt’s id is not a UUIDv7.')
  const input = await readJson(request, recordEventsInput)
  const result = await recordEvents(
    viewer,
    { attemptId: id.data.toLowerCase(), input, now: new Date() },
    defaultDb(),
  )
  return answer(result)
})
