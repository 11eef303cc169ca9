import { index, pgTable, text } from 'drizzle-orm/pg-core'
import type { HurtPlace } from '@/server/engine/tally/events'
import { createdAt, id, instant } from './columns'
import { attempts } from './attempts'
import { memberships } from './memberships'

/** 'This hurts': the easier option stays until member and coach have both cleared it. Health data. */
export const hurtHolds = pgTable(
  'hurt_holds',
  {
    /** The id of the event that raised it. */
    id: id(),
    membershipId: text('membership_id')
      .notNull()
      .references(() => memberships.id, { onDelete: 'cascade' }),
    attemptId: text('attempt_id').references(() => attempts.id, { onDelete: 'set null' }),
    place: text('place').$type<HurtPlace>().notNull(),
    memberClearedAt: instant('member_cleared_at'),
    coachClearedAt: instant('coach_cleared_at'),
    createdAt: createdAt(),
  },
  (table) => [index('hurt_holds_membership_idx').on(table.membershipId)],
)
