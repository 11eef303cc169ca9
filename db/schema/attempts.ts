import { bigint, boolean, index, pgTable, text } from 'drizzle-orm/pg-core'
import { classVersions } from './class-versions'
import { createdAt, id, instant } from './columns'
import { gyms } from './gyms'
import { memberships } from './memberships'
import { scheduledClasses } from './scheduled-classes'

/** One run of a class by one member. Its id is a UUIDv7 made by the client. */
export const attempts = pgTable(
  'attempts',
  {
    id: id(),
    gymId: text('gym_id').notNull().references(() => gyms.id, { onDelete: 'cascade' }),
    membershipId: text('membership_id').notNull().references(() => memberships.id, { onDelete: 'cascade' }),
    scheduledClassId: text('scheduled_class_id').notNull().references(() => scheduledClasses.id, { onDelete: 'cascade' }),
    versionId: text('version_id').notNull().references(() => classVersions.id),
    /** Started after the window had closed. */
    late: boolean('late').notNull().default(false),
    /** Answer to 'anything new today?'; health data. Null: nothing new. */
    todayNote: text('today_note'),
    /** Kept beside the events so that lists need not fold: set from the events received. */
    startedAt: instant('started_at'),
    finishedAt: instant('finished_at'),
    lastEventAt: instant('last_event_at'),
    /** Grows with every change of this attempt; live pages catch up from it. */
    revision: bigint('revision', { mode: 'number' }).notNull().default(0),
    createdAt: createdAt(),
  },
  (table) => [
    index('attempts_class_idx').on(table.scheduledClassId, table.membershipId),
    index('attempts_membership_idx').on(table.membershipId, table.createdAt),
  ],
)
