import 'server-only'
/**
 * Sign-in throttle, kept in PostgreSQL so that several processes share it. Failures are counted per
 * account, per network address, and per both together. A delay doubles with each failure; nothing
 * locks out for good.
 */
import { createHash } from 'node:crypto'
import { inArray, sql } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { signInThrottles } from '@/db/schema/sign-in-throttles'

interface Measure {
  /** Failures that cost nothing: a mistyped password is no attack. */
  free: number
  mostSeconds: number
}
const MEASURES = {
  both: { free: 2, mostSeconds: 300 },
  account: { free: 5, mostSeconds: 60 },
  // Many people may sit behind one address (a gym, a household), so it has more room.
  address: { free: 20, mostSeconds: 300 },
} satisfies Record<string, Measure>
type Kind = keyof typeof MEASURES

/** Failures older than this are forgotten. */
const FORGET_AFTER_MS = 60 * 60_000

function keysFor(email: string, address: string): Record<Kind, string> {
  const digest = (text: string) => createHash('sha256').update(text).digest('base64url')
  const account = email.trim().toLowerCase()
  return {
    both: `both:${digest(`${account}\n${address}`)}`,
    account: `account:${digest(account)}`,
    address: `address:${digest(address)}`,
  }
}

/** Seconds after failure number `failures` (from 1) in which the key is held: 0, then 1, 2, 4 … */
export function delaySeconds(kind: Kind, failures: number): number {
  const { free, mostSeconds } = MEASURES[kind]
  return failures <= free ? 0 : Math.min(mostSeconds, 2 ** Math.min(30, failures - free - 1))
}

/** Seconds to wait before a sign-in may be tried; 0 where it may now. */
export async function waitSeconds(
  db: DbOrTx,
  email: string,
  address: string,
  now: Date,
): Promise<number> {
  const rows = await db
    .select({ blockedUntil: signInThrottles.blockedUntil })
    .from(signInThrottles)
    .where(inArray(signInThrottles.key, Object.values(keysFor(email, address))))
  const latest = Math.max(0, ...rows.map((row) => row.blockedUntil.getTime() - now.getTime()))
  return Math.ceil(latest / 1_000)
}

/** Counts a failed sign-in against account, address and both. */
export async function countFailure(
  db: DbOrTx,
  email: string,
  address: string,
  now: Date,
): Promise<void> {
  const keys = keysFor(email, address)
  const forgotten = new Date(now.getTime() - FORGET_AFTER_MS).toISOString()
  for (const kind of Object.keys(MEASURES) as Kind[]) {
    const [row] = await db
      .insert(signInThrottles)
      .values({ key: keys[kind], failures: 1, lastFailureAt: now, blockedUntil: now })
      .onConflictDoUpdate({
        target: signInThrottles.key,
        set: {
          failures: sql`case when ${signInThrottles.lastFailureAt} < ${forgotten}::timestamptz then 1 else ${signInThrottles.failures} + 1 end`,
          lastFailureAt: now,
        },
      })
      .returning({ failures: signInThrottles.failures })
    const seconds = delaySeconds(kind, row?.failures ?? 1)
    if (seconds > 0) {
      await db
        .update(signInThrottles)
        .set({ blockedUntil: new Date(now.getTime() + seconds * 1_000) })
        .where(inArray(signInThrottles.key, [keys[kind]]))
    }
  }
}

/** A right password clears what was counted against the account; the address keeps its count. */
export async function clearFailures(db: DbOrTx, email: string, address: string): Promise<void> {
  const { both, account } = keysFor(email, address)
  await db.delete(signInThrottles).where(inArray(signInThrottles.key, [both, account]))
}
