import 'server-only'
/** The gym's movement library. For its coaches. */
import { and, asc, count, desc, eq, gt, inArray, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { auditEntries } from '@/db/schema/audit-entries'
import { classVersions } from '@/db/schema/class-versions'
import { movements } from '@/db/schema/movements'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { AppError } from '@/server/contract/errors'
import { freeSlug, type MovementChange } from '@/server/contract/library'
import type { LibraryMovement, LibraryRow } from '@/server/contract/library-types'
import { filterLibrary, type LibraryFilter } from '@/server/contract/library-filter'
import type { Viewer } from '@/server/contract/viewer'
import type { Movement } from '@/server/engine/spec/movement'
import { AS_PLANNED, PATTERNS } from '@/server/engine/spec/names'

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw notThere()
}

function notThere(): AppError {
  return new AppError('not-found', 'There is no such movement in the library.')
}

/** An address of its own that no movement may take. */
const RESERVED = ['new']

const originOf = (builtIn: boolean, hasBuiltIn: boolean): LibraryRow['origin'] =>
  builtIn ? 'built-in' : hasBuiltIn ? 'copy' : 'own'

/** Whether there is a built-in of the row's slug; asked before the gym's own hides it. */
const hasBuiltIn = sql<boolean>`bool_or(${movements.builtIn}) over (partition by ${movements.slug})`

/**
 * The gym's movements that the filter asks for, one a slug (its own before the built-in), by pattern and
 * name. Throws `not-found` for anybody who is no coach.
 */
export const listLibrary = timed(
  async (viewer: Viewer, filter: LibraryFilter, db: DbOrTx): Promise<LibraryRow[]> => {
    mustCoach(viewer)
    const part = <T>(path: string) => sql<T>`${movements.content}->${sql.raw(`'${path}'`)}`
    const word = <T>(path: string) => sql<T>`${movements.content}->>${sql.raw(`'${path}'`)}`
    const everyOption = (key: string) =>
      sql<
        string[]
      >`jsonb_path_query_array(${movements.content}, ${sql.raw(`'$.options[*].${key}'`)})`
    const rows = await db
      .selectDistinctOn([movements.slug], {
        slug: movements.slug,
        builtIn: movements.builtIn,
        hasBuiltIn,
        archivedAt: movements.archivedAt,
        name: word<string>('name'),
        pattern: word<LibraryRow['pattern']>('pattern'),
        position: word<LibraryRow['position']>('position'),
        impact: word<LibraryRow['impact']>('impact'),
        figure: word<string | null>('figure'),
        joints: part<LibraryRow['joints']>('joints'),
        kit: part<string[]>('kit'),
        optionSlugs: everyOption('option'),
        optionNames: everyOption('name'),
      })
      .from(movements)
      .where(eq(movements.gymId, viewer.gymId))
      .orderBy(movements.slug, asc(movements.builtIn))
    return filterLibrary(
      rows.map(({ builtIn, hasBuiltIn, archivedAt, optionSlugs, optionNames, ...row }) => ({
        ...row,
        options: optionNames.length,
        optionNames: optionNames.filter((_, index) => optionSlugs[index] !== AS_PLANNED),
        origin: originOf(builtIn, hasBuiltIn),
        archived: archivedAt !== null,
      })),
      filter,
    ).sort(
      (a, b) =>
        PATTERNS.indexOf(a.pattern) - PATTERNS.indexOf(b.pattern) || a.name.localeCompare(b.name),
    )
  },
)

interface Found {
  id: string
  content: Movement
  builtIn: boolean
  hasBuiltIn: boolean
  archivedAt: Date | null
  token: string
}

/** The row that stands for a slug in the viewer's gym. */
async function find(viewer: Viewer, slug: string, db: DbOrTx): Promise<Found> {
  const [row] = await db
    .select({
      id: movements.id,
      content: movements.content,
      builtIn: movements.builtIn,
      hasBuiltIn,
      archivedAt: movements.archivedAt,
      token: sql<string>`md5(${movements.id} || ${movements.content}::text)`,
    })
    .from(movements)
    .where(and(eq(movements.gymId, viewer.gymId), eq(movements.slug, slug)))
    .orderBy(asc(movements.builtIn))
    .limit(1)
  if (!row) throw notThere()
  return row
}

/** Whether a version has the movement at a station. */
const versionHas = (slug: string) =>
  sql`jsonb_path_exists(${classVersions.content}, '$.spec.blocks[*].format.stations[*].movement ? (@ == $slug)', ${JSON.stringify({ slug })}::jsonb)`

/** One movement and where it is used. Throws `not-found` for another gym's, none, or to no coach. */
export const getMovement = timed(
  async (
    viewer: Viewer,
    params: { slug: string; now: Date },
    db: DbOrTx,
  ): Promise<LibraryMovement> => {
    mustCoach(viewer)
    const found = await find(viewer, params.slug, db)
    const latest = db
      .selectDistinctOn([classVersions.classId], { id: classVersions.id })
      .from(classVersions)
      .where(eq(classVersions.gymId, viewer.gymId))
      .orderBy(classVersions.classId, desc(classVersions.createdAt), desc(classVersions.id))
    const title = sql<string>`${classVersions.content}->'spec'->>'title'`
    const usedIn = await db
      .select({ classId: classVersions.classId, title })
      .from(classVersions)
      .where(and(inArray(classVersions.id, latest), versionHas(params.slug)))
      .orderBy(title)
    const [dates] = await db
      .select({ ahead: count() })
      .from(scheduledClasses)
      .innerJoin(classVersions, eq(classVersions.id, scheduledClasses.versionId))
      .where(
        and(
          eq(scheduledClasses.gymId, viewer.gymId),
          gt(scheduledClasses.opensAt, params.now),
          versionHas(params.slug),
        ),
      )
    return {
      movement: found.content,
      origin: originOf(found.builtIn, found.hasBuiltIn),
      archived: found.archivedAt !== null,
      token: found.token,
      usedIn,
      ahead: dates?.ahead ?? 0,
    }
  },
)

// ---------------------------------------------------------------------------------------------
// Changes

/** Changes of one gym's library come one after the other, so that the second of two is told of the first. */
async function inTurn<T>(viewer: Viewer, db: DbOrTx, work: (tx: DbOrTx) => Promise<T>): Promise<T> {
  mustCoach(viewer)
  return db.transaction(async (tx) => {
    await tx.execute(
      sql`select pg_advisory_xact_lock(hashtextextended(${`library ${viewer.gymId}`}, 0))`,
    )
    return work(tx)
  })
}

async function audit(
  viewer: Viewer,
  entry: { action: string; slug: string; detail?: Record<string, unknown> },
  tx: DbOrTx,
): Promise<void> {
  await tx.insert(auditEntries).values({
    id: v7(),
    gymId: viewer.gymId,
    personId: viewer.personId,
    action: `movement.${entry.action}`,
    subject: entry.slug,
    detail: entry.detail ?? {},
  })
}

/** Throws `conflict`, and by whom, where the row is no longer what `basedOn` stands for. */
async function mustBe(
  viewer: Viewer,
  slug: string,
  found: Found,
  basedOn: string | null,
  tx: DbOrTx,
): Promise<void> {
  if (found.token === basedOn) return
  const [last] = await tx
    .select({ by: people.name, personId: people.id })
    .from(auditEntries)
    .innerJoin(people, eq(people.id, auditEntries.personId))
    .where(
      and(
        eq(auditEntries.gymId, viewer.gymId),
        eq(auditEntries.subject, slug),
        sql`${auditEntries.action} like 'movement.%'`,
      ),
    )
    .orderBy(desc(auditEntries.createdAt), desc(auditEntries.id))
    .limit(1)
  const by = last === undefined ? 'somebody' : last.personId === viewer.personId ? 'you' : last.by
  throw new AppError(
    'conflict',
    `This movement was changed by ${by} meanwhile, and nothing of yours was saved yet.`,
    { fields: { basedOn: 'It was changed meanwhile.' } },
  )
}

/** The same text for the same content, whatever the order of its keys. */
function canonical(value: unknown): string {
  return JSON.stringify(value, (_key, one: unknown) =>
    typeof one === 'object' && one !== null && !Array.isArray(one)
      ? Object.fromEntries(Object.entries(one).sort(([a], [b]) => (a < b ? -1 : 1)))
      : one,
  )
}

/** A movement with its lists of words in one order: a form gives them in its own, which changes nothing. */
function ordered(movement: Movement): Movement {
  const { muscles } = movement
  return {
    ...movement,
    joints: [...movement.joints].sort(),
    kit: [...movement.kit].sort(),
    ...(muscles && {
      muscles: {
        primary: [...muscles.primary].sort(),
        secondary: [...muscles.secondary].sort(),
      },
    }),
    options: movement.options.map((one) => ({ ...one, reasons: [...one.reasons].sort() })),
  }
}

/** Names of the fields that differ. */
function changedFields(before: Movement, after: Movement): string[] {
  const [one, other] = [ordered(before), ordered(after)]
  const keys = new Set([...Object.keys(one), ...Object.keys(other)]) as Set<keyof Movement>
  return [...keys].filter((key) => canonical(one[key]) !== canonical(other[key]))
}

function movementOf(slug: string, { options, ...fields }: MovementChange['fields']): Movement {
  const taken = new Set(options.map((one) => one.option).filter(Boolean))
  return {
    slug,
    ...fields,
    options: options.map((one) => {
      const option = one.option || freeSlug(one.name, taken, 'option')
      taken.add(option)
      return { ...one, option }
    }),
  }
}

/**
 * Creates a movement (`slug` null) or changes one: a built-in gets a copy of the gym's own, which stands
 * before it; an own one is changed. The slug stays, and so do published versions. Throws `bad-input` where
 * another movement has the name, `conflict` where it is not what `basedOn` stands for, unless `over`.
 */
export const saveMovement = timed(
  async (viewer: Viewer, params: MovementChange, db: DbOrTx): Promise<{ slug: string }> =>
    inTurn(viewer, db, async (tx) => {
      const all = await tx
        .selectDistinctOn([movements.slug], {
          slug: movements.slug,
          name: sql<string>`${movements.content}->>'name'`,
        })
        .from(movements)
        .where(eq(movements.gymId, viewer.gymId))
        .orderBy(movements.slug, asc(movements.builtIn))
      const wanted = params.fields.name.toLocaleLowerCase('en')
      if (
        all.some((one) => one.slug !== params.slug && one.name.toLocaleLowerCase('en') === wanted)
      ) {
        throw new AppError('bad-input', 'The movement was not saved.', {
          fields: { name: 'Another movement of your library has this name.' },
        })
      }
      if (params.slug === null) {
        const taken = new Set([...RESERVED, ...all.map((one) => one.slug)])
        const slug = freeSlug(params.fields.name, taken, 'movement')
        const content = movementOf(slug, params.fields)
        await tx.insert(movements).values({ id: v7(), gymId: viewer.gymId, slug, content })
        await audit(viewer, { action: 'created', slug }, tx)
        return { slug }
      }
      const { slug } = params
      const found = await find(viewer, slug, tx)
      if (!params.over) await mustBe(viewer, slug, found, params.basedOn, tx)
      const content = movementOf(slug, params.fields)
      const fields = changedFields(found.content, content)
      if (fields.length === 0) return { slug }
      if (found.builtIn) {
        await tx.insert(movements).values({
          id: v7(),
          gymId: viewer.gymId,
          slug,
          content,
          archivedAt: found.archivedAt,
        })
      } else {
        await tx
          .update(movements)
          .set({ content })
          .where(and(eq(movements.id, found.id), eq(movements.gymId, viewer.gymId)))
      }
      await audit(
        viewer,
        { action: found.builtIn ? 'copied' : 'changed', slug, detail: { fields } },
        tx,
      )
      return { slug }
    }),
)

/** Puts a movement away, or brings it back: it and the built-in behind it. Repeating changes nothing. */
const setArchived = (action: 'archived' | 'brought-back') =>
  timed(async (viewer: Viewer, params: { slug: string; now: Date }, db: DbOrTx): Promise<void> =>
    inTurn(viewer, db, async (tx) => {
      const found = await find(viewer, params.slug, tx)
      const archives = action === 'archived'
      if ((found.archivedAt !== null) === archives) return
      await tx
        .update(movements)
        .set({ archivedAt: archives ? params.now : null })
        .where(and(eq(movements.gymId, viewer.gymId), eq(movements.slug, params.slug)))
      await audit(viewer, { action, slug: params.slug }, tx)
    }),
  )
export const archiveMovement = setArchived('archived')
export const bringBackMovement = setArchived('brought-back')

/**
 * Removes the gym's own copy, so that the built-in stands there again. Throws `conflict` where the copy is
 * not what `basedOn` stands for, `bad-input` where there is no built-in behind it.
 */
export const backToBuiltIn = timed(
  async (viewer: Viewer, params: { slug: string; basedOn: string }, db: DbOrTx): Promise<void> =>
    inTurn(viewer, db, async (tx) => {
      const found = await find(viewer, params.slug, tx)
      if (!found.hasBuiltIn) {
        throw new AppError('bad-input', 'This movement is your gym’s own: archive it instead.')
      }
      if (found.builtIn) return
      await mustBe(viewer, params.slug, found, params.basedOn, tx)
      await tx
        .delete(movements)
        .where(and(eq(movements.id, found.id), eq(movements.gymId, viewer.gymId)))
      // What was written is kept in the trail: a copy that was removed in error can be read there.
      await audit(
        viewer,
        { action: 'back-to-built-in', slug: params.slug, detail: { removed: found.content } },
        tx,
      )
    }),
)
