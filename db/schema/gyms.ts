import { integer, pgTable, text } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'

export const gyms = pgTable('gyms', {
  id: id(),
  name: text('name').notNull(),
  place: text('place').notNull().default(''),
  /** IANA name. Class days and windows are in this zone. */
  timeZone: text('time_zone').notNull(),
  /** Shown when a member stops; null shows 'your local emergency number'. */
  emergencyNumber: text('emergency_number'),
  healthIntervalDays: integer('health_interval_days').notNull().default(90),
  createdAt: createdAt(),
})
