import 'server-only'
/**
 * Rows of the clips and pictures of movement options. The bytes lie in object storage under the keys that stand
 * here; whoever changes a row is given the keys that nothing leads to any more.
 */
import { and, asc, eq, inArray, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { auditEntries } from '@/db/schema/audit-entries'
import { movementMedia } from '@/db/schema/movement-media'
import { movements } from '@/db/schema/movements'
import { AppError } from '@/server/contract/errors'
import { mediaPaths, optionKey, type OptionMedia } from '@/server/contract/media'
import type { MediaContentType, MediaType } from '@/server/contract/media-types'
import type { Viewer } from '@/server/contract/viewer'

export interface OptionName {
  movement: string
  option: string
}

/** An object in storage, as a row describes it. */
export interface MediaObject {
  key: string
  contentType: string
  /** Null for a still: its length is not kept. */
  bytes: number | null
  /** Changes with the bytes. */
  version: string
}

type Row = typeof movementMedia.$inferSelect

const noSuchOption = () => new AppError('not-found', 'There is no such option in the library.')
const noSuchMedia = () =>
  new AppError('not-found', 'There is no such clip or picture any more. Load the page anew.')

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw noSuchOption()
}

/** The version of a still is the end of its key. */
const posterVersion = (key: string): string => key.slice(key.lastIndexOf('/') + 1)

function mediaDto(row: Row): OptionMedia {
  return {
    mediaId: row.id,
    kind: row.kind,
    contentType: row.contentType as MediaContentType,
    bytes: row.bytes,
    url: mediaPaths.media(row.movement, row.option, row.id),
    posterUrl:
      row.posterKey === null
        ? null
        : mediaPaths.poster(row.movement, row.option, posterVersion(row.posterKey)),
  }
}

const ofOption = (gymId: string, { movement, option }: OptionName) =>
  and(
    eq(movementMedia.gymId, gymId),
    eq(movementMedia.movement, movement),
    eq(movementMedia.option, option),
  )

/** What the viewer's gym shows of these movements, by `movement/option`. For everybody of the gym. */
export const mediaOf = timed(
  async (
    viewer: Viewer,
    params: { movements: readonly string[] },
    db: DbOrTx,
  ): Promise<Record<string, OptionMedia>> => {
    if (params.movements.length === 0) return {}
    const rows = await db
      .select()
      .from(movementMedia)
      .where(
        and(
          eq(movementMedia.gymId, viewer.gymId),
          inArray(movementMedia.movement, [...params.movements]),
        ),
      )
    return Object.fromEntries(
      rows.map((row) => [optionKey(row.movement, row.option), mediaDto(row)]),
    )
  },
)

/**
 * The object to read. With `version`, exactly that one, of any gym that the viewer belongs to (a class may be
 * played in one and another looked at beside it); without, the present one of the gym they stand in. Throws
 * `not-found` for another gym's, and for one that was replaced or removed.
 */
export const getMediaObject = timed(
  async (
    viewer: Viewer,
    params: OptionName & { part: 'media' | 'poster'; version: string | null },
    db: DbOrTx,
  ): Promise<MediaObject> => {
    const gymIds = params.version === null ? [viewer.gymId] : viewer.gyms.map(({ gymId }) => gymId)
    const rows = await db
      .select()
      .from(movementMedia)
      .where(
        and(
          inArray(movementMedia.gymId, gymIds),
          eq(movementMedia.movement, params.movement),
          eq(movementMedia.option, params.option),
        ),
      )
    const found = rows
      .flatMap((row) => objectOf(row, params.part))
      .find((one) => params.version === null || one.version === params.version)
    if (!found) throw noSuchMedia()
    return found
  },
)

function objectOf(row: Row, part: 'media' | 'poster'): MediaObject[] {
  if (part === 'media') {
    const { storageKey: key, contentType, bytes, id: version } = row
    return [{ key, contentType, bytes, version }]
  }
  const key = row.posterKey
  return key === null
    ? []
    : [{ key, contentType: 'image/jpeg', bytes: null, version: posterVersion(key) }]
}

/** Throws `not-found` where the viewer is no coach or their library has no such option. */
export const mustHaveOption = timed(
  async (viewer: Viewer, params: OptionName, db: DbOrTx): Promise<void> => {
    mustCoach(viewer)
    // The gym's own stands before the built-in of the same slug.
    const [found] = await db
      .select({ content: movements.content })
      .from(movements)
      .where(and(eq(movements.gymId, viewer.gymId), eq(movements.slug, params.movement)))
      .orderBy(asc(movements.builtIn))
      .limit(1)
    if (!found?.content.options.some((one) => one.option === params.option)) throw noSuchOption()
  },
)

/** Changes of one option's media come one after the other, so that no key is lost between two coaches. */
async function inTurn<T>(
  viewer: Viewer,
  name: OptionName,
  db: DbOrTx,
  work: (tx: DbOrTx, present: Row | undefined) => Promise<T>,
): Promise<T> {
  mustCoach(viewer)
  const lock = `media ${viewer.gymId} ${optionKey(name.movement, name.option)}`
  return db.transaction(async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${lock}, 0))`)
    const [present] = await tx.select().from(movementMedia).where(ofOption(viewer.gymId, name))
    return work(tx, present)
  })
}

async function audit(
  viewer: Viewer,
  entry: { action: 'added' | 'replaced' | 'removed' | 'still-set'; row: Row },
  tx: DbOrTx,
): Promise<void> {
  const { id: mediaId, movement, option, kind, bytes } = entry.row
  await tx.insert(auditEntries).values({
    id: v7(),
    gymId: viewer.gymId,
    personId: viewer.personId,
    action: `media.${entry.action}`,
    subject: optionKey(movement, option),
    detail: { mediaId, kind, bytes },
  })
}

const keysOf = (row: Row | undefined): string[] =>
  row ? [row.storageKey, row.posterKey].filter((key) => key !== null) : []

/**
 * Puts a stored file in the place of whatever the option had. `unused`: the keys of that. Throws `not-found` as
 * `mustHaveOption` does, and then the file stored is used by nobody.
 */
export const setMedia = timed(
  async (
    viewer: Viewer,
    params: OptionName & {
      mediaId: string
      type: MediaType
      bytes: number
      storageKey: string
      now: Date
    },
    db: DbOrTx,
  ): Promise<{ media: OptionMedia; unused: string[] }> =>
    inTurn(viewer, params, db, async (tx, present) => {
      // It may have been taken out of the movement while the file was on its way.
      await mustHaveOption(viewer, params, tx)
      const row: Row = {
        id: params.mediaId,
        gymId: viewer.gymId,
        movement: params.movement,
        option: params.option,
        kind: params.type.kind,
        contentType: params.type.contentType,
        bytes: params.bytes,
        storageKey: params.storageKey,
        posterKey: null,
        uploadedBy: viewer.personId,
        createdAt: params.now,
      }
      if (present) await tx.delete(movementMedia).where(eq(movementMedia.id, present.id))
      await tx.insert(movementMedia).values(row)
      await audit(viewer, { action: present ? 'replaced' : 'added', row }, tx)
      return { media: mediaDto(row), unused: keysOf(present) }
    }),
)

/**
 * Gives a clip its still. `unused`: the key of the one before. Throws `conflict` where the clip was replaced or
 * removed meanwhile, `bad-input` for a picture, which is its own.
 */
export const setPoster = timed(
  async (
    viewer: Viewer,
    params: OptionName & { mediaId: string; posterKey: string },
    db: DbOrTx,
  ): Promise<{ media: OptionMedia; unused: string[] }> =>
    inTurn(viewer, params, db, async (tx, present) => {
      const clip = clipOf(present, params.mediaId)
      const row: Row = { ...clip, posterKey: params.posterKey }
      await tx
        .update(movementMedia)
        .set({ posterKey: params.posterKey })
        .where(eq(movementMedia.id, row.id))
      await audit(viewer, { action: 'still-set', row }, tx)
      return { media: mediaDto(row), unused: clip.posterKey === null ? [] : [clip.posterKey] }
    }),
)

/** Throws as `setPoster` does, before anything is stored. */
export const mustHaveClip = timed(
  async (viewer: Viewer, params: OptionName & { mediaId: string }, db: DbOrTx): Promise<void> => {
    await mustHaveOption(viewer, params, db)
    const [present] = await db.select().from(movementMedia).where(ofOption(viewer.gymId, params))
    clipOf(present, params.mediaId)
  },
)

function clipOf(present: Row | undefined, mediaId: string): Row {
  if (present?.id !== mediaId) {
    throw new AppError(
      'conflict',
      'This clip was replaced or removed meanwhile. Load the page anew; the clip that is there keeps its own still.',
    )
  }
  if (present.kind !== 'clip') throw new AppError('bad-input', 'A picture needs no still.')
  return present
}

/** Removes what the option has; repeating it changes nothing. `unused`: the keys of it. */
export const removeMedia = timed(
  async (viewer: Viewer, params: OptionName, db: DbOrTx): Promise<{ unused: string[] }> =>
    inTurn(viewer, params, db, async (tx, present) => {
      if (!present) {
        await mustHaveOption(viewer, params, tx)
        return { unused: [] }
      }
      await tx.delete(movementMedia).where(eq(movementMedia.id, present.id))
      await audit(viewer, { action: 'removed', row: present }, tx)
      return { unused: keysOf(present) }
    }),
)
