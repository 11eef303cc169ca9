'use server'
import { refresh } from 'next/cache'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { fieldMessages, kitInput } from '@/server/contract/forms'
import { defaultDb } from '@/server/data/db'
import { saveKit } from '@/server/data/people'
import { outcome } from './outcome'

/** Fields: one an item, how many of it (0 to 20). */
export async function saveOwnKit(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('saveOwnKit', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = kitInput.safeParse(
      Object.fromEntries(
        [...form]
          .filter(([name]) => !name.startsWith('$'))
          .map(([name, value]) => [name, Number(value)]),
      ),
    )
    if (!parsed.success) {
      throw new AppError('bad-input', 'Give whole numbers from 0 to 20.', {
        fields: fieldMessages(parsed.error),
      })
    }
    await saveKit(viewer, { kit: parsed.data }, defaultDb())
    refresh()
    return undefined
  })
}
