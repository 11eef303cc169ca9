import 'server-only'
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

function codeOf(error: unknown): unknown {
  if (typeof error !== 'object' || error === null) return undefined
  if ('code' in error) return error.code
  return 'cause' in error ? codeOf(error.cause) : undefined
}

/**
 * A data function that answers within five seconds or throws `unavailable`, which is also what a lost
 * database becomes. What it had begun may still complete, so writers must bear being repeated.
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
      if (CONNECTION_CODES.has(String(codeOf(error)))) {
        throw new AppError('unavailable', NOT_AVAILABLE)
      }
      throw error
    } finally {
      clearTimeout(timer)
    }
  }
}
