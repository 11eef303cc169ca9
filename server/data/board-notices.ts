import 'server-only'
/** Word of changed boards, for every process that shares the database. */
import { sql } from 'drizzle-orm'
import { isPool, type Database, type DbOrTx } from '@/db/client'

/** Channel on which ids of changed boards are told; nothing else goes over it. */
export const BOARD_CHANNEL = 'floorside_board'

/** A full class changes a board many times a second; each is told of at once, then no oftener than this. */
const LEAST_BETWEEN_MS = 100

/** Boards that changed since the last word, by pool. */
const waiting = new WeakMap<Database, Set<string>>()

/**
 * Tells that a board changed. Call it after the change is committed: with a NOTIFY inside, PostgreSQL
 * lets commits through one by one, which halves what can be recorded. Word that is lost on the way is
 * made up for by the feed's own reading every ten seconds. With a transaction it is told on its commit.
 */
export async function tellBoard(db: DbOrTx, scheduledClassId: string): Promise<void> {
  if (!isPool(db)) {
    await notify(db, [scheduledClassId])
    return
  }
  const gathered = waiting.get(db)
  if (gathered) {
    gathered.add(scheduledClassId)
    return
  }
  waiting.set(db, new Set())
  setTimeout(() => tellWaiting(db), LEAST_BETWEEN_MS)
  // Nobody who records waits for it, nor fails with it.
  void notify(db, [scheduledClassId]).catch(() => undefined)
}

function tellWaiting(db: Database): void {
  const gathered = waiting.get(db)
  waiting.delete(db)
  if (!gathered || gathered.size === 0) return
  waiting.set(db, new Set())
  setTimeout(() => tellWaiting(db), LEAST_BETWEEN_MS)
  void notify(db, [...gathered]).catch(() => undefined)
}

async function notify(db: DbOrTx, scheduledClassIds: string[]): Promise<void> {
  const ids = JSON.stringify(scheduledClassIds)
  await db.execute(
    sql`select pg_notify(${BOARD_CHANNEL}, id) from jsonb_array_elements_text(${ids}::jsonb) id`,
  )
}
