import { boolean, index, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core'
import type { Reason } from '@/server/engine/spec/movement'
import { createdAt, id, instant } from './columns'
import { gyms } from './gyms'
import { people } from './people'

export type Role = 'owner' | 'coach' | 'member'

/** A person at a gym, with roles. What they own and prefer there is kept with it. */
export const memberships = pgTable(
  'memberships',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    personId: text('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    roles: jsonb('roles').$type<Role[]>().notNull(),
    /** A name for a set of members who share classes ('Evening group'). */
    group: text('group_name'),
    deactivatedAt: instant('deactivated_at'),
    /** For a member who is not an adult. */
    guardianConsentAt: instant('guardian_consent_at'),
    /** Own kit: item → how many. */
    kit: jsonb('kit').$type<Record<string, number>>().notNull().default({}),
    /** What the pieces weigh, in kilograms: item → weights. */
    kitWeights: jsonb('kit_weights').$type<Record<string, number[]>>().notNull().default({}),
    /** What the body objects to. Health data. */
    bodyNotes: jsonb('body_notes').$type<Reason[]>().notNull().default([]),
    wantsMore: boolean('wants_more').notNull().default(false),
    createdAt: createdAt(),
  },
  (table) => [
    unique('memberships_gym_person_key').on(table.gymId, table.personId),
    index('memberships_person_idx').on(table.personId),
  ],
)
