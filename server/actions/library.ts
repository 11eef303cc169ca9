'use server'
import { refresh } from 'next/cache'
import { redirect } from 'next/navigation'
import type { z } from 'zod'
import { sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { plural } from '@/server/contract/format'
import { backToBuiltInInput, movementNameInput, readMovementForm } from '@/server/contract/library'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import {
  archiveMovement as archive,
  backToBuiltIn as removeCopy,
  bringBackMovement as bringBack,
  saveMovement as save,
} from '@/server/data/library'
import { outcome } from './outcome'

/** The movement's own form (`readMovementForm`). Leads to the movement's page when it is saved. */
export async function saveMovement(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('saveMovement', async () => {
    const { viewer } = await sessionOrThrow()
    const { change, fields } = readMovementForm(form)
    if (!change) {
      const count = Object.keys(fields).length
      throw new AppError(
        'bad-input',
        `The movement was not saved: ${plural(count, 'field')} ${count === 1 ? 'needs' : 'need'} another look. All that you typed is still here.`,
        { fields },
      )
    }
    const { slug } = await save(viewer, change, defaultDb())
    redirect(paths.movement(slug))
  })
}

function parsed<T extends z.ZodType>(schema: T, form: FormData): z.infer<T> {
  const result = schema.safeParse(Object.fromEntries(form))
  if (!result.success) {
    throw new AppError('bad-input', 'It is not clear which movement is meant. Load the page anew.')
  }
  return result.data
}

/** Field: slug. */
export async function archiveMovement(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('archiveMovement', async () => {
    const { viewer } = await sessionOrThrow()
    await archive(viewer, { ...parsed(movementNameInput, form), now: new Date() }, defaultDb())
    refresh()
    return undefined
  })
}

/** Field: slug. */
export async function bringBackMovement(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('bringBackMovement', async () => {
    const { viewer } = await sessionOrThrow()
    await bringBack(viewer, { ...parsed(movementNameInput, form), now: new Date() }, defaultDb())
    refresh()
    return undefined
  })
}

/** Fields: slug, basedOn. */
export async function backToBuiltIn(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('backToBuiltIn', async () => {
    const { viewer } = await sessionOrThrow()
    await removeCopy(viewer, parsed(backToBuiltInInput, form), defaultDb())
    refresh()
    return undefined
  })
}
