/**
 * The lead against session-spec's rules. The expected schedules are computed here, step by step, from
 * those rules only: nothing of the engine's own walk is used.
 */
import { describe, expect, it } from 'vitest'
import { blockPlan, type BlockPlan } from '@/server/engine/pace/block-plan'
import { forecast } from '@/server/engine/pace/forecast'
import { leadAt, leadSchedule } from '@/server/engine/pace/lead'
import { FROM_THE_START } from '@/server/engine/pace/walk'
import type { Format, Reps, Sides, Tempo } from '@/server/engine/spec/schema'
import { fold } from '@/server/engine/tally/fold'
import { apply, marksBetween, newRun, positionAt } from '@/server/engine/timeline/run'
import type { Command, EventDraft, Run } from '@/server/engine/timeline/run-types'
import { block, randomOf, stamped, versionOf } from './classes'

interface PlannedStation {
  reps: Reps
  sides: Sides
  tempo: Tempo
  change: number
}

/** Reps of a rung, from the sentences of 'Reps in round n'; null where there is none. */
function rungOf(reps: Reps, round: number): number | null {
  if (typeof reps === 'number') return reps
  const rungs: number[] = []
  if ('list' in reps) rungs.push(...reps.list)
  else if (reps.to === undefined) return reps.from + reps.step * (round - 1)
  else {
    for (let one = reps.from; reps.step > 0 ? one <= reps.to : one >= reps.to; one += reps.step) {
      rungs.push(one)
    }
  }
  if (round <= rungs.length) return rungs[round - 1] ?? null
  const then = reps.then ?? ('list' in reps ? 'repeat' : 'hold')
  if (then === 'done') return null
  return (then === 'hold' ? rungs.at(-1) : rungs[(round - 1) % rungs.length]) ?? null
}

interface Rep {
  round: number
  station: number
  rep: number
  side: 'left' | 'right' | null
  start: number
  end: number
}

/** Every rep that ends in time, by going through the block as a member at the planned pace would. */
function repsByHand(
  stations: PlannedStation[],
  seconds: number,
  tiring: number,
  rounds: number | null,
): Rep[] {
  const done: Rep[] = []
  let time = 0
  for (let round = 1; rounds === null || round <= rounds; round += 1) {
    if (stations.some((one) => rungOf(one.reps, round) === null)) return done
    for (const [station, { reps, sides, tempo, change }] of stations.entries()) {
      const count = rungOf(reps, round) ?? 0
      const list: ('left' | 'right' | null)[] = []
      for (let rep = 0; rep < count; rep += 1) {
        if (sides === 'together') list.push(null)
        if (sides === 'alternate') list.push(rep % 2 === 0 ? 'left' : 'right')
        if (sides === 'each') list.push('left')
      }
      if (sides === 'each') for (let rep = 0; rep < count; rep += 1) list.push('right')
      const perRep = tempo[0] + tempo[1] + tempo[2] + tempo[3]
      for (const [index, side] of list.entries()) {
        const end = time + perRep * (1 + (tiring * time) / seconds)
        if (end > seconds + 1e-6) return done
        const rep = sides === 'each' && index >= count ? index - count + 1 : index + 1
        done.push({ round, station, rep, side, start: time, end })
        time = end
      }
      const isVeryLast = round === rounds && station === stations.length - 1
      if (stations.length > 1 && !isVeryLast) time += change * (1 + (tiring * time) / seconds)
    }
  }
  return done
}

function formatOf(stations: PlannedStation[], seconds: number, rounds: number | null): Format {
  const written = stations.map((one) => ({ movement: 'goblet-squat', ...one }))
  return rounds === null
    ? { type: 'rounds', seconds, stations: written }
    : { type: 'for-time', rounds, cap: seconds, stations: written }
}

function planFor(format: Format): BlockPlan {
  const version = versionOf([block('b', format)])
  const plan = blockPlan(version, block('b', format))
  if (!plan) throw new Error('a block with rounds has a plan')
  return plan
}

const LADDERS: Reps[] = [
  6,
  { from: 3, step: 3 },
  { from: 2, step: 2, to: 8 },
  { from: 2, step: 2, to: 8, then: 'repeat' },
  { from: 9, step: -3, to: 3 },
  { from: 6, step: -2, to: 2, then: 'done' },
  { list: [5, 10, 3] },
  { list: [4, 2], then: 'hold' },
  { list: [4, 3, 2, 1], then: 'done' },
]
const SIDES: Sides[] = ['together', 'alternate', 'each']

function randomBlock(seed: number) {
  const random = randomOf(seed)
  const pick = <T>(all: readonly T[]): T => {
    const one = all[Math.floor(random() * all.length)]
    if (one === undefined) throw new Error('nothing to pick')
    return one
  }
  const isForTime = random() < 0.4
  const stations = Array.from({ length: 1 + Math.floor(random() * 3) }, () => ({
    reps: pick(isForTime ? LADDERS.slice(0, 5) : LADDERS),
    sides: pick(SIDES),
    tempo: pick<Tempo>([
      [2, 0, 1, 0],
      [3, 1, 1, 0],
      [1, 0, 1, 0.5],
      [0.7, 0, 0.6, 0],
    ]),
    change: pick([0, 4, 6.5]),
  }))
  return { stations, seconds: 60 + Math.floor(random() * 500), rounds: isForTime ? 4 : null }
}

describe('the schedule of the lead', () => {
  it('is, rep by rep and side by side, what the rules give, over ladders, lists and sides', () => {
    for (let seed = 1; seed <= 120; seed += 1) {
      const { stations, seconds, rounds } = randomBlock(seed)
      const plan = planFor(formatOf(stations, seconds, rounds))
      const own = leadSchedule(plan, FROM_THE_START)
        .steps.filter((step) => step.kind === 'rep' && step.endMs <= seconds * 1_000 + 0.001)
        .map(({ round, station, rep, side, startMs, endMs }) => ({
          round,
          station,
          rep,
          side,
          start: Math.round(startMs),
          end: Math.round(endMs),
        }))
      const byHand = repsByHand(stations, seconds, 0.25, rounds).map((rep) => ({
        ...rep,
        start: Math.round(rep.start * 1_000),
        end: Math.round(rep.end * 1_000),
      }))
      expect({ seed, reps: own }).toEqual({ seed, reps: byHand })
    }
  })

  it('and the forecast count the same reps, at every tiring', () => {
    for (let seed = 200; seed <= 260; seed += 1) {
      const { stations, seconds, rounds } = randomBlock(seed)
      const format = formatOf(stations, seconds, rounds)
      for (const tiring of [0, 0.25, 0.6]) {
        const [own] = forecast(versionOf([block('b', format)]), { tiring })
        const byHand = repsByHand(stations, seconds, tiring, rounds)
        const perStation = stations.map(
          (_, index) => byHand.filter((rep) => rep.station === index).length,
        )
        expect({ seed, tiring, perStation: own?.perStation }).toEqual({ seed, tiring, perStation })
      }
    }
  })

  it('takes the sum of a tempo’s four figures for a rep: 3/1/2/0 is 6 s, 8 of them 48 s (coaching-tempo-and-rest)', () => {
    const plan = planFor(
      formatOf([{ reps: 8, sides: 'together', tempo: [3, 1, 2, 0], change: 4 }], 10_000, null),
    )
    // So long a block that its first round does not tire by a tenth of a second a rep.
    const [first] = leadSchedule(plan, FROM_THE_START).rounds
    expect(first?.endMs).toBeCloseTo(48_000, -2)
  })

  it('says which rep of how many, by side where each side does them', () => {
    const plan = planFor(
      formatOf([{ reps: 3, sides: 'each', tempo: [1, 0, 1, 0], change: 4 }], 3_000, null),
    )
    const schedule = leadSchedule(plan, FROM_THE_START)
    expect(leadAt(schedule, 2_500)).toMatchObject({ state: 'rep', rep: 2, of: 3, side: 'left' })
    expect(leadAt(schedule, 6_500)).toMatchObject({ rep: 1, of: 3, side: 'right', round: 1 })
    expect(leadAt(schedule, 12_500)).toMatchObject({ rep: 1, of: 3, side: 'left', round: 2 })
  })

  it('waits during a rest inside a rep, and goes on with what was left of it', () => {
    const plan = planFor(
      formatOf([{ reps: 5, sides: 'together', tempo: [2, 0, 2, 0], change: 4 }], 100_000, null),
    )
    const waits = [{ fromMs: 5_000, toMs: 25_000 }]
    const schedule = leadSchedule(plan, FROM_THE_START, waits)
    const before = leadAt(schedule, 5_000, waits)
    expect(before).toMatchObject({ rep: 2, elapsedMs: expect.closeTo(1_000, -1) })
    expect(leadAt(schedule, 24_000, waits)).toEqual(before)
    expect(leadAt(schedule, 26_000, waits)).toMatchObject({
      rep: 2,
      elapsedMs: expect.closeTo(2_000, -1),
    })
    expect(schedule.steps[1]?.endMs).toBeCloseTo(28_000, -1)
  })
})

/** One block of two stations, 5 reps of 3 s and a change of 4 s each; no brief, no count-in. */
const two: Format = {
  type: 'rounds',
  seconds: 240,
  stations: [
    { movement: 'goblet-squat', reps: 5 },
    { movement: 'floor-press', reps: 5 },
  ],
}

class Member {
  run: Run
  now = 1_000
  events: EventDraft[] = []
  constructor(format: Format, counting: 'press' | 'lead' = 'press', cues: object = {}) {
    const version = versionOf([
      block('work', format, { countIn: 0, ...cues }),
      block('after', { type: 'rest', seconds: 60 }),
    ])
    this.run = newRun(version, 'v1', { waitAtBriefs: false, changeExtraMs: 0 })
    this.send({ type: 'start', versionId: 'v1', counting, options: [] })
  }
  send(command: Command): string | null {
    const applied = apply(this.run, command, this.now)
    this.run = applied.run
    this.events.push(...applied.events)
    return applied.refused
  }
  /** Runs on as the player's ticker does, every 50 ms, to `bodyMs` of the class. */
  to(bodyMs: number): this {
    while (this.now < 1_000 + bodyMs) {
      this.now = Math.min(1_000 + bodyMs, this.now + 50)
      const { owed } = this.at
      if (owed) this.send(owed)
    }
    return this
  }
  get at() {
    return positionAt(this.run, this.now)
  }
  get rounds() {
    return this.events.filter((event) => event.type === 'round-done')
  }
}

describe('following the lead', () => {
  it('from the start logs every round by: lead, at the instant of its last rep', () => {
    const member = new Member(two, 'lead').to(241_000)
    const ends = repsByHand(
      [
        { reps: 5, sides: 'together', tempo: [3, 0, 0, 0], change: 4 },
        { reps: 5, sides: 'together', tempo: [3, 0, 0, 0], change: 4 },
      ],
      240,
      0.25,
      null,
    )
      .filter((rep) => rep.station === 1 && rep.rep === 5)
      .map((rep) => Math.ceil(rep.end * 1_000 - 0.01))
    expect(ends.length).toBeGreaterThan(3)
    expect(member.rounds).toEqual(
      ends.map((classMs, index) => ({
        type: 'round-done',
        classMs,
        block: 'work',
        round: index + 1,
        by: 'lead',
      })),
    )
    const [tally] = fold(member.run.version, stamped(member.events)).blocks
    expect(tally?.rounds).toBe(ends.length)
  })

  it('is joined at any moment, from the member’s own round and the station that they are at', () => {
    const member = new Member(two).to(60_000)
    member.send({ type: 'log-round', by: 'member' })
    member.to(80_000)
    expect(member.at.lead).toBeNull()
    expect(member.send({ type: 'follow-lead', station: 1, logs: true })).toBeNull()
    expect(member.at.lead).toMatchObject({ round: 2, station: 1, rep: 1, of: 5, state: 'rep' })
    // 5 reps of 3 s from 80 s on, tiring: the round ends some 16 s later and is logged as round 2.
    member.to(110_000)
    expect(member.rounds.at(-1)).toMatchObject({ round: 2, by: 'lead' })
    const atMs = member.rounds.at(-1)?.classMs ?? 0
    let time = 80
    for (let rep = 0; rep < 5; rep += 1) time += 3 * (1 + (0.25 * time) / 240)
    expect(atMs).toBe(Math.ceil(time * 1_000 - 0.01))
  })

  it('without a wish to log counts on screen and leaves the log to the member', () => {
    const member = new Member(two).to(10_000)
    member.send({ type: 'follow-lead', station: 0, logs: false })
    member.to(120_000)
    expect(member.rounds).toEqual([])
    expect(member.at.lead?.round).toBeGreaterThan(1)
    expect(member.at.round).toBe(1)
  })

  it('is left at any moment, and logs nothing from then on', () => {
    const member = new Member(two, 'lead').to(60_000)
    const before = member.rounds.length
    expect(before).toBeGreaterThan(0)
    member.send({ type: 'leave-lead' })
    expect(member.events.at(-1)).toMatchObject({ type: 'lead-left', block: 'work' })
    expect(member.to(200_000).at.lead).toBeNull()
    expect(member.rounds.length).toBe(before)
  })

  it('waits during rest as needed: it does no rep and logs no round in it', () => {
    const member = new Member(two, 'lead').to(30_000)
    const before = member.at.lead
    member.send({ type: 'rest-as-needed' })
    member.to(90_000)
    expect(member.at.lead).toMatchObject({ ...before, isWaiting: true })
    expect(member.rounds).toEqual([])
    member.send({ type: 'end-rest-as-needed' })
    expect(member.at.lead).toMatchObject({ ...before, isWaiting: false })
    member.to(110_000)
    expect(member.rounds).toHaveLength(1)
  })

  it('goes with a member who logs a round before it: by way of the change to the next round', () => {
    const member = new Member(two, 'lead').to(20_000)
    member.send({ type: 'log-round', by: 'member' })
    expect(member.at.lead).toMatchObject({ state: 'change', round: 2, station: 0 })
    member.to(26_000)
    expect(member.at.lead).toMatchObject({ state: 'rep', round: 2, station: 0, rep: 1 })
    expect(member.rounds).toHaveLength(1)
  })

  it('counts a round anew that the member takes back', () => {
    const member = new Member(two, 'lead').to(60_000)
    const logged = member.rounds.length
    member.send({ type: 'undo-round' })
    expect(member.at.lead).toMatchObject({ round: logged, station: 0, rep: 1 })
    member.to(150_000)
    const counted = member.rounds.filter((event) => 'round' in event && event.round === logged)
    expect(counted).toHaveLength(2)
    expect(member.rounds.some((event) => 'round' in event && event.round > logged)).toBe(true)
  })

  it('finishes a block for time at the instant of its very last rep', () => {
    const race: Format = {
      type: 'for-time',
      rounds: 3,
      cap: 300,
      stations: [{ movement: 'goblet-squat', reps: 4 }],
    }
    const member = new Member(race, 'lead').to(60_000)
    let time = 0
    for (let rep = 0; rep < 12; rep += 1) time += 3 * (1 + (0.25 * time) / 300)
    const ms = Math.ceil(time * 1_000 - 0.01)
    expect(member.events).toContainEqual({ type: 'block-finished', classMs: ms, block: 'work', ms })
    expect(member.at.segment?.block).toBe('after')
  })

  it('logs nothing where rounds are not counted, and says no elsewhere', () => {
    const member = new Member({ ...two, counted: false }, 'lead').to(200_000)
    expect(member.at.lead?.round).toBeGreaterThan(1)
    expect(member.rounds).toEqual([])
    member.to(245_000)
    expect(member.send({ type: 'follow-lead', logs: true })).toContain('none to count')
  })

  it('does the reps of an option from the moment that it is taken', () => {
    const member = new Member(two, 'lead').to(4_000)
    expect(member.at.lead).toMatchObject({ rep: 2, of: 5 })
    member.send({ type: 'choose-option', block: 'work', station: 0, option: 'to-a-chair' })
    expect(member.at.lead).toMatchObject({ rep: 2, of: 4 })
  })

  it('makes cues that wait for a round or station due as it begins them', () => {
    const cue = { kind: 'form' as const, text: 'Ribs down' }
    const member = new Member(two, 'lead', {
      cues: [
        { ...cue, id: 'round', at: { round: 2 } },
        { ...cue, id: 'station', at: { station: 1, round: 2 } },
        { ...cue, id: 'never', at: { round: 60 } },
      ],
    })
    const due = marksBetween(member.run, member.now, member.now + 240_000)
      .filter((mark) => mark.what === 'cue')
      .map((mark) => [mark.what === 'cue' ? mark.id : '', mark.atMs])
    const reps = repsByHand(
      [
        { reps: 5, sides: 'together', tempo: [3, 0, 0, 0], change: 4 },
        { reps: 5, sides: 'together', tempo: [3, 0, 0, 0], change: 4 },
      ],
      240,
      0.25,
      null,
    )
    const start = (station: number) =>
      Math.round((reps.find((rep) => rep.round === 2 && rep.station === station)?.start ?? 0) * 1e3)
    expect(due).toEqual([
      ['round', start(0)],
      ['station', start(1)],
    ])
  })

  it('counts nothing over what the clock jumped while the member was away', () => {
    const member = new Member(two, 'lead').to(20_000)
    member.send({ type: 'pause' })
    member.now += 150_000
    member.send({ type: 'resume', from: 'where-the-clock-would-be' })
    expect(member.at.classMs).toBe(170_000)
    expect(member.at.owed).toBeNull()
    expect(member.at.lead).toMatchObject({ round: 1, station: 0, rep: 1 })
    expect(member.rounds).toEqual([])
  })
})
