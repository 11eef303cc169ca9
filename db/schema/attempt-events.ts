import { bigint, index, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core'
import type { ClassEvent } from '@/server/engine/tally/events'
import { attempts } from './attempts'
import { instant } from './columns'

export const attemptEvents = pgTable(
  'attempt_events',
  {
    attemptId: text('attempt_id')
      .notNull()
      .references(() => attempts.id, { onDelete: 'cascade' }),
    id: text('id').notNull(),
    seq: bigint('seq', { mode: 'number' }).notNull(),
    content: jsonb('content').$type<ClassEvent>().notNull(),
    receivedAt: instant('received_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.attemptId, table.id] }),
    index('attempt_events_order_idx').on(table.attemptId, table.seq),
  ],
)
