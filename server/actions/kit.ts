'use server'
import { refresh } from 'next/cache'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { fieldMessages, kitInput, weightsInput } from '@/server/contract/forms'
import { WEIGHED_ITEMS } from '@/server/engine/fit/weights'
import { defaultDb } from '@/server/data/db'
import { saveKit } from '@/server/data/people'
import { outcome } from './outcome'

const WEIGHTS = 'weights:'

/** Fields: one an item, how many of it (0 to 20); `weights:<item>` what its pieces weigh. */
export async function saveOwnKit(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('saveOwnKit', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = kitInput.safeParse(
      Object.fromEntries(
        [...form]
          .filter(([name]) => !name.startsWith('$') && !name.startsWith(WEIGHTS))
          .map(([name, value]) => [name, Number(value)]),
      ),
    )
    if (!parsed.success) {
      throw new AppError('bad-input', 'Give whole numbers from 0 to 20.', {
        fields: fieldMessages(parsed.error),
      })
    }
    const weights = weightsInput.safeParse(
      Object.fromEntries(
        WEIGHED_ITEMS.map((item) => [item, String(form.get(`${WEIGHTS}${item}`) ?? '')]),
      ),
    )
    if (!weights.success) {
      throw new AppError('bad-input', 'Some of the weights cannot be read.', {
        fields: Object.fromEntries(
          Object.entries(fieldMessages(weights.error)).map(([item, message]) => [
            `${WEIGHTS}${item}`,
            message,
          ]),
        ),
      })
    }
    await saveKit(viewer, { kit: parsed.data, kitWeights: weights.data }, defaultDb())
    refresh()
    return undefined
  })
}
