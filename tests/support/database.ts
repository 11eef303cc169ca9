/** A migrated PostgreSQL database for each test file: cloned from a template that the set-up made once. */
import { randomUUID } from 'node:crypto'
import postgres from 'postgres'
import { openDatabase, type Database } from '@/db/client'

/** Named by the set-up, so that two runs on one server do not meet. */
export const TEMPLATE_VARIABLE = 'FLOORSIDE_TEST_TEMPLATE'

/** The server on which tests make their databases. Throws a sentence where none is named. */
export function testServerUrl(): string {
  const url = process.env.TEST_DATABASE_URL
  if (!url) {
    throw new Error(
      'Data tests need a PostgreSQL: run `npm test`, which starts one, or set TEST_DATABASE_URL to a server on which databases may be made.',
    )
  }
  return url
}

/** `url` with another database's name. */
export function onDatabase(url: string, name: string): string {
  const other = new URL(url)
  other.pathname = `/${name}`
  return other.toString()
}

export interface TestDatabase {
  url: string
  db: Database
  sql: ReturnType<typeof openDatabase>['sql']
  end(): Promise<void>
}

/** A database of one's own; `end` removes it. */
export async function makeTestDatabase(): Promise<TestDatabase> {
  const name = `floorside_test_${randomUUID().replaceAll('-', '')}`
  const admin = postgres(testServerUrl(), { max: 1, onnotice: () => undefined })
  await admin.unsafe(`create database ${name} template ${process.env[TEMPLATE_VARIABLE]}`)
  const url = onDatabase(testServerUrl(), name)
  const { sql, db } = openDatabase(url, 8)
  return {
    url,
    db,
    sql,
    async end() {
      await sql.end({ timeout: 5 })
      await admin.unsafe(`drop database if exists ${name} with (force)`)
      await admin.end({ timeout: 5 })
    },
  }
}
