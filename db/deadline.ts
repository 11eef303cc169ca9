/** How long anybody waits for the database, and what its failures become. */
import { DrizzleQueryError } from 'drizzle-orm'
import { AppError } from '@/server/contract/errors'

/** A half-open connection would leave a query waiting for ever, whatever the driver is told. */
const DEADLINE_MS = 5_000

export const NOT_AVAILABLE =
  'The gym’s records cannot be reached just now. Try again in a moment; what you did is kept.'

const CONNECTION_CODES = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'CONNECTION_CLOSED',
  'CONNECTION_ENDED',
  'CONNECTION_DESTROYED',
  'CONNECT_TIMEOUT',
  '57P01',
  '57P03',
  '57014',
])
/** Text that PostgreSQL cannot hold, such as NUL in an address: nothing can be found by it. */
const TEXT_CODES = new Set(['22021', '22P05'])

/** A failed query without its parameters: drizzle puts them into the message, and they may be health data. */
class QueryError extends Error {
  readonly code: string
  constructor(code: string, stack: string | undefined) {
    super(`The database refused a query (${code}).`)
    this.name = 'QueryError'
    this.code = code
    const frames = stack?.split('\n').filter((line) => line.trimStart().startsWith('at ')) ?? []
    this.stack = [`QueryError: ${this.message}`, ...frames].join('\n')
  }
}

function codeOf(error: unknown): unknown {
  if (typeof error !== 'object' || error === null) return undefined
  if ('code' in error) return error.code
  return 'cause' in error ? codeOf(error.cause) : undefined
}

function told(error: unknown): unknown {
  const code = String(codeOf(error))
  if (CONNECTION_CODES.has(code)) return new AppError('unavailable', NOT_AVAILABLE)
  if (TEXT_CODES.has(code)) return new AppError('not-found', 'There is nothing of that name.')
  return error instanceof DrizzleQueryError ? new QueryError(code, error.stack) : error
}

/**
 * A function on the database that answers within five seconds or throws `unavailable`, which is also
 * what a lost database becomes. What it had begun may still complete, so writers must bear being repeated.
 */
export function timed<Arguments extends unknown[], Result>(
  work: (...args: Arguments) => Promise<Result>,
): (...args: Arguments) => Promise<Result> {
  return async (...args) => {
    let timer: ReturnType<typeof setTimeout> | undefined
    const late = new Promise<never>((_, reject) => {
      timer = setTimeout(() => reject(new AppError('unavailable', NOT_AVAILABLE)), DEADLINE_MS)
    })
    try {
      return await Promise.race([work(...args), late])
    } catch (error) {
      throw told(error)
    } finally {
      clearTimeout(timer)
    }
  }
}
