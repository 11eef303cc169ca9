import 'server-only'
import { sql } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'

/** Resolves where the database answers within five seconds; throws `unavailable` otherwise. */
export const checkDatabase = timed(async (db: DbOrTx): Promise<void> => {
  await db.execute(sql`select 1`)
})
