/** Database commands: `migrate`, `seed` (only into an empty database), `reset` (asks, or --yes). */
import { createInterface } from 'node:readline/promises'
import { hash } from '@node-rs/argon2'
import postgres from 'postgres'
import { databaseUrl, openDatabase } from '@/db/client'
import { migrateDatabase } from '@/db/migrate'
import { people } from '@/db/schema/people'
import { seedDemoGym } from '@/db/seed'
import { ARGON2ID } from '@/server/contract/passwords'

async function seed(url: string): Promise<string> {
  const { sql, db } = openDatabase(url, 1)
  try {
    const [someone] = await db.select({ id: people.id }).from(people).limit(1)
    if (someone) return 'The database has people in it already: nothing was put in.'
    const made = await seedDemoGym(db, {
      now: new Date(),
      hashPassword: (password) => hash(password, ARGON2ID),
    })
    return `Demo gym: ${made.people} people, ${made.classes} scheduled classes, ${made.attempts} attempts, ${made.events} events.`
  } finally {
    await sql.end({ timeout: 5 })
  }
}

async function reset(url: string, isSure: boolean): Promise<string> {
  const name = new URL(url).pathname.slice(1)
  if (!isSure) {
    if (!process.stdin.isTTY)
      return fail('Say --yes to empty the database: there is nobody here to ask.')
    const ask = createInterface({ input: process.stdin, output: process.stdout })
    const answer = await ask.question(`Remove everything in the database '${name}'? Type yes: `)
    ask.close()
    if (answer.trim().toLowerCase() !== 'yes') return 'Nothing was removed.'
  }
  const sql = postgres(url, { max: 1, onnotice: () => undefined })
  await sql`drop schema if exists public cascade`
  await sql`drop schema if exists drizzle cascade`
  await sql`create schema public`
  await sql.end({ timeout: 5 })
  await migrateDatabase(url)
  return `Emptied. ${await seed(url)}`
}

function fail(message: string): never {
  console.error(message)
  process.exit(2)
}

const [command, ...rest] = process.argv.slice(2)
try {
  const url = databaseUrl()
  if (command === 'migrate') {
    await migrateDatabase(url)
    console.log('The schema is up to date.')
  } else if (command === 'seed') console.log(await seed(url))
  else if (command === 'reset') console.log(await reset(url, rest.includes('--yes')))
  else fail('Commands: migrate, seed, reset [--yes]')
} catch (error) {
  fail(error instanceof Error ? error.message : String(error))
}
