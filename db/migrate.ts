/** Brings a database to the newest schema. Safe to call from several processes at once. */
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { drizzle } from 'drizzle-orm/postgres-js'
import postgres from 'postgres'

/** Any number that only this program uses. */
const ADVISORY_LOCK = 771_202_611
const TRY_EVERY_MS = 250
const GIVE_UP_AFTER_MS = 60_000

/**
 * Runs what of `db/migrations` is missing, one process at a time. Rejects where another process holds
 * the lock for more than a minute, or a migration fails (then nothing of it is kept).
 */
export async function migrateDatabase(url: string, folder = 'db/migrations'): Promise<void> {
  const sql = postgres(url, {
    max: 1,
    onnotice: () => undefined,
    connection: { lock_timeout: 2_000, application_name: 'floorside-migrate' },
  })
  try {
    const until = Date.now() + GIVE_UP_AFTER_MS
    for (;;) {
      const [row] = await sql<
        { got: boolean }[]
      >`select pg_try_advisory_lock(${ADVISORY_LOCK}) as got`
      if (row?.got) break
      if (Date.now() > until)
        throw new Error(
          'Another process has been migrating for a minute. Try again when it is done.',
        )
      await new Promise((resolve) => setTimeout(resolve, TRY_EVERY_MS))
    }
    await migrate(drizzle(sql), { migrationsFolder: folder })
  } finally {
    // Ending the only connection lets the lock go.
    await sql.end({ timeout: 5 })
  }
}
