import 'server-only'
/** Whether a request that changes something comes from our own pages. */
import { headers } from 'next/headers'
import { AppError } from '@/server/contract/errors'

/**
 * Browsers say so themselves on HTTPS and on this computer; on plain HTTP they send the origin, which
 * must be `APP_ORIGIN` or the host that was asked. Throws `not-allowed` otherwise, and without either.
 */
export function checkOrigin(asked: Headers): void {
  const site = asked.get('sec-fetch-site')
  const origin = asked.get('origin')
  const isOwn = site === null ? isOwnOrigin(origin, asked.get('host')) : site === 'same-origin'
  if (!isOwn)
    throw new AppError('not-allowed', 'This request did not come from Floorside’s own pages.')
}

function isOwnOrigin(origin: string | null, host: string | null): boolean {
  if (origin === null || !URL.canParse(origin)) return false
  return origin === process.env.APP_ORIGIN || new URL(origin).host === host
}

/** For actions: Next lets one run without an origin, and compares with a host that a client can name. */
export async function checkActionOrigin(): Promise<void> {
  checkOrigin(await headers())
}
