import { integer, pgTable, text } from 'drizzle-orm/pg-core'
import { instant } from './columns'

/** Failed sign-ins by key: a digest of an account, an address, or both together. */
export const signInThrottles = pgTable('sign_in_throttles', {
  key: text('key').primaryKey(),
  failures: integer('failures').notNull(),
  lastFailureAt: instant('last_failure_at').notNull(),
  blockedUntil: instant('blocked_until').notNull(),
})
