'use server'
import { refresh } from 'next/cache'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { fitInput, optionRuleInput } from '@/server/contract/fit'
import { fieldMessages } from '@/server/contract/forms'
import { defaultDb } from '@/server/data/db'
import { saveOwnFit, setOptionRule } from '@/server/data/fit'
import { outcome } from './outcome'

/** Fields: `note` once for each of the member's own notes, `wantsMore` where they do. */
export async function saveFit(_before: ActionResult | null, form: FormData): Promise<ActionResult> {
  return outcome('saveFit', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = fitInput.safeParse({
      bodyNotes: form.getAll('note'),
      wantsMore: form.get('wantsMore') !== null,
    })
    if (!parsed.success) throw new AppError('bad-input', 'Choose among the notes of the list.')
    await saveOwnFit(viewer, parsed.data, defaultDb())
    refresh()
    return undefined
  })
}

/** Fields: membershipId, movement, option (empty takes the rule back). For the member's coaches. */
export async function saveOptionRule(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('saveOptionRule', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = optionRuleInput.safeParse(Object.fromEntries(form))
    if (!parsed.success) {
      throw new AppError('bad-input', 'The rule was not saved.', {
        fields: fieldMessages(parsed.error),
      })
    }
    await setOptionRule(viewer, { ...parsed.data, now: new Date() }, defaultDb())
    refresh()
    return undefined
  })
}
