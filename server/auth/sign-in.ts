import 'server-only'
import { eq, sql } from 'drizzle-orm'
import type { Database } from '@/db/client'
import { timed } from '@/db/deadline'
import { people } from '@/db/schema/people'
import { AppError } from '@/server/contract/errors'
import { verifyPassword } from './passwords'
import { forgiveTries, takeTry } from './throttle'
import { viewerOf } from './viewer'

const WRONG_SIGN_IN = 'E-mail and password do not belong together. Check both and try again.'

const accountOf = timed(async (db: Database, email: string) => {
  const [person] = await db
    .select({ id: people.id, passwordHash: people.passwordHash })
    .from(people)
    .where(eq(sql`lower(${people.email})`, email.trim().toLowerCase()))
  return person
})

/**
 * Checks an e-mail and password. Resolves with the person; throws `too-many` while throttled and
 * `bad-input` otherwise, with the same words and after the same work for an unknown address, a wrong
 * password and somebody who is active in no gym.
 */
export async function checkSignIn(
  db: Database,
  input: { email: string; password: string; address: string; now: Date },
): Promise<{ personId: string }> {
  const { email, password, address, now } = input
  const wait = await takeTry(db, email, address, now)
  if (wait > 0) {
    throw new AppError(
      'too-many',
      `Too many tries. Wait ${wait === 1 ? 'a second' : `${wait} seconds`}, then try again.`,
      { retryAfterSeconds: wait },
    )
  }
  const person = await accountOf(db, email)
  const matches = await verifyPassword(person?.passwordHash ?? null, password)
  // Only after a right password, so that a known address costs nothing more than an unknown one.
  if (!person || !matches || !(await viewerOf(db, person.id, null))) {
    throw new AppError('bad-input', WRONG_SIGN_IN)
  }
  await forgiveTries(db, email, address, now)
  return { personId: person.id }
}
