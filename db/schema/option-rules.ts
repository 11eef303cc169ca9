import { pgTable, text, unique } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'
import { memberships } from './memberships'
import { people } from './people'

/** A coach's rule for one member: this movement, this way. It stands over everything automatic. Health data. */
export const optionRules = pgTable(
  'option_rules',
  {
    id: id(),
    membershipId: text('membership_id')
      .notNull()
      .references(() => memberships.id, { onDelete: 'cascade' }),
    movement: text('movement').notNull(),
    option: text('option').notNull(),
    setBy: text('set_by').references(() => people.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [unique('option_rules_movement_key').on(table.membershipId, table.movement)],
)
