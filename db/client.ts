/** The database of this process: one pool, one drizzle over it. */
import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js'
import postgres from 'postgres'

export type Database = PostgresJsDatabase
/** What data functions take: the pool or a transaction of it. */
export type DbOrTx = Pick<
  Database,
  | 'select'
  | 'selectDistinct'
  | 'selectDistinctOn'
  | 'insert'
  | 'update'
  | 'delete'
  | 'execute'
  | 'transaction'
>

export function databaseUrl(): string {
  const url = process.env.DATABASE_URL
  if (!url)
    throw new Error(
      'DATABASE_URL is not set. Start with `npm start` or `npm run dev`, which set it.',
    )
  return url
}

/** A pool of its own; end it with `sql.end()`. */
export function openDatabase(url: string, max = 10) {
  const sql = postgres(url, {
    max,
    connect_timeout: 5,
    // The server gives up on a query before its reader does (see db/deadline.ts).
    connection: { statement_timeout: 5_000, application_name: 'floorside' },
    onnotice: () => undefined,
  })
  return { sql, db: drizzle(sql) as Database }
}

type Opened = ReturnType<typeof openDatabase>
// Development reloads modules; the pool outlives them.
const kept = globalThis as typeof globalThis & { floorsideDatabase?: Opened }

function opened(): Opened {
  kept.floorsideDatabase ??= openDatabase(databaseUrl())
  return kept.floorsideDatabase
}

/** The process's database, opened at first use. */
export function database(): Database {
  return opened().db
}
/** postgres.js beneath it, for LISTEN and for ending. */
export function databaseSql(): Opened['sql'] {
  return opened().sql
}
