import { index, pgTable, text } from 'drizzle-orm/pg-core'
import { createdAt, instant } from './columns'
import { gyms } from './gyms'
import { people } from './people'

/** lucia's sessions. The id is the SHA-256 of the token in the cookie, never the token. */
export const signInSessions = pgTable(
  'sign_in_sessions',
  {
    id: text('id').primaryKey(),
    userId: text('user_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    expiresAt: instant('expires_at').notNull(),
    /** Nothing lengthens a session beyond this. */
    absoluteExpiresAt: instant('absolute_expires_at').notNull(),
    /** The gym that this session stands in; switched by the person. */
    gymId: text('gym_id').references(() => gyms.id, { onDelete: 'set null' }),
    userAgent: text('user_agent').notNull().default(''),
    createdAt: createdAt(),
  },
  (table) => [index('sign_in_sessions_user_idx').on(table.userId)],
)
