import 'server-only'
/**
 * Sign-in throttle, kept in PostgreSQL so that several processes share it. Tries are counted per
 * account, per network address, and per both together. A delay doubles with each failure; nothing
 * locks out for good.
 */
import { createHash } from 'node:crypto'
import { asc, eq, inArray, sql } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
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
const KINDS = Object.keys(MEASURES) as Kind[]

/** Failures older than this are forgotten. */
const FORGET_AFTER_MS = 60 * 60_000
/** So that a flood of invented accounts leaves nothing behind, and no single try pays for all of it. */
const SWEPT_AT_ONCE = 100

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

/**
 * Takes a try: counts it as failed before the password is looked at, so that tries sent all at once
 * cannot slip past the count. Resolves with 0, or with the seconds to wait, and then counts nothing.
 */
export const takeTry = timed(
  async (db: DbOrTx, email: string, address: string, now: Date): Promise<number> => {
    const keys = keysFor(email, address)
    const forgotten = new Date(now.getTime() - FORGET_AFTER_MS)
    await sweep(db, forgotten)
    return db.transaction(async (tx) => {
      const ordered = Object.values(keys).sort()
      await tx
        .insert(signInThrottles)
        .values(ordered.map((key) => ({ key, failures: 0, lastFailureAt: now, blockedUntil: now })))
        .onConflictDoNothing()
      const rows = await tx
        .select()
        .from(signInThrottles)
        .where(inArray(signInThrottles.key, ordered))
        .orderBy(asc(signInThrottles.key))
        .for('update')
      const heldMs = Math.max(0, ...rows.map((row) => row.blockedUntil.getTime() - now.getTime()))
      if (heldMs > 0) return Math.ceil(heldMs / 1_000)
      for (const kind of KINDS) {
        const row = rows.find((one) => one.key === keys[kind])
        const failures = row && row.lastFailureAt > forgotten ? row.failures + 1 : 1
        const blockedUntil = new Date(now.getTime() + delaySeconds(kind, failures) * 1_000)
        await tx
          .update(signInThrottles)
          .set({ failures, lastFailureAt: now, blockedUntil })
          .where(eq(signInThrottles.key, keys[kind]))
      }
      return 0
    })
  },
)

/** A right password clears what was counted against the account, and this try against the address. */
export const forgiveTries = timed(
  async (db: DbOrTx, email: string, address: string, now: Date): Promise<void> => {
    const keys = keysFor(email, address)
    // One row at a time: two locks at once could meet those of a try in another order.
    for (const key of [keys.account, keys.both])
      await db.delete(signInThrottles).where(eq(signInThrottles.key, key))
    await db
      .update(signInThrottles)
      .set({
        failures: sql`greatest(0, ${signInThrottles.failures} - 1)`,
        blockedUntil: now,
      })
      .where(eq(signInThrottles.key, keys.address))
  },
)

async function sweep(db: DbOrTx, forgotten: Date): Promise<void> {
  await db.execute(sql`
    delete from ${signInThrottles} where ${signInThrottles.key} in (
      select ${signInThrottles.key} from ${signInThrottles}
      where ${signInThrottles.lastFailureAt} < ${forgotten.toISOString()}::timestamptz
        and ${signInThrottles.blockedUntil} < ${forgotten.toISOString()}::timestamptz
      limit ${SWEPT_AT_ONCE} for update skip locked)`)
}
