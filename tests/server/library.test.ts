import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { and, eq } from 'drizzle-orm'
import { demoMovements } from '@/db/seed/movements'
import { auditEntries } from '@/db/schema/audit-entries'
import { classVersions } from '@/db/schema/class-versions'
import { movements } from '@/db/schema/movements'
import { scheduledClasses } from '@/db/schema/scheduled-classes'
import { readMovementForm, type MovementFields } from '@/server/contract/library'
import { WHOLE_LIBRARY, type LibraryFilter } from '@/server/contract/library-filter'
import type { Viewer } from '@/server/contract/viewer'
import {
  archiveMovement,
  backToBuiltIn,
  bringBackMovement,
  getMovement,
  listLibrary,
  saveMovement,
} from '@/server/data/library'
import type { Movement } from '@/server/engine/spec/movement'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, type TestGym } from '../support/gym'
import { movementForm } from '../support/library-form'

let test: TestDatabase
let gym: TestGym
let coach: Viewer
let stranger: Viewer
let built: Movement
/** A second, not used by any class. */
let other: Movement

const rowOf = (gymId: string, content: Movement, builtIn = true) => ({
  id: v7(),
  gymId,
  slug: content.slug,
  content,
  builtIn,
})

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  const second = await makeGym(test.db, 'Second gym')
  coach = await gym.person('Coach', ['coach'])
  stranger = await second.person('Coach elsewhere', ['coach'])
  const used = gym.version.movements[0]
  const spare = demoMovements.find(
    (one) => !gym.version.movements.some(({ slug }) => slug === one.slug),
  )
  if (!used || !spare) throw new Error('the fixture has no movements')
  built = used
  other = spare
  await test.db
    .insert(movements)
    .values([rowOf(gym.gymId, built), rowOf(gym.gymId, other), rowOf(stranger.gymId, built)])
})
afterAll(() => test.end())

const list = (viewer: Viewer, filter: Partial<LibraryFilter> = {}) =>
  listLibrary(viewer, { ...WHOLE_LIBRARY, ...filter }, test.db)
const get = (viewer: Viewer, slug: string) => getMovement(viewer, { slug, now: NOW }, test.db)
const fieldsOf = ({ slug: _slug, ...fields }: Movement): MovementFields => fields
const save = (
  viewer: Viewer,
  slug: string | null,
  basedOn: string | null,
  fields: MovementFields,
  over = false,
) => saveMovement(viewer, { slug, basedOn, over, fields }, test.db)
const trail = async (slug: string) =>
  (
    await test.db
      .select()
      .from(auditEntries)
      .where(and(eq(auditEntries.gymId, gym.gymId), eq(auditEntries.subject, slug)))
      .orderBy(auditEntries.createdAt, auditEntries.id)
  ).map((one) => one.action)
const formFields = (more: Record<string, string | string[]> = {}): MovementFields => {
  const { change, fields } = readMovementForm(movementForm(more))
  if (!change) throw new Error(JSON.stringify(fields))
  return change.fields
}

describe('the library', () => {
  it.each([['member'], ['owner']] as const)('is closed to a %s', async (role) => {
    const viewer = await gym.person('Somebody', [role])
    const refused = expect.objectContaining({ code: 'not-found' })
    const { token } = await get(coach, built.slug)
    const slug = built.slug
    for (const attempt of [
      () => list(viewer),
      () => get(viewer, slug),
      () => save(viewer, null, null, formFields()),
      () => save(viewer, slug, token, formFields()),
      () => archiveMovement(viewer, { slug, now: NOW }, test.db),
      () => bringBackMovement(viewer, { slug, now: NOW }, test.db),
      () => backToBuiltIn(viewer, { slug, basedOn: token }, test.db),
    ]) {
      await expect(attempt()).rejects.toEqual(refused)
    }
  })

  it('of another gym is not there', async () => {
    const refused = expect.objectContaining({ code: 'not-found' })
    const { slug } = other
    await expect(get(stranger, slug)).rejects.toEqual(refused)
    await expect(save(stranger, slug, 'x', formFields(), true)).rejects.toEqual(refused)
    await expect(archiveMovement(stranger, { slug, now: NOW }, test.db)).rejects.toEqual(refused)
    await expect(backToBuiltIn(stranger, { slug, basedOn: 'x' }, test.db)).rejects.toEqual(refused)
    expect((await list(stranger)).map((one) => one.slug)).toEqual([built.slug])
  })

  it('tells what a list needs of each movement', async () => {
    const row = (await list(coach)).find((one) => one.slug === other.slug)
    expect(row).toEqual({
      slug: other.slug,
      name: other.name,
      pattern: other.pattern,
      position: other.position,
      impact: other.impact,
      joints: other.joints,
      kit: other.kit,
      options: other.options.length,
      optionNames: other.options
        .filter((one) => one.option !== 'as-planned')
        .map((one) => one.name),
      origin: 'built-in',
      archived: false,
      figure: other.figure ?? null,
    })
  })

  it('tells where a movement is used: in the latest versions, and on dates ahead', async () => {
    const none = await get(coach, other.slug)
    expect([none.usedIn, none.ahead]).toEqual([[], 0])
    const before = await get(coach, built.slug)
    expect(before.usedIn).toEqual([{ classId: gym.classId, title: gym.version.spec.title }])
    expect(before.ahead).toBe(0)
    const opensAt = new Date(NOW.getTime() + 86_400_000)
    await test.db.insert(scheduledClasses).values({
      id: v7(),
      gymId: gym.gymId,
      versionId: gym.versionId,
      day: '2026-12-02',
      opensAt,
      closesAt: new Date(opensAt.getTime() + 3_600_000),
    })
    expect((await get(coach, built.slug)).ahead).toBe(1)
  })
})

describe('editing', () => {
  it('a built-in makes the gym’s own copy, editing that changes it, and versions keep theirs', async () => {
    const { slug } = built
    const first = await get(coach, slug)
    await save(coach, slug, first.token, { ...fieldsOf(built), name: 'Our own name' })
    const copy = await get(coach, slug)
    expect(copy).toMatchObject({ origin: 'copy', movement: { slug, name: 'Our own name' } })
    await save(coach, slug, copy.token, { ...fieldsOf(copy.movement), stopWhen: 'It pinches.' })
    const rows = await test.db
      .select()
      .from(movements)
      .where(and(eq(movements.gymId, gym.gymId), eq(movements.slug, slug)))
    expect(rows).toHaveLength(2)
    expect(rows.find((one) => one.builtIn)?.content).toEqual(built)
    expect(rows.find((one) => !one.builtIn)?.content).toMatchObject({
      name: 'Our own name',
      stopWhen: 'It pinches.',
    })
    expect((await list(coach)).filter((one) => one.slug === slug)).toMatchObject([
      { name: 'Our own name', origin: 'copy' },
    ])
    const [version] = await test.db
      .select()
      .from(classVersions)
      .where(eq(classVersions.id, gym.versionId))
    expect(version?.content).toEqual(gym.version)
    expect((await get(stranger, slug)).movement).toEqual(built)
    expect(await trail(slug)).toEqual(['movement.copied', 'movement.changed'])
  })

  it('without a change makes no copy', async () => {
    const { slug } = other
    const { token, movement } = await get(coach, slug)
    // A form gives the words of a list in its own order.
    await save(coach, slug, token, {
      ...fieldsOf(movement),
      joints: [...movement.joints].reverse(),
      options: movement.options.map((one) => ({ ...one, reasons: [...one.reasons].reverse() })),
    })
    expect((await get(coach, slug)).origin).toBe('built-in')
    expect(await trail(slug)).toEqual([])
  })

  it('over somebody else’s change is refused, told by whom, and done when it is meant', async () => {
    const colleague = await gym.person('Ifeoma', ['coach'])
    const { slug } = other
    const { token } = await get(coach, slug)
    await save(colleague, slug, token, { ...fieldsOf(other), start: 'Theirs.' })
    const mine = { ...fieldsOf(other), start: 'Mine.' }
    await expect(save(coach, slug, token, mine)).rejects.toMatchObject({
      code: 'conflict',
      message: expect.stringContaining('changed by Ifeoma'),
      fields: { basedOn: expect.any(String) },
    })
    expect((await get(coach, slug)).movement.start).toBe('Theirs.')
    await save(coach, slug, token, mine, true)
    expect((await get(coach, slug)).movement.start).toBe('Mine.')
  })

  it('by two at once is done by one', async () => {
    const { token } = await get(coach, other.slug)
    const both = await Promise.allSettled(
      ['One.', 'Two.'].map((start) =>
        save(coach, other.slug, token, { ...fieldsOf(other), start }),
      ),
    )
    expect(both.map((one) => one.status).sort()).toEqual(['fulfilled', 'rejected'])
  })

  it('back to the built-in removes the copy, unless that was changed since it was seen', async () => {
    const { slug } = other
    const stale = (await get(coach, slug)).token
    await save(coach, slug, stale, { ...fieldsOf(other), start: 'Later.' })
    await expect(backToBuiltIn(coach, { slug, basedOn: stale }, test.db)).rejects.toMatchObject({
      code: 'conflict',
    })
    const { token } = await get(coach, slug)
    await backToBuiltIn(coach, { slug, basedOn: token }, test.db)
    expect(await get(coach, slug)).toMatchObject({ origin: 'built-in', movement: other })
    // Sent twice, it stays as it is.
    await backToBuiltIn(coach, { slug, basedOn: token }, test.db)
    expect((await trail(slug)).at(-1)).toBe('movement.back-to-built-in')
  })
})

describe('a movement of one’s own', () => {
  it('gets a slug that is free, keeps it under another name, and has no built-in to go back to', async () => {
    const { slug } = await save(coach, null, null, formFields())
    expect(slug).toBe('harbour-squat')
    const { movement, origin, token } = await get(coach, slug)
    expect(origin).toBe('own')
    expect(movement).toMatchObject({
      kit: ['dumbbell', 'dumbbell', 'sandbag'],
      tempo: [2, 0, 1, 0.5],
      steps: ['Sit down.', 'Stand up.'],
      faults: [{ fault: 'Heels lift', correction: 'Sit less deep.' }],
      options: [
        { option: 'to-a-chair', level: 'easier', reps: { list: [12, 9, 6] } },
        { option: 'as-planned', level: 'as-planned', reasons: [] },
        { option: 'pause-low', level: 'harder' },
      ],
    })
    await save(coach, slug, token, { ...fieldsOf(movement), name: 'Quay squat' })
    expect((await get(coach, slug)).movement).toMatchObject({ slug, name: 'Quay squat' })
    const again = await save(coach, null, null, formFields())
    expect(again.slug).toBe('harbour-squat-2')
    // 'new' is the address of the form itself.
    expect((await save(coach, null, null, formFields({ name: 'New' }))).slug).toBe('new-2')
    const own = await get(coach, slug)
    await expect(backToBuiltIn(coach, { slug, basedOn: own.token }, test.db)).rejects.toMatchObject(
      { code: 'bad-input' },
    )
  })

  it('cannot have the name of another', async () => {
    await expect(save(coach, null, null, formFields({ name: 'quay squat' }))).rejects.toMatchObject(
      {
        code: 'bad-input',
        fields: { name: expect.stringContaining('has this name') },
      },
    )
  })
})

describe('archiving', () => {
  it('puts a movement away and brings it back; done twice it is done once', async () => {
    const { slug } = other
    await archiveMovement(coach, { slug, now: NOW }, test.db)
    await archiveMovement(coach, { slug, now: NOW }, test.db)
    expect((await list(coach)).map((one) => one.slug)).not.toContain(slug)
    expect((await list(coach, { show: 'archived' })).map((one) => one.slug)).toEqual([slug])
    expect((await get(coach, slug)).archived).toBe(true)
    await bringBackMovement(coach, { slug, now: NOW }, test.db)
    await bringBackMovement(coach, { slug, now: NOW }, test.db)
    expect((await list(coach)).map((one) => one.slug)).toContain(slug)
    expect((await trail(slug)).slice(-2)).toEqual(['movement.archived', 'movement.brought-back'])
  })

  it('stays when the gym’s copy comes or goes', async () => {
    const { slug } = other
    await archiveMovement(coach, { slug, now: NOW }, test.db)
    const { token } = await get(coach, slug)
    await save(coach, slug, token, { ...fieldsOf(other), start: 'Archived and changed.' })
    const copy = await get(coach, slug)
    expect(copy).toMatchObject({ origin: 'copy', archived: true })
    await backToBuiltIn(coach, { slug, basedOn: copy.token }, test.db)
    expect(await get(coach, slug)).toMatchObject({ origin: 'built-in', archived: true })
  })
})

describe('a library of 500 movements', () => {
  it('is listed and filtered in a blink', async () => {
    const large = await makeGym(test.db, 'Large gym')
    const viewer = await large.person('Coach', ['coach'])
    await test.db.insert(movements).values(
      Array.from({ length: 500 }, (_, index) => {
        const content = demoMovements[index % demoMovements.length] ?? built
        return rowOf(
          large.gymId,
          { ...content, slug: `movement-${index}`, name: `${content.name} ${index}` },
          index % 2 === 0,
        )
      }),
    )
    await list(viewer)
    const begun = performance.now()
    expect(await list(viewer)).toHaveLength(500)
    const allMs = performance.now() - begun
    const found = await list(viewer, { q: 'squat', pattern: 'squat' })
    expect(found.length).toBeGreaterThan(0)
    expect(found.every((one) => one.pattern === 'squat')).toBe(true)
    // Some 20 ms on a quiet computer; the bound only catches another order of growth.
    expect(allMs).toBeLessThan(1_000)
    console.info(`500 movements listed in ${allMs.toFixed(0)} ms`)
  })
})
