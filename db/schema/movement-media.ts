import { integer, pgTable, text, unique } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'
import { gyms } from './gyms'
import { people } from './people'

/** A coach's clip or picture of one option of a movement; the bytes lie in object storage under the keys. */
export const movementMedia = pgTable(
  'movement_media',
  {
    id: id(),
    gymId: text('gym_id')
      .notNull()
      .references(() => gyms.id, { onDelete: 'cascade' }),
    movement: text('movement').notNull(),
    option: text('option').notNull(),
    kind: text('kind').$type<'clip' | 'picture'>().notNull(),
    contentType: text('content_type').notNull(),
    bytes: integer('bytes').notNull(),
    storageKey: text('storage_key').notNull(),
    /** A still of a clip, JPEG; null for a picture. */
    posterKey: text('poster_key'),
    uploadedBy: text('uploaded_by').references(() => people.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
  },
  (table) => [unique('movement_media_option_key').on(table.gymId, table.movement, table.option)],
)
