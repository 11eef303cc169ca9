import 'server-only'
/** What every route handler shares: who asks, from where, with what; and errors as status and body. */
import { randomUUID } from 'node:crypto'
import { unstable_rethrow } from 'next/navigation'
import type { z } from 'zod'
import { AppError, ERROR_STATUS, type ErrorBody } from '@/server/contract/errors'
import { currentSession, type Session } from '@/server/auth/viewer'
import { fieldMessages } from '@/server/contract/forms'
import { logError } from './log'

const MOST_BODY_BYTES = 1_000_000

type Context<P> = { params: Promise<P> }
type Handled<P> = (request: Request, params: P, session: Session) => Promise<Response>

/**
 * Wraps a handler for signed-in people. Errors become `ErrorBody` with their status; unknown ones are
 * logged under an id, and only the id is shown.
 */
export function handler<P extends Record<string, string>>(
  handled: Handled<P>,
): (request: Request, context: Context<P>) => Promise<Response> {
  return async (request, context) => {
    try {
      if (request.method !== 'GET' && request.method !== 'HEAD') checkOrigin(request)
      const session = await currentSession()
      if (!session)
        throw new AppError('signed-out', 'You are signed out. Sign in again; nothing is lost.')
      return await handled(request, await context.params, session)
    } catch (error) {
      unstable_rethrow(error)
      return errorResponse(error, new URL(request.url).pathname)
    }
  }
}

/** An error as an answer. `where`: a path, for the log. */
export function errorResponse(error: unknown, where: string): Response {
  if (error instanceof AppError) {
    const body: ErrorBody = {
      error: {
        code: error.code,
        message: error.message,
        ...(error.fields ? { fields: error.fields } : {}),
      },
    }
    const headers = new Headers({ 'cache-control': 'no-store' })
    if (error.retryAfterSeconds !== undefined)
      headers.set('retry-after', String(error.retryAfterSeconds))
    return Response.json(body, { status: ERROR_STATUS[error.code], headers })
  }
  const id = randomUUID()
  logError(id, where, error)
  const body: ErrorBody = {
    error: {
      code: 'internal',
      message: `Something went wrong here. Nothing you did is lost. If it stays, tell your gym this number: ${id}`,
      id,
    },
  }
  return Response.json(body, { status: 500, headers: { 'cache-control': 'no-store' } })
}

/** A request that changes something must come from our own pages and be JSON. */
function checkOrigin(request: Request): void {
  const site = request.headers.get('sec-fetch-site')
  const origin = request.headers.get('origin')
  const host = request.headers.get('host')
  const own = process.env.APP_ORIGIN
  const isOwn =
    site === 'same-origin' ||
    (site === null &&
      origin !== null &&
      (origin === own || (URL.canParse(origin) && new URL(origin).host === host)))
  if (!isOwn)
    throw new AppError('not-allowed', 'This request did not come from Floorside’s own pages.')
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase()
  if (type !== 'application/json')
    throw new AppError('bad-input', 'Send JSON (content-type application/json).')
}

/** The JSON body of a request, parsed. Throws `too-large` over 1 MB and `bad-input` with messages by field. */
export async function readJson<Schema extends z.ZodType>(
  request: Request,
  schema: Schema,
): Promise<z.output<Schema>> {
  const tooLarge = new AppError(
    'too-large',
    'That is more than one request may carry (1 MB). Send it in parts.',
  )
  if (Number(request.headers.get('content-length') ?? 0) > MOST_BODY_BYTES) throw tooLarge
  const text = await request.text()
  if (Buffer.byteLength(text) > MOST_BODY_BYTES) throw tooLarge
  let json: unknown
  try {
    json = JSON.parse(text)
  } catch {
    throw new AppError('bad-input', 'The request is not JSON.')
  }
  const parsed = schema.safeParse(json)
  if (!parsed.success) {
    throw new AppError('bad-input', 'Some of what was sent cannot be right.', {
      fields: fieldMessages(parsed.error),
    })
  }
  return parsed.data
}

/** A JSON answer that no cache keeps. */
export function answer(body: unknown, init: ResponseInit = {}): Response {
  const headers = new Headers(init.headers)
  headers.set('cache-control', 'no-store')
  return Response.json(body, { ...init, headers })
}
