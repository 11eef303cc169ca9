import { sql } from 'drizzle-orm'
import { boolean, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'

export const people = pgTable(
  'people',
  {
    id: id(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    /** argon2id, PHC string. */
    passwordHash: text('password_hash').notNull(),
    adult: boolean('adult').notNull().default(true),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex('people_email_key').on(sql`lower(${table.email})`)],
)
