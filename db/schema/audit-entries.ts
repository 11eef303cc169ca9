import { index, jsonb, pgTable, text } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'

/** Who changed what. Holds ids and names of fields, never health data. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    id: id(),
    gymId: text('gym_id'),
    personId: text('person_id'),
    action: text('action').notNull(),
    subject: text('subject').notNull().default(''),
    detail: jsonb('detail').$type<Record<string, unknown>>().notNull().default({}),
    createdAt: createdAt(),
  },
  (table) => [index('audit_entries_gym_idx').on(table.gymId, table.createdAt)],
)
