'use server'
import { refresh } from 'next/cache'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { fieldMessages } from '@/server/contract/forms'
import { importCuesInput } from '@/server/contract/planned-classes'
import { defaultDb } from '@/server/data/db'
import { addCaptions } from '@/server/data/planned-classes'

import { outcome } from './outcome'

/** Fields: classId, basedOn, block, timesFrom, captions (WebVTT), ahead. Publishes a new version with the cues. */
export async function importCues(
  _before: ActionResult<{ cues: number; moved: number }> | null,
  form: FormData,
): Promise<ActionResult<{ cues: number; moved: number }>> {
  return outcome('importCues', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = importCuesInput.safeParse({
      ...Object.fromEntries(form),
      ahead: form.get('ahead') !== null,
    })
    if (!parsed.success) {
      throw new AppError('bad-input', 'The cues were not imported.', {
        fields: fieldMessages(parsed.error),
      })
    }
    const done = await addCaptions(viewer, { ...parsed.data, now: new Date() }, defaultDb())
    refresh()
    return done
  })
}
