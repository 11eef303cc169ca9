import postgres from 'postgres'
import { migrateDatabase } from '@/db/migrate'
import { onDatabase, TEMPLATE, testServerUrl } from './database'

/** Makes the template that every data test's database is cloned from. */
export default async function setUp(): Promise<() => Promise<void>> {
  const url = testServerUrl()
  const admin = postgres(url, { max: 1, onnotice: () => undefined })
  await admin.unsafe(`drop database if exists ${TEMPLATE} with (force)`)
  await admin.unsafe(`create database ${TEMPLATE}`)
  await migrateDatabase(onDatabase(url, TEMPLATE))
  return async () => {
    await admin.unsafe(`drop database if exists ${TEMPLATE} with (force)`)
    await admin.end({ timeout: 5 })
  }
}
