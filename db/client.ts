/** The database of this process: one pool, one drizzle over it. */
import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js'
import type { SQL } from 'drizzle-orm'
import { PgDialect } from 'drizzle-orm/pg-core'
import postgres, { type Sql } from 'postgres'

export type Database = PostgresJsDatabase & { $client: Sql }
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

/** Whether this is the pool, and not a transaction of it. */
export function isPool(db: DbOrTx): db is Database {
  return '$client' in db
}

const dialect = new PgDialect()

/**
 * Runs a statement that is asked for again and again: the server keeps its plan for each connection,
 * which drizzle itself never asks for. Inside a transaction it runs as any other.
 */
export async function executePrepared<Row extends Record<string, unknown>>(
  db: DbOrTx,
  statement: SQL,
): Promise<Row[]> {
  if (!isPool(db)) return db.execute<Row>(statement) as Promise<unknown> as Promise<Row[]>
  const { sql, params } = dialect.sqlToQuery(statement)
  return db.$client.unsafe<Row[]>(sql, params as string[], { prepare: true })
}

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
  return { sql, db: drizzle(sql) }
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
