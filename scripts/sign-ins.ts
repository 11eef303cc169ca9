/** Prints the demo gym's sign-ins, where the demo gym is in the database. */
import { eq, or } from 'drizzle-orm'
import { databaseUrl, openDatabase } from '@/db/client'
import { people } from '@/db/schema/people'
import { demoSignIns } from '@/db/seed/sign-ins'

const { sql, db } = openDatabase(databaseUrl(), 1)
const there = await db
  .select({ email: people.email })
  .from(people)
  .where(or(...demoSignIns.map((one) => eq(people.email, one.email))))
await sql.end({ timeout: 5 })
const known = demoSignIns.filter((one) => there.some((row) => row.email === one.email))
if (known.length > 0) {
  console.log('Sign-ins of the demo gym (everything in it is invented):')
  for (const one of known) {
    console.log(`  ${one.email.padEnd(32)} ${one.password.padEnd(22)} ${one.name}, ${one.who}`)
  }
}
