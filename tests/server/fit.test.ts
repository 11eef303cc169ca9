import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { auditEntries } from '@/db/schema/audit-entries'
import type { Viewer } from '@/server/contract/viewer'
import { fitOwn, getMemberFit, getOwnFit, saveOwnFit, setOptionRule } from '@/server/data/fit'
import { swapsOf, weeksLoad } from '@/server/data/loads'
import { getPlayerData } from '@/server/data/player'
import { classLoad } from '@/server/engine/load/class-load'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, type TestGym } from '../support/gym'

let test: TestDatabase
let coach: Viewer
let owner: Viewer
let member: Viewer
let stranger: Viewer
let gym: TestGym

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  coach = await gym.person('Coach', ['coach'])
  owner = await gym.person('Owner', ['owner'])
  member = await gym.person('Member', ['member'])
  stranger = await (await makeGym(test.db, 'Other')).person('Coach', ['coach'])
})
afterAll(() => test.end())

const rule = (viewer: Viewer, option: string, movement = 'goblet-squat') =>
  setOptionRule(viewer, { membershipId: member.membershipId, movement, option, now: NOW }, test.db)

describe('what a class is fitted to', () => {
  it('is the member’s own to say, and read by them and their coach alone', async () => {
    await saveOwnFit(member, { bodyNotes: ['knee', 'no-jumping'], wantsMore: true }, test.db)
    const own = await getOwnFit(member, {}, test.db)
    expect(own).toMatchObject({ bodyNotes: ['knee', 'no-jumping'], wantsMore: true, rules: [] })
    const { membershipId } = member
    expect(await getMemberFit(coach, { membershipId }, test.db)).toEqual(own)
    for (const other of [owner, stranger, member]) {
      await expect(getMemberFit(other, { membershipId }, test.db)).rejects.toThrow(/no such member/)
    }
  })

  it('has a coach’s rule, one a movement, until it is taken back', async () => {
    await rule(coach, 'to-a-chair')
    await rule(coach, 'no-load')
    expect((await getOwnFit(member, {}, test.db)).rules).toEqual([
      {
        movement: 'goblet-squat',
        option: 'no-load',
        setBy: 'Coach',
        since: NOW.toISOString(),
      },
    ])
    await rule(coach, '')
    expect((await getOwnFit(member, {}, test.db)).rules).toEqual([])
  })

  it('starts the class on what it is fitted to: notes, and above them the coach’s rule', async () => {
    const { version } = gym
    const before = await fitOwn(member, { version }, test.db)
    const noted = before.filter((one) => one.from === 'note')
    expect(noted.length).toBeGreaterThan(0)
    const [first] = noted
    const format = version.spec.blocks.find((block) => block.id === first?.block)?.format
    const movement =
      format && format.type !== 'rest' ? format.stations[first?.station ?? 0]?.movement : undefined
    await rule(coach, 'as-planned', movement)
    const after = await fitOwn(member, { version }, test.db)
    expect(
      after.find((one) => one.block === first?.block && one.station === first.station),
    ).toMatchObject({
      option: 'as-planned',
      from: 'coach',
    })
    const data = await getPlayerData(
      member,
      { scheduledClassId: gym.scheduledClassId, now: NOW },
      test.db,
    )
    expect(data.fitted).toEqual(after)
    await rule(coach, '', movement)
  })

  it('takes no rule from anybody else, and the audit tells no health data', async () => {
    for (const other of [owner, stranger, member]) {
      await expect(rule(other, 'to-a-chair')).rejects.toThrow(/no such member/)
    }
    const audit = await test.db.select().from(auditEntries)
    expect(new Set(audit.map((one) => one.action))).toEqual(new Set(['rule.set', 'rule.removed']))
    expect(JSON.stringify(audit)).not.toContain('goblet-squat')
  })
})

describe('what a coach sees of a class’s load', () => {
  it('is how many members start a station on another option, and the four weeks behind', async () => {
    const swaps = await swapsOf(coach, { version: gym.version }, test.db)
    const fitted = await fitOwn(member, { version: gym.version }, test.db)
    const swapped = fitted.filter((one) => one.option !== 'as-planned').length
    expect(swapped).toBeGreaterThan(0)
    expect(swaps.reduce((sum, one) => sum + one.members, 0)).toBe(swapped)
    expect(swaps[0]?.of).toBe(1)
    // The one class of the fixture is today's: it is not behind yet, tomorrow it is.
    expect((await weeksLoad(coach, { now: NOW }, test.db)).classes).toBe(0)
    const later = new Date(NOW.getTime() + 86_400_000)
    const weeks = await weeksLoad(coach, { now: later }, test.db)
    expect(weeks.classes).toBe(1)
    expect(weeks.patterns).toEqual(classLoad(gym.version).patterns)
    for (const other of [member, owner]) {
      await expect(swapsOf(other, { version: gym.version }, test.db)).rejects.toThrow()
      await expect(weeksLoad(other, { now: NOW }, test.db)).rejects.toThrow()
    }
  })
})
