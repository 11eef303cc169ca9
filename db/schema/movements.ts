import { boolean, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core'
import type { Movement } from '@/server/engine/spec/movement'
import { createdAt, id, instant } from './columns'
import { gyms } from './gyms'

/** The gym's library. A class that is published takes a copy; later edits do not reach it. */
export const movements = pgTable(
  'movements',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    slug: text('slug').notNull(),
    /** Came with the product and is never changed: a gym's own copy of the same slug stands before it. */
    builtIn: boolean('built_in').notNull().default(false),
    content: jsonb('content').$type<Movement>().notNull(),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (table) => [unique('movements_gym_slug_key').on(table.gymId, table.slug, table.builtIn)],
)
