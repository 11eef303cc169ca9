import { randomUUID } from 'node:crypto'
import postgres from 'postgres'
import { migrateDatabase } from '@/db/migrate'
import { onDatabase, TEMPLATE_VARIABLE, testServerUrl } from './database'

/** Makes the template that every data test's database is cloned from. */
export default async function setUp(): Promise<() => Promise<void>> {
  const url = testServerUrl()
  const template = `floorside_template_${randomUUID().replaceAll('-', '')}`
  process.env[TEMPLATE_VARIABLE] = template
  const admin = postgres(url, { max: 1, onnotice: () => undefined })
  await admin.unsafe(`create database ${template}`)
  await migrateDatabase(onDatabase(url, template))
  return async () => {
    await admin.unsafe(`drop database if exists ${template} with (force)`)
    await admin.end({ timeout: 5 })
  }
}
