import { date, index, pgTable, text } from 'drizzle-orm/pg-core'
import { classVersions } from './class-versions'
import { createdAt, id, instant } from './columns'
import { gyms } from './gyms'
import { people } from './people'

/** A published version on a date of the gym's, with the window in which it is meant to be done. */
export const scheduledClasses = pgTable(
  'scheduled_classes',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    versionId: text('version_id')
      .notNull()
      .references(() => classVersions.id),
    /** The gym's local date, yyyy-mm-dd. */
    day: date('day', { mode: 'string' }).notNull(),
    opensAt: instant('opens_at').notNull(),
    closesAt: instant('closes_at').notNull(),
    /** Null: every member of the gym. */
    group: text('group_name'),
    coachId: text('coach_id').references(() => people.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [index('scheduled_classes_gym_day_idx').on(table.gymId, table.day)],
)
