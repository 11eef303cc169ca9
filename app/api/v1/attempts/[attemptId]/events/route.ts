/**
 * POST: stores what a member did in class. Body `RecordEventsInput` (1 to 500 events), answer
 * `RecordEventsResult` with the ids that are stored. Repeating a request changes nothing. The attempt's
 * id is a UUIDv7 that the client made; its first events make it. Somebody in several gyms records in the
 * one that the class belongs to, whichever they have since switched to.
 */
import { viewerOf } from '@/server/auth/viewer'
import { AppError } from '@/server/contract/errors'
import { recordEventsInput, uuidV7Schema } from '@/server/contract/attempts'
import { recordEvents } from '@/server/data/attempts'
import { ownGymOf } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { answer, handler, readJson } from '@/server/http/handler'

export const POST = handler<{ attemptId: string }>(async (request, { attemptId }, { viewer }) => {
  const id = uuidV7Schema.safeParse(attemptId)
  if (!id.success) throw new AppError('bad-input', 'The attempt’s id is not a UUIDv7.')
  const input = await readJson(request, recordEventsInput)
  const db = defaultDb()
  const gymId = await ownGymOf(viewer, input, db)
  const there =
    gymId === null || gymId === viewer.gymId ? viewer : await viewerOf(db, viewer.personId, gymId)
  const result = await recordEvents(
    there ?? viewer,
    { attemptId: id.data.toLowerCase(), input, now: new Date() },
    db,
  )
  return answer(result)
})
