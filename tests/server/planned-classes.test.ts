import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { eq } from 'drizzle-orm'
import { auditEntries } from '@/db/schema/audit-entries'
import { classVersions } from '@/db/schema/class-versions'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import type { Viewer } from '@/server/contract/viewer'
import { recordEvents } from '@/server/data/attempts'
import { getScheduledClass } from '@/server/data/classes'
import {
  addCaptions,
  getPlannedClass,
  listPlannedClasses,
  publishVersion,
} from '@/server/data/planned-classes'
import { captionsOf } from '@/server/engine/captions/write'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let coach: Viewer
let member: Viewer
const DAY_MS = 86_400_000

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  coach = await gym.person('Coach', ['coach'])
  member = await gym.person('Member', ['member'])
})
afterAll(() => test.end())

const VTT = 'WEBVTT\n\n00:05.000 --> 00:07.000\nShoulders down\n\n00:20.000 --> 00:22.000\nBreathe'

async function schedule(daysAhead: number): Promise<string> {
  const id = v7()
  const opensAt = new Date(NOW.getTime() + daysAhead * DAY_MS)
  await test.db.insert(scheduledClasses).values({
    id,
    gymId: gym.gymId,
    versionId: gym.versionId,
    day: opensAt.toISOString().slice(0, 10),
    opensAt,
    closesAt: new Date(opensAt.getTime() + DAY_MS / 2),
  })
  return id
}

const importOn = (basedOn: string, more: { ahead?: boolean; captions?: string } = {}) => {
  const block = gym.version.spec.blocks.find((one) => one.format.type === 'rounds')?.id ?? ''
  return addCaptions(
    coach,
    {
      classId: gym.classId,
      basedOn,
      block,
      timesFrom: 'block',
      captions: VTT,
      ahead: true,
      now: NOW,
      ...more,
    },
    test.db,
  )
}

describe('a class of the gym', () => {
  it('is listed with its versions and the dates ahead, for coaches only', async () => {
    await schedule(1)
    const [one, ...others] = await listPlannedClasses(coach, { now: NOW }, test.db)
    expect(others).toEqual([])
    expect(one).toMatchObject({
      classId: gym.classId,
      title: gym.version.spec.title,
      versions: 1,
      ahead: 1,
    })
    await expect(listPlannedClasses(member, { now: NOW }, test.db)).rejects.toThrow(/no such class/)
  })

  it('is another gym’s business nowhere else', async () => {
    const other = await makeGym(test.db, 'Other gym')
    const stranger = await other.person('Coach', ['coach'])
    await expect(
      getPlannedClass(stranger, { classId: gym.classId, now: NOW }, test.db),
    ).rejects.toThrow(/no such class/)
    expect(await listPlannedClasses(stranger, { now: NOW }, test.db)).toHaveLength(1)
  })
})

describe('cues from captions', () => {
  it('make a new version; dates ahead that nobody has begun take it, attempts and past dates keep theirs', async () => {
    const begun = await schedule(2)
    const ahead = await schedule(3)
    await recordEvents(
      member,
      {
        attemptId: v7(),
        now: NOW,
        input: {
          scheduledClassId: begun,
          versionId: gym.versionId,
          events: stamped([
            { type: 'started', classMs: 0, version: gym.versionId, counting: 'press', options: [] },
          ]),
        },
      },
      test.db,
    )
    expect(await importOn(gym.versionId)).toEqual({ cues: 2, moved: 2 })
    const planned = await getPlannedClass(coach, { classId: gym.classId, now: NOW }, test.db)
    expect(planned.versions.map((one) => one.versionId)[1]).toBe(gym.versionId)
    expect(planned.versions[0]?.publishedBy).toBe('Coach')
    const texts = planned.version.spec.blocks.flatMap((block) =>
      (block.cues ?? []).map((cue) => cue.text),
    )
    expect(texts).toEqual(expect.arrayContaining(['Shoulders down', 'Breathe']))
    expect(planned.version.movements.length).toBeGreaterThan(0)
    const versionOf = async (scheduledClassId: string) =>
      (await getScheduledClass(coach, { scheduledClassId }, test.db)).scheduledClass.versionId
    expect(await versionOf(ahead)).toBe(planned.versionId)
    expect(await versionOf(begun)).toBe(gym.versionId)
    expect(await versionOf(gym.scheduledClassId)).toBe(gym.versionId)
    const [first] = await test.db
      .select()
      .from(classVersions)
      .where(eq(classVersions.id, gym.versionId))
    expect(first?.content).toEqual(gym.version)
    const audit = await test.db
      .select()
      .from(auditEntries)
      .where(eq(auditEntries.action, 'class.published'))
    expect(audit.map((one) => [one.personId, one.subject])).toEqual([[coach.personId, gym.classId]])
  })

  it('that are sent twice, or over another coach’s version, change nothing and say so', async () => {
    await expect(importOn(gym.versionId)).rejects.toThrow(/newer version was published by Coach/)
    const { versionId } = await getPlannedClass(coach, { classId: gym.classId, now: NOW }, test.db)
    const both = await Promise.allSettled([
      importOn(versionId, { captions: 'WEBVTT\n\n00:31.000 --> 00:32.000\nOne' }),
      importOn(versionId, { captions: 'WEBVTT\n\n00:33.000 --> 00:34.000\nTwo' }),
    ])
    expect(both.map((one) => one.status).sort()).toEqual(['fulfilled', 'rejected'])
  })

  it('of a file without any say what is wrong with it', async () => {
    const { versionId } = await getPlannedClass(coach, { classId: gym.classId, now: NOW }, test.db)
    for (const captions of ['no captions at all', 'WEBVTT', '\u0000']) {
      await expect(importOn(versionId, { captions })).rejects.toMatchObject({
        code: 'bad-input',
        fields: { captions: expect.stringContaining('No cue could be read') },
      })
    }
  })

  it('come back from the class’s own captions', async () => {
    const planned = await getPlannedClass(coach, { classId: gym.classId, now: NOW }, test.db)
    const exported = captionsOf(planned.version)
    expect(exported.startsWith('WEBVTT\n')).toBe(true)
    expect(exported).toContain('Shoulders down')
  })
})

describe('a version', () => {
  it('with problems is not published', async () => {
    const { version, versionId } = await getPlannedClass(
      coach,
      { classId: gym.classId, now: NOW },
      test.db,
    )
    await expect(
      publishVersion(
        coach,
        {
          classId: gym.classId,
          basedOn: versionId,
          spec: { ...version.spec, blocks: [] },
          ahead: false,
          now: NOW,
        },
        test.db,
      ),
    ).rejects.toThrow(/cannot be published/)
  })
})
