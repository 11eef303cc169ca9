import 'server-only'
/** What the gym's results have taught about pace. Figures of a gym, in which no person can be seen. */
import { and, desc, eq, gt, inArray } from 'drizzle-orm'
import type { DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { attemptEvents } from '@/db/schema/attempt-events'
import { attempts } from '@/db/schema/attempts'
import { learntPaces } from '@/db/schema/learnt-paces'
import type { ForecastDto, LearntPacesDto } from '@/server/contract/paces'
import type { Viewer } from '@/server/contract/viewer'
import { forecast } from '@/server/engine/pace/forecast'
import { learnPaces, observedBlocks, paceKey } from '@/server/engine/pace/learn'
import { TIRING } from '@/server/engine/pace/walk'
import { AS_PLANNED } from '@/server/engine/spec/names'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'
import { versionsOf } from './classes'

/** Enough for the middle of any figure, and quickly read. */
const MOST_ATTEMPTS = 300
/** Results change a figure slowly: it is worked out anew at most this often. */
const FRESH_MS = 3_600_000

/**
 * What the viewer's gym has learnt from its latest 300 finished attempts. Worked out anew where an
 * attempt was finished since, at most once an hour. Anybody of the gym may know it.
 */
export const getLearntPaces = timed(
  async (viewer: Viewer, params: { now: Date }, db: DbOrTx): Promise<LearntPacesDto> => {
    const { gymId } = viewer
    const [kept] = await db.select().from(learntPaces).where(eq(learntPaces.gymId, gymId))
    if (kept && params.now.getTime() - kept.computedAt.getTime() < FRESH_MS) return kept.content
    if (kept) {
      const [newer] = await db
        .select({ id: attempts.id })
        .from(attempts)
        .where(and(eq(attempts.gymId, gymId), gt(attempts.finishedAt, kept.computedAt)))
        .limit(1)
      if (!newer) return kept.content
    }
    const content = await learn(db, gymId)
    await db
      .insert(learntPaces)
      .values({ gymId, content, computedAt: params.now })
      .onConflictDoUpdate({
        target: learntPaces.gymId,
        set: { content, computedAt: params.now },
      })
    return content
  },
)

async function learn(db: DbOrTx, gymId: string): Promise<LearntPacesDto> {
  const rows = await db
    .select({ id: attempts.id, versionId: attempts.versionId, startedAt: attempts.startedAt })
    .from(attempts)
    .where(and(eq(attempts.gymId, gymId), eq(attempts.state, 'finished')))
    .orderBy(desc(attempts.finishedAt), desc(attempts.id))
    .limit(MOST_ATTEMPTS)
  if (rows.length === 0) return { paces: [], tiring: null }
  const versions = await versionsOf(
    db,
    rows.map((row) => row.versionId),
  )
  const stored = await db
    .select({ attemptId: attemptEvents.attemptId, content: attemptEvents.content })
    .from(attemptEvents)
    .where(
      inArray(
        attemptEvents.attemptId,
        rows.map((row) => row.id),
      ),
    )
  const events = new Map<string, ClassEvent[]>(rows.map((row) => [row.id, []]))
  for (const { attemptId, content } of stored) events.get(attemptId)?.push(content)
  const learnt = learnPaces(
    rows.flatMap((row) => {
      const version = versions.get(row.versionId)
      if (!version) return []
      const blocks = observedBlocks(version, events.get(row.id) ?? [])
      return [{ id: row.id, startedAtMs: row.startedAt?.getTime() ?? 0, blocks }]
    }),
  )
  return {
    paces: [...learnt.paces].map(([key, pace]) => {
      const [movement = '', option = ''] = key.split('/')
      return {
        movement,
        option,
        secondsPerRep: pace.secondsPerRep,
        attempts: pace.attempts,
        medianErrorReps: pace.medianAbsoluteErrorReps,
        forecasts: pace.forecasts,
      }
    }),
    tiring: learnt.tiring,
  }
}

/**
 * The expected forecast of every block with rounds, options as planned: from what the gym has learnt,
 * where it has of every station without a tempo of its own, else from the planned tempo.
 */
export function forecastsOf(version: PublishedVersion, learnt: LearntPacesDto): ForecastDto[] {
  const rows = new Map(learnt.paces.map((row) => [paceKey(row.movement, row.option), row]))
  const seconds = new Map([...rows].map(([key, row]) => [key, row.secondsPerRep]))
  const tiring = learnt.tiring?.factor ?? TIRING.expected
  const planned = forecast(version, { tiring: TIRING.expected })
  const taught = forecast(version, { tiring, learnt: seconds })
  return planned.map((plan, index) => {
    const basis = basisOf(version, plan.block, rows)
    const one = (basis && taught[index]) ?? plan
    return {
      block: one.block,
      rounds: one.rounds,
      reps: one.reps,
      finishMs: one.finishSeconds === null ? null : Math.round(one.finishSeconds * 1_000),
      basis,
    }
  })
}

function basisOf(
  { spec }: PublishedVersion,
  blockId: string,
  rows: ReadonlyMap<string, LearntPacesDto['paces'][number]>,
): ForecastDto['basis'] {
  const format = spec.blocks.find((block) => block.id === blockId)?.format
  if (format?.type !== 'rounds' && format?.type !== 'for-time') return null
  const learning = format.stations.filter((station) => !station.tempo?.some((part) => part > 0))
  const found = learning.map((station) => rows.get(paceKey(station.movement, AS_PLANNED)))
  const known = found.filter((row) => row !== undefined)
  if (known.length === 0 || known.length < found.length) return null
  const errors = known.flatMap((row) => row.medianErrorReps ?? [])
  return {
    attempts: Math.min(...known.map((row) => row.attempts)),
    medianErrorReps: errors.length > 0 ? Math.max(...errors) : null,
  }
}
