import { bigint, boolean, index, pgTable, text } from 'drizzle-orm/pg-core'
import { classVersions } from './class-versions'
import type { AttemptState } from '@/server/engine/tally/types'
import { createdAt, id, instant } from './columns'
import { gyms } from './gyms'
import { memberships } from './memberships'
import { scheduledClasses } from './scheduled-classes'

/** One run of a class by one member. Its id is a UUIDv7 made by the client. */
export const attempts = pgTable(
  'attempts',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    membershipId: text('membership_id')
      .notNull()
      .references(() => memberships.id, { onDelete: 'cascade' }),
    scheduledClassId: text('scheduled_class_id')
      .notNull()
      .references(() => scheduledClasses.id, { onDelete: 'cascade' }),
    versionId: text('version_id')
      .notNull()
      .references(() => classVersions.id),
    /** Started after the window had closed. */
    late: boolean('late').notNull().default(false),
    /** Answer to 'anything new today?'; health data. Null: nothing new. */
    todayNote: text('today_note'),
    /** Kept beside the events so that lists need not fold: set from the events received. */
    startedAt: instant('started_at'),
    finishedAt: instant('finished_at'),
    lastEventAt: instant('last_event_at'),
    /** As the last event that changes it says; `state_seq` is that event's. */
    state: text('state').$type<AttemptState>().notNull().default('not-started'),
    stateSeq: bigint('state_seq', { mode: 'number' }).notNull().default(-1),
    /** How many events are stored: the revision of a board is their sum. */
    revision: bigint('revision', { mode: 'number' }).notNull().default(0),
    createdAt: createdAt(),
  },
  (table) => [
    index('attempts_class_idx').on(table.scheduledClassId, table.membershipId),
    index('attempts_membership_idx').on(table.membershipId, table.createdAt),
  ],
)
