import { index, jsonb, pgTable, text } from 'drizzle-orm/pg-core'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { createdAt, id } from './columns'
import { gyms } from './gyms'
import { people } from './people'

/** A published version: one immutable row (a trigger refuses updates), spec and movements frozen together. */
export const classVersions = pgTable(
  'class_versions',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    /** The class that this is a version of; versions of one class share it. */
    classId: text('class_id').notNull(),
    content: jsonb('content').$type<PublishedVersion>().notNull(),
    publishedBy: text('published_by').references(() => people.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [index('class_versions_gym_idx').on(table.gymId, table.classId)],
)
