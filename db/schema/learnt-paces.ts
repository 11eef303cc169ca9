import { jsonb, pgTable, text } from 'drizzle-orm/pg-core'
import type { LearntPacesDto } from '@/server/contract/paces'
import { instant } from './columns'
import { gyms } from './gyms'

/** What a gym's results have taught about pace, worked out anew as attempts come in. No person is in it. */
export const learntPaces = pgTable('learnt_paces', {
  gymId: text('gym_id')
    .primaryKey()
    .references(() => gyms.id, { onDelete: 'cascade' }),
  content: jsonb('content').$type<LearntPacesDto>().notNull(),
  computedAt: instant('computed_at').notNull(),
})
