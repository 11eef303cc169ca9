'use server'
/** Health answers and what 'this hurts' left behind. */
import { refresh } from 'next/cache'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { fieldMessages, healthInput } from '@/server/contract/forms'
import { defaultDb } from '@/server/data/db'
import { clearHold, saveHealth } from '@/server/data/health'
import { HEALTH_QUESTIONS } from '@/server/engine/fit/screening'
import { outcome } from './outcome'

/** Fields: one a question (`yes` or `no`), `cleared` (`on`), `limits` (any number). */
export async function saveHealthAnswers(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('saveHealthAnswers', async () => {
    const { viewer } = await sessionOrThrow()
    if (!viewer.roles.includes('member')) throw new AppError('not-found', 'There is no such page.')
    const parsed = healthInput.safeParse({
      answers: Object.fromEntries(
        HEALTH_QUESTIONS.map((question) => [question, form.get(question)]),
      ),
      cleared: form.get('cleared') === 'on',
      limits: form.getAll('limits').map(String),
    })
    if (!parsed.success) {
      const fields = Object.fromEntries(
        Object.entries(fieldMessages(parsed.error)).map(([name, message]) => [
          name.replace(/^answers\./, ''),
          message,
        ]),
      )
      throw new AppError('bad-input', 'Some questions are still open.', { fields })
    }
    await saveHealth(viewer, { ...parsed.data, now: new Date() }, defaultDb())
    return undefined
  })
}

/** Fields `holdId`, `as` (`member` or `coach`). */
export async function clearHurtHold(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('clearHurtHold', async () => {
    const { viewer } = await sessionOrThrow()
    const as = form.get('as') === 'coach' ? 'coach' : 'member'
    await clearHold(
      viewer,
      { holdId: String(form.get('holdId') ?? ''), as, now: new Date() },
      defaultDb(),
    )
    refresh()
    return undefined
  })
}
