import { index, jsonb, pgTable, text } from 'drizzle-orm/pg-core'
import type { HealthAnswers } from '@/server/engine/fit/screening'
import { createdAt, id, instant } from './columns'
import { memberships } from './memberships'

/** Every set of answers is kept; the latest counts. Health data. */
export const healthAnswers = pgTable(
  'health_answers',
  {
    id: id(),
    membershipId: text('membership_id')
      .notNull()
      .references(() => memberships.id, { onDelete: 'cascade' }),
    answers: jsonb('answers').$type<HealthAnswers>().notNull(),
    /** When the member stated that a licensed professional has cleared them. */
    clearedAt: instant('cleared_at'),
    /** Limits chosen instead of clearance. */
    limits: jsonb('limits').$type<string[]>().notNull().default([]),
    createdAt: createdAt(),
  },
  (table) => [index('health_answers_membership_idx').on(table.membershipId, table.createdAt)],
)
