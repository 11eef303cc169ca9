import 'server-only'
/** Classes of the gym and their published versions. For its coaches. */
import { and, count, desc, eq, gt, inArray, notExists, sql } from 'drizzle-orm'
import { v7 } from 'uuid'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attempts } from '@/db/schema/attempts'
import { auditEntries } from '@/db/schema/audit-entries'
import { classVersions } from '@/db/schema/class-versions'
import { people } from '@/db/schema/people'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { AppError } from '@/server/contract/errors'
import type { PlannedClass, PlannedClassSummary } from '@/server/contract/planned-classes'
import type { Viewer } from '@/server/contract/viewer'
import { cuesFromCaptions } from '@/server/engine/captions/import'
import { check } from '@/server/engine/spec/problems'
import type { SessionSpec } from '@/server/engine/spec/schema'
import { realLengthMs } from '@/server/engine/timeline/compile'

function mustCoach(viewer: Viewer): void {
  if (!viewer.roles.includes('coach')) throw new AppError('not-found', 'There is no such class.')
}

/** How often each class is scheduled from `now` on. */
async function aheadOf(
  db: DbOrTx,
  gymId: string,
  now: Date,
  classId?: string,
): Promise<Map<string, number>> {
  const rows = await db
    .select({ classId: classVersions.classId, ahead: count() })
    .from(scheduledClasses)
    .innerJoin(classVersions, eq(classVersions.id, scheduledClasses.versionId))
    .where(
      and(
        eq(scheduledClasses.gymId, gymId),
        gt(scheduledClasses.opensAt, now),
        classId === undefined ? undefined : eq(classVersions.classId, classId),
      ),
    )
    .groupBy(classVersions.classId)
  return new Map(rows.map((row) => [row.classId, row.ahead]))
}

/** The gym's classes, the one published last first. Throws `not-found` for anybody who is no coach. */
export const listPlannedClasses = timed(
  async (viewer: Viewer, params: { now: Date }, db: DbOrTx): Promise<PlannedClassSummary[]> => {
    mustCoach(viewer)
    const latest = await db
      .selectDistinctOn([classVersions.classId], {
        classId: classVersions.classId,
        content: classVersions.content,
        publishedAt: classVersions.createdAt,
        publishedBy: people.name,
      })
      .from(classVersions)
      .leftJoin(people, eq(people.id, classVersions.publishedBy))
      .where(eq(classVersions.gymId, viewer.gymId))
      .orderBy(classVersions.classId, desc(classVersions.createdAt), desc(classVersions.id))
    const versions = await db
      .select({ classId: classVersions.classId, versions: count() })
      .from(classVersions)
      .where(eq(classVersions.gymId, viewer.gymId))
      .groupBy(classVersions.classId)
    const ahead = await aheadOf(db, viewer.gymId, params.now)
    return latest
      .map(({ classId, content, publishedAt, publishedBy }) => ({
        classId,
        title: content.spec.title,
        focus: content.spec.focus ?? null,
        realLengthMs: realLengthMs(content),
        versions: versions.find((one) => one.classId === classId)?.versions ?? 1,
        publishedAt: publishedAt.toISOString(),
        publishedBy,
        ahead: ahead.get(classId) ?? 0,
      }))
      .sort((a, b) => b.publishedAt.localeCompare(a.publishedAt) || a.title.localeCompare(b.title))
  },
)

/** One class with its latest version. Throws `not-found` for another gym's, none, or to no coach. */
export const getPlannedClass = timed(
  async (
    viewer: Viewer,
    params: { classId: string; now: Date },
    db: DbOrTx,
  ): Promise<PlannedClass> => {
    mustCoach(viewer)
    const rows = await db
      .select({
        versionId: classVersions.id,
        publishedAt: classVersions.createdAt,
        publishedBy: people.name,
      })
      .from(classVersions)
      .leftJoin(people, eq(people.id, classVersions.publishedBy))
      .where(and(eq(classVersions.gymId, viewer.gymId), eq(classVersions.classId, params.classId)))
      .orderBy(desc(classVersions.createdAt), desc(classVersions.id))
    const [latest] = rows
    const [content] = latest
      ? await db
          .select({ version: classVersions.content })
          .from(classVersions)
          .where(eq(classVersions.id, latest.versionId))
      : []
    if (!latest || !content) throw new AppError('not-found', 'There is no such class.')
    const ahead = await aheadOf(db, viewer.gymId, params.now, params.classId)
    return {
      classId: params.classId,
      versionId: latest.versionId,
      version: content.version,
      versions: rows.map(({ versionId, publishedAt, publishedBy }) => ({
        versionId,
        publishedAt: publishedAt.toISOString(),
        publishedBy,
      })),
      ahead: ahead.get(params.classId) ?? 0,
    }
  },
)

/**
 * Publishes `spec` as a new version of a class, with the movements that its last version froze. Attempts
 * keep their version; with `ahead` the dates ahead that nobody has begun take the new one. Throws
 * `bad-input` for a spec with problems or an unknown movement, `conflict` where another version was
 * published since `basedOn`.
 */
export const publishVersion = timed(
  async (
    viewer: Viewer,
    params: { classId: string; basedOn: string; spec: SessionSpec; ahead: boolean; now: Date },
    db: DbOrTx,
  ): Promise<{ versionId: string; moved: number }> => {
    mustCoach(viewer)
    const { classId, basedOn, spec, now } = params
    const [problem] = check(spec)
    if (problem) {
      throw new AppError('bad-input', `This class cannot be published: ${problem.message}`)
    }
    return db.transaction(async (tx) => {
      // Two coaches who publish at once come one after the other, and the second is told.
      await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${classId}, 0))`)
      const base = await getPlannedClass(viewer, { classId, now }, tx)
      if (base.versionId !== basedOn) {
        const by = base.versions[0]?.publishedBy ?? 'another coach'
        throw new AppError(
          'conflict',
          `A newer version was published by ${by} meanwhile. Load the page anew and do this again; nothing was changed.`,
        )
      }
      const used = new Set(
        spec.blocks.flatMap((block) =>
          block.format.type === 'rest' ? [] : block.format.stations.map((one) => one.movement),
        ),
      )
      const movements = base.version.movements.filter((one) => used.has(one.slug))
      if (movements.length < used.size) {
        throw new AppError('bad-input', 'This class names a movement that the library has not.')
      }
      const versionId = v7()
      await tx.insert(classVersions).values({
        id: versionId,
        gymId: viewer.gymId,
        classId,
        content: { spec, movements },
        publishedBy: viewer.personId,
        createdAt: now,
      })
      const moved = params.ahead
        ? await tx
            .update(scheduledClasses)
            .set({ versionId })
            .where(
              and(
                eq(scheduledClasses.gymId, viewer.gymId),
                gt(scheduledClasses.opensAt, now),
                inArray(
                  scheduledClasses.versionId,
                  base.versions.map((one) => one.versionId),
                ),
                notExists(
                  tx
                    .select({ id: attempts.id })
                    .from(attempts)
                    .where(eq(attempts.scheduledClassId, scheduledClasses.id)),
                ),
              ),
            )
            .returning({ id: scheduledClasses.id })
        : []
      await tx.insert(auditEntries).values({
        id: v7(),
        gymId: viewer.gymId,
        personId: viewer.personId,
        action: 'class.published',
        subject: classId,
        detail: { versionId, basedOn, moved: moved.length },
      })
      return { versionId, moved: moved.length }
    })
  },
)

/**
 * Publishes a new version with cues read from WebVTT text added to one block. Throws `bad-input` where
 * the text gives no cue, and as `publishVersion` does.
 */
export const addCaptions = timed(
  async (
    viewer: Viewer,
    params: {
      classId: string
      basedOn: string
      block: string
      timesFrom: 'block' | 'class'
      captions: string
      ahead: boolean
      now: Date
    },
    db: DbOrTx,
  ): Promise<{ cues: number; moved: number }> => {
    const { version } = await getPlannedClass(viewer, params, db)
    const { timesFrom } = params
    const { cues, notCarried } = cuesFromCaptions(version, params.block, params.captions, {
      timesFrom,
    })
    if (cues.length === 0) {
      const why = notCarried[0]?.what ?? 'It holds no cues.'
      throw new AppError('bad-input', 'The cues were not imported.', {
        fields: { captions: `No cue could be read from this. ${why}` },
      })
    }
    const blocks = version.spec.blocks.map((block) =>
      block.id === params.block ? { ...block, cues: [...(block.cues ?? []), ...cues] } : block,
    )
    const spec = { ...version.spec, blocks }
    const { moved } = await publishVersion(viewer, { ...params, spec }, db)
    return { cues: cues.length, moved }
  },
)
