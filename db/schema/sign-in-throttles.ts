import { index, integer, pgTable, text } from 'drizzle-orm/pg-core'
import { instant } from './columns'

/** Sign-ins tried by key: a digest of an account, an address, or both together. */
export const signInThrottles = pgTable(
  'sign_in_throttles',
  {
    key: text('key').primaryKey(),
    failures: integer('failures').notNull(),
    lastFailureAt: instant('last_failure_at').notNull(),
    blockedUntil: instant('blocked_until').notNull(),
  },
  // Old ones are swept away.
  (table) => [index('sign_in_throttles_last_failure_idx').on(table.lastFailureAt)],
)
