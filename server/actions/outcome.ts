import 'server-only'
import { randomUUID } from 'node:crypto'
import { unstable_rethrow } from 'next/navigation'
import { checkActionOrigin } from '@/server/auth/origin'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { logError } from '@/server/http/log'

/**
 * Runs an action that came from our own pages. What it did, as its form is told: errors as words and
 * fields, unknown ones under an id.
 */
export async function outcome<T>(where: string, work: () => Promise<T>): Promise<ActionResult<T>> {
  try {
    await checkActionOrigin()
    return { ok: true, value: await work() }
  } catch (error) {
    unstable_rethrow(error)
    if (error instanceof AppError) {
      return {
        ok: false,
        message: error.message,
        ...(error.fields ? { fields: error.fields } : {}),
      }
    }
    const id = randomUUID()
    logError(id, where, error)
    return {
      ok: false,
      message: `Something went wrong here, and nothing was changed. If it stays, tell your gym this number: ${id}`,
    }
  }
}
