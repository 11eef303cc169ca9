/** Column helpers that every table shares. */
import { text, timestamp } from 'drizzle-orm/pg-core'

/** Instants are kept to the millisecond: JavaScript dates drop the rest and keyset pages would skip rows. */
export const instant = (name: string) => timestamp(name, { precision: 3, withTimezone: true })
export const createdAt = () => instant('created_at').notNull().defaultNow()
/** Ids are UUIDs as text (lucia's adapter needs text for its own; one kind throughout). */
export const id = () => text('id').primaryKey()
