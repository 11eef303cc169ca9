import 'server-only'
/** What every route handler shares: who asks, from where, with what; and errors as status and body. */
import { randomUUID } from 'node:crypto'
import { unstable_rethrow } from 'next/navigation'
import type { z } from 'zod'
import { AppError, ERROR_STATUS, type ErrorBody } from '@/server/contract/errors'
import { checkOrigin } from '@/server/auth/origin'
import { currentSession, type Session } from '@/server/auth/viewer'
import { fieldMessages } from '@/server/contract/forms'
import { storable } from '@/server/contract/text'
import { logError } from './log'

const MOST_BODY_BYTES = 1_000_000

type Context<P> = { params: Promise<P> }
type Handled<P> = (request: Request, params: P, session: Session) => Promise<Response>

/**
 * Wraps a handler for signed-in people. Errors become `ErrorBody` with their status; unknown ones are
 * logged under an id, and only the id is shown. `body`: what a change is sent as; a file may be of any type
 * that its sender says, and is told by its bytes.
 */
export function handler<P extends Record<string, string>>(
  handled: Handled<P>,
  { body = 'json' }: { body?: 'json' | 'file' } = {},
): (request: Request, context: Context<P>) => Promise<Response> {
  return async (request, context) => {
    try {
      if (request.method !== 'GET' && request.method !== 'HEAD') {
        checkOrigin(request.headers)
        if (body === 'json') checkJson(request)
      }
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

function checkJson(request: Request): void {
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase()
  if (type !== 'application/json')
    throw new AppError('bad-input', 'Send JSON (content-type application/json).')
}

/** The JSON body of a request, parsed. Throws `too-large` over 1 MB and `bad-input` with messages by field. */
export async function readJson<Schema extends z.ZodType>(
  request: Request,
  schema: Schema,
): Promise<z.output<Schema>> {
  let json: unknown
  const text = await readBody(request)
  try {
    json = JSON.parse(text, (_key, value: unknown) =>
      typeof value === 'string' ? storable(value) : value,
    )
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

/** The body as text, read no further than it may be long: a length that was promised proves nothing. */
async function readBody(request: Request): Promise<string> {
  const chunks: Uint8Array[] = []
  let bytes = 0
  const reader = request.body?.getReader()
  for (;;) {
    const next = await reader?.read()
    if (!next || next.done) break
    bytes += next.value.byteLength
    if (bytes > MOST_BODY_BYTES) {
      await reader?.cancel()
      throw new AppError(
        'too-large',
        'That is more than one request may carry (1 MB). Send it in parts.',
      )
    }
    chunks.push(next.value)
  }
  return Buffer.concat(chunks).toString('utf8')
}

/** A JSON answer that no cache keeps. */
export function answer(body: unknown, init: ResponseInit = {}): Response {
  const headers = new Headers(init.headers)
  headers.set('cache-control', 'no-store')
  return Response.json(body, { ...init, headers })
}
