import { eq } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { auditEntries } from '@/db/schema/audit-entries'
import { people } from '@/db/schema/people'
import { memberships } from '@/db/schema/memberships'
import { healthInput } from '@/server/contract/forms'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { getBoard } from '@/server/data/boards'
import { clearHold, getHealth, listOwnHolds, saveHealth } from '@/server/data/health'
import type { HealthQuestion } from '@/server/engine/fit/screening'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { answersWith, makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let coach: Viewer

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  coach = await gym.person('Coach', ['coach'])
})
afterAll(() => test.end())

const days = (count: number) => new Date(NOW.getTime() + count * 86_400_000)
const save = (
  viewer: Viewer,
  yes: HealthQuestion[],
  more: { cleared?: boolean; limits?: string[]; now?: Date } = {},
) =>
  saveHealth(
    viewer,
    { answers: answersWith(...yes), cleared: false, limits: [], now: NOW, ...more },
    test.db,
  )
const standing = async (viewer: Viewer, now = NOW) =>
  (await getHealth(viewer, { now }, test.db)).standing

describe('health answers', () => {
  it('are asked for first, and again after the gym’s 90 days', async () => {
    const viewer = await gym.person('New', ['member'], { answered: false })
    expect(await standing(viewer)).toBe('open')
    await save(viewer, [])
    expect(await standing(viewer)).toBe('clear')
    expect(await standing(viewer, days(90))).toBe('clear')
    expect(await standing(viewer, new Date(days(90).getTime() + 1))).toBe('open')
  })

  it.each<[HealthQuestion, string]>([
    ['chest-pain', 'blocked'],
    ['faint-or-dizzy', 'blocked'],
    ['breathless', 'blocked'],
    ['only-supervised', 'blocked'],
    ['known-condition', 'clearance'],
    ['medicine', 'clearance'],
    ['recent-injury', 'clearance'],
    ['pregnant-or-recent-birth', 'clear'],
  ])('with yes to %s stand as %s until clearance is stated', async (question, expected) => {
    const viewer = await gym.person(question, ['member'], { answered: false })
    await save(viewer, [question])
    expect(await standing(viewer)).toBe(expected)
    await save(viewer, [question], { cleared: true, now: days(1) })
    expect(await standing(viewer, days(1))).toBe('clear')
  })

  it('let limits stand for clearance with a condition, never with a symptom', async () => {
    const viewer = await gym.person('Limits', ['member'], { answered: false })
    await save(viewer, ['medicine'], { limits: ['light-loads'] })
    expect(await standing(viewer)).toBe('clear')
    await save(viewer, ['medicine', 'breathless'], { limits: ['light-loads'], now: days(1) })
    expect(await standing(viewer, days(1))).toBe('blocked')
  })

  it('wait for a guardian’s consent for somebody who is not an adult', async () => {
    const viewer = await gym.person('Young', ['member'])
    await test.db.update(people).set({ adult: false }).where(eq(people.id, viewer.personId))
    expect((await getHealth(viewer, { now: NOW }, test.db)).consentMissing).toBe(true)
    await test.db
      .update(memberships)
      .set({ guardianConsentAt: NOW })
      .where(eq(memberships.id, viewer.membershipId))
    expect((await getHealth(viewer, { now: NOW }, test.db)).consentMissing).toBe(false)
  })

  it('reach the coach as words about what to mind, and the trail of changes not at all', async () => {
    const viewer = await gym.person('Noted', ['member'], { answered: false })
    await save(viewer, ['medicine', 'pregnant-or-recent-birth'], { limits: ['no-jumping'] })
    const board = await getBoard(
      coach,
      { scheduledClassId: gym.scheduledClassId, now: NOW },
      test.db,
    )
    const row = board.rows.find((one) => one.membershipId === viewer.membershipId)
    expect(row?.healthNote).toContain('I do not jump')
    expect(row?.healthNote).toContain('Pregnant')
    expect(row?.healthNote).not.toMatch(/medicine/i)
    const trail = await test.db
      .select()
      .from(auditEntries)
      .where(eq(auditEntries.personId, viewer.personId))
    expect(trail.map((entry) => entry.action)).toEqual(['health.answered'])
    expect(JSON.stringify(trail)).not.toMatch(/medicine|pregnan|no-jumping/)
  })

  it('take no limit that nobody offers', () => {
    const answers = Object.fromEntries(
      Object.keys(answersWith()).map((question) => [question, 'no']),
    )
    const parse = (limits: string[]) =>
      healthInput.safeParse({ answers, cleared: false, limits }).success
    expect(parse(['no-jumping'])).toBe(true)
    expect(parse(['anything'])).toBe(false)
  })
})

describe('an easier option after ‘this hurts’', () => {
  async function hurt(name: string) {
    const viewer = await gym.person(name, ['member'])
    const attemptId = v7()
    await recordEvents(
      viewer,
      {
        attemptId,
        now: NOW,
        input: {
          scheduledClassId: gym.scheduledClassId,
          versionId: gym.versionId,
          events: stamped([
            { type: 'started', classMs: 0, version: gym.versionId, counting: 'press', options: [] },
            { type: 'hurt', classMs: 9_000, where: 'shoulder' },
          ]),
        },
      },
      test.db,
    )
    const [hold] = await listOwnHolds(viewer, {}, test.db)
    if (!hold) throw new Error('no hold')
    return { viewer, holdId: hold.id }
  }
  const clear = (viewer: Viewer, holdId: string, as: 'member' | 'coach', now = NOW) =>
    clearHold(viewer, { holdId, as, now }, test.db)

  it('stays until member and coach have both cleared it, in either order', async () => {
    for (const order of [
      ['member', 'coach'],
      ['coach', 'member'],
    ] as const) {
      const { viewer, holdId } = await hurt(order.join())
      for (const as of order) {
        expect(await listOwnHolds(viewer, {}, test.db)).toHaveLength(1)
        await clear(as === 'coach' ? coach : viewer, holdId, as)
      }
      expect(await listOwnHolds(viewer, {}, test.db)).toEqual([])
    }
  })

  it('keeps the first date on which each cleared it', async () => {
    const { viewer, holdId } = await hurt('Twice')
    await clear(viewer, holdId, 'member', days(1))
    await clear(viewer, holdId, 'member', days(2))
    const [hold] = await listOwnHolds(viewer, {}, test.db)
    expect(hold?.memberClearedAt).toBe(days(1).toISOString())
  })

  it('is no other member’s, other gym’s or owner’s to clear', async () => {
    const { holdId } = await hurt('Guarded')
    const elsewhere = await makeGym(test.db, 'Elsewhere')
    const refused = async (viewer: Viewer, as: 'member' | 'coach') =>
      clear(viewer, holdId, as).then(
        () => 'done',
        (error: { code?: string }) => error.code,
      )
    expect(await refused(await gym.person('Other', ['member']), 'member')).toBe('not-found')
    expect(await refused(await gym.person('Other', ['member']), 'coach')).toBe('not-found')
    expect(await refused(await gym.person('Owner', ['owner']), 'coach')).toBe('not-found')
    expect(await refused(await elsewhere.person('Coach', ['coach']), 'coach')).toBe('not-found')
  })
})
