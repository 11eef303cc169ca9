import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import { scoreBlocks, scoreText } from '@/server/engine/tally/score'
import type { AttemptTally, BlockTally } from '@/server/engine/tally/types'
import { block, stamp, stamped, versionOf, type Draft } from './classes'

const version = versionOf([
  block(
    'main',
    {
      type: 'rounds',
      seconds: 240,
      stations: [
        { movement: 'goblet-squat', reps: { from: 3, step: 3 } },
        { movement: 'floor-press', reps: 2, sides: 'each' },
      ],
    },
    { countIn: 0 },
  ),
  block(
    'race',
    { type: 'for-time', rounds: 5, cap: 600, stations: [{ movement: 'goblet-squat', reps: 10 }] },
    { countIn: 0 },
  ),
  block(
    'pieces',
    {
      type: 'intervals',
      rounds: 2,
      stations: [{ movement: 'goblet-squat', work: 40, rest: 20, sides: 'each', switch: 5 }],
    },
    { countIn: 0 },
  ),
  block(
    'ladder',
    {
      type: 'rounds',
      seconds: 100,
      stations: [{ movement: 'goblet-squat', reps: { from: 3, step: -1, to: 1, then: 'done' } }],
    },
    { countIn: 0 },
  ),
])
/** Segments: 0 main, 1 race, 2 left, 3 switch, 4 right, 5 rest, 6 left, 7 switch, 8 right, 9 ladder. */
const PIECES_START = 840_000

const started: Draft = { type: 'started', version: 'v1', counting: 'press', options: [] }
const done = (name: string, round: number, classMs = 1_000): Draft => ({
  type: 'round-done',
  block: name,
  round,
  by: 'member',
  classMs,
})
const undone = (name: string, round: number): Draft => ({
  type: 'round-undone',
  block: name,
  round,
  by: 'member',
})

function blockOf(tally: AttemptTally, id: string): BlockTally {
  const found = tally.blocks.find((one) => one.block === id)
  if (!found) throw new Error(`no block ${id}`)
  return found
}
const folded = (drafts: Draft[], id: string) => blockOf(fold(version, stamped(drafts)), id)

describe('fold: rounds and reps', () => {
  it('counts different rounds, their planned reps and the noted ones', () => {
    // Round n: 3n squats and 2 presses a side. Rounds 1 to 3: 3 + 6 + 9 and 3 × 4.
    const tally = folded(
      [
        started,
        done('main', 1),
        done('main', 2),
        done('main', 3),
        { type: 'reps-noted', block: 'main', round: 4, reps: 5 },
      ],
      'main',
    )
    expect(tally).toMatchObject({
      rounds: 3,
      reps: 5,
      totalReps: 18 + 12 + 5,
      countedAfterwards: false,
    })
    expect(scoreText(tally)).toBe('3 + 5')
  })
  it('counts a round logged by two devices once', () => {
    const both = [
      ...stamped([started, done('main', 1)], 'laptop'),
      { ...stamp(done('main', 1), 2, 'phone') },
    ]
    expect(blockOf(fold(version, both), 'main').rounds).toBe(1)
  })
  it('believes the last event that names a round', () => {
    expect(folded([started, done('main', 1), undone('main', 1)], 'main').rounds).toBe(0)
    expect(
      folded([started, done('main', 1), undone('main', 1), done('main', 1)], 'main').rounds,
    ).toBe(1)
  })
  it('drops a note once its round is done, and takes the last for the lowest round left', () => {
    const notes: Draft[] = [
      { type: 'reps-noted', block: 'main', round: 5, reps: 9 },
      { type: 'reps-noted', block: 'main', round: 2, reps: 4 },
      { type: 'reps-noted', block: 'main', round: 2, reps: 3 },
    ]
    expect(folded([started, ...notes], 'main')).toMatchObject({ reps: 3, totalReps: 3 })
    expect(folded([started, ...notes, done('main', 2)], 'main')).toMatchObject({
      reps: 9,
      totalReps: 10 + 9,
    })
  })
  it('keeps out what cannot come', () => {
    const impossible: Draft[] = [
      done('race', 6),
      done('ladder', 4),
      done('pieces', 1),
      done('nowhere', 1),
      done('constructor', 1),
      { type: 'reps-noted', block: 'race', round: 6, reps: 3 },
      { type: 'option-chosen', block: 'main', station: 7, option: 'to-a-chair' },
      { type: 'option-chosen', block: 'main', station: 0, option: 'on-the-moon' },
    ]
    expect(fold(version, stamped([started, ...impossible])).blocks).toEqual(
      fold(version, stamped([started])).blocks,
    )
  })
  it('marks rounds that were counted afterwards', () => {
    const tally = folded(
      [started, { type: 'round-done', block: 'main', round: 1, by: 'afterwards' }],
      'main',
    )
    expect(tally).toMatchObject({
      countedAfterwards: true,
      logged: [{ round: 1, by: 'afterwards' }],
    })
  })
  it('reckons a round by the option in force when it was logged', () => {
    const tally = folded(
      [
        started,
        done('race', 1, 250_000),
        {
          type: 'option-chosen',
          block: 'race',
          station: 0,
          option: 'to-a-chair',
          reason: 'knee',
          classMs: 260_000,
        },
        done('race', 2, 300_000),
        { type: 'option-chosen', block: 'race', station: 0, option: 'no-load', classMs: 310_000 },
        done('race', 3, 350_000),
      ],
      'race',
    )
    // To a chair has 4 reps of its own, without load has none of its own.
    expect(tally.totalReps).toBe(10 + 4 + 10)
    expect(tally.options).toEqual([
      {
        station: 0,
        option: 'no-load',
        from: 'chosen',
        used: ['as-planned', 'to-a-chair', 'no-load'],
      },
    ])
  })
  it('lists only options that were in force once the block had begun', () => {
    const tally = folded(
      [
        {
          ...started,
          options: [{ block: 'race', station: 0, option: 'to-a-chair', from: 'fitted' }],
        },
        { type: 'option-chosen', block: 'race', station: 0, option: 'no-load', classMs: 100_000 },
      ],
      'race',
    )
    expect(tally.options).toEqual([
      { station: 0, option: 'no-load', from: 'chosen', used: ['no-load'] },
    ])
  })
})

describe('fold: time', () => {
  const all = [1, 2, 3, 4, 5].map((round) => done('race', round, 240_000 + round * 60_000))
  const finish: Draft = { type: 'block-finished', block: 'race', ms: 372_000, classMs: 612_000 }
  it('writes the time of a block worked off, 6:12', () => {
    const tally = folded([started, ...all, finish], 'race')
    expect(tally).toMatchObject({ rounds: 5, finishMs: 372_000, over: true })
    expect(scoreText(tally)).toBe('6:12')
  })
  it('writes what was reached at the cap, and no cap before it', () => {
    const four = [
      ...all.slice(0, 4),
      { type: 'reps-noted', block: 'race', round: 5, reps: 7 } as Draft,
    ]
    const capped = folded([started, ...four, { type: 'finished', classMs: 2_000_000 }], 'race')
    expect(scoreText(capped)).toBe('cap, 4 + 7')
    expect(scoreText(folded([started, ...four], 'race'))).toBe('4 + 7')
  })
  it('has no finish once a round of it is taken back', () => {
    expect(folded([started, ...all, finish, undone('race', 5)], 'race').finishMs).toBeNull()
    expect(
      folded([started, ...all, finish, undone('race', 5), done('race', 5)], 'race').finishMs,
    ).toBe(372_000)
  })
  it('believes no finish past the cap or in a block without one', () => {
    expect(folded([started, { ...finish, ms: 600_001 } as Draft], 'race').finishMs).toBeNull()
    expect(folded([started, { ...finish, block: 'main' } as Draft], 'main').finishMs).toBeNull()
  })
  it('shows both in the scores of the command line, options as planned', () => {
    const events = stamped([
      {
        ...started,
        options: [{ block: 'race', station: 0, option: 'to-a-chair', from: 'chosen' }],
      },
      done('main', 1),
      ...all,
      finish,
    ])
    expect(scoreBlocks(version, events)).toEqual([
      { block: 'main', rounds: 1, reps: 0, totalReps: 7, finishSeconds: null },
      { block: 'race', rounds: 5, reps: 0, totalReps: 50, finishSeconds: 372 },
      { block: 'ladder', rounds: 0, reps: 0, totalReps: 0, finishSeconds: null },
    ])
  })
})

describe('fold: timed pieces', () => {
  const end: Draft = { type: 'finished', classMs: 1_130_000 }
  it('counts the pieces that ran out, each side one', () => {
    expect(folded([started, end], 'pieces')).toMatchObject({
      pieces: { done: 4, partDone: 0, of: 4 },
    })
    const early = folded([started, { type: 'finished', classMs: PIECES_START + 84_999 }], 'pieces')
    expect(early).toMatchObject({ pieces: { done: 1, of: 4 }, over: false })
  })
  it('counts a piece with a rest inside as part done', () => {
    const rest: Draft = {
      type: 'rest-taken',
      block: 'pieces',
      segment: 4,
      ms: 9_000,
      classMs: PIECES_START + 60_000,
    }
    const tally = folded([started, rest, end], 'pieces')
    expect(tally).toMatchObject({ pieces: { done: 3, partDone: 1, of: 4 }, restTakenMs: 9_000 })
    expect(scoreText(tally)).toBe('3 of 4')
  })
  it('counts none that a skip left, and says why', () => {
    const skip: Draft = {
      type: 'block-skipped',
      block: 'pieces',
      reason: 'Knee',
      classMs: PIECES_START + 60_000,
    }
    const tally = folded(
      [started, skip, { type: 'finished', classMs: PIECES_START + 160_000 }],
      'pieces',
    )
    expect(tally).toMatchObject({
      pieces: { done: 1, of: 4 },
      skipped: { reason: 'Knee' },
      over: true,
    })
  })
  it('follows rests that were lengthened and cut', () => {
    const longer: Draft = {
      type: 'rest-lengthened',
      block: 'pieces',
      segment: 5,
      ms: 30_000,
      classMs: PIECES_START + 90_000,
    }
    const cut: Draft = {
      type: 'rest-cut',
      block: 'pieces',
      segment: 5,
      ms: 10_000,
      classMs: PIECES_START + 90_000,
    }
    // The third piece ends 20 s later than planned.
    const at = (classMs: number) =>
      folded([started, longer, cut, { type: 'finished', classMs }], 'pieces')
    expect(at(PIECES_START + 145_000)).toMatchObject({
      pieces: { done: 2 },
      restLengthenedMs: 30_000,
      restCutMs: 10_000,
    })
    expect(at(PIECES_START + 165_000)).toMatchObject({ pieces: { done: 3 } })
  })
  it('counts none over which the clock jumped while the member was away', () => {
    const tally = folded(
      [
        started,
        { type: 'paused', classMs: PIECES_START + 10_000 },
        { type: 'resumed', classMs: PIECES_START + 50_000 },
        end,
      ],
      'pieces',
    )
    expect(tally).toMatchObject({ pieces: { done: 2, of: 4 } })
  })
})

describe('fold: the state of an attempt', () => {
  const state = (...drafts: Draft[]) => fold(version, stamped(drafts)).state
  const stopped: Draft = { type: 'stopped' }
  const red: Draft = { type: 'stopped', sign: 'chest-pain' }
  it('follows pauses, stops and the end', () => {
    expect(state()).toBe('not-started')
    expect(state(started)).toBe('in-class')
    expect(state(started, { type: 'paused' })).toBe('paused')
    expect(state(started, { type: 'paused' }, { type: 'resumed' })).toBe('in-class')
    expect(state(started, stopped, { type: 'resumed' })).toBe('in-class')
    expect(state(started, { type: 'finished' })).toBe('finished')
    expect(state(started, { type: 'finished' }, { type: 'rated', rpe: 7 })).toBe('finished')
  })
  it('keeps a stop above a finish, and a red flag above going on', () => {
    expect(state(started, stopped, { type: 'finished' })).toBe('stopped')
    expect(state(started, red, { type: 'resumed' })).toBe('stopped')
    const tally = fold(
      version,
      stamped([started, stopped, red, { type: 'stopped', note: 'Better now', sign: 'other' }]),
    )
    expect(tally.stop).toMatchObject({ sign: 'other', note: 'Better now', redFlag: true })
  })
  it('keeps the last rating and every hurt', () => {
    const tally = fold(
      version,
      stamped([
        started,
        { type: 'hurt', where: 'knee', block: 'main', station: 0, classMs: 5_000 },
        { type: 'rated', rpe: 8 },
        { type: 'rated', rpe: 6, note: 'On reflection', hurts: [{ where: 'knee' }] },
      ]),
    )
    expect(tally.hurts).toEqual([
      { where: 'knee', block: 'main', station: 0, note: null, classMs: 5_000 },
    ])
    expect(tally.rating).toEqual({
      rpe: 6,
      note: 'On reflection',
      hurts: [{ where: 'knee', note: null }],
    })
  })
})

const name = fc.constantFrom('main', 'race', 'pieces', 'ladder', 'nowhere')
const classMs = fc.integer({ min: 0, max: 1_200_000 })
const draft: fc.Arbitrary<Draft> = fc.oneof(
  fc.record({
    type: fc.constantFrom('round-done' as const, 'round-undone' as const),
    block: name,
    round: fc.integer({ min: 1, max: 7 }),
    by: fc.constantFrom('member' as const, 'lead' as const, 'afterwards' as const),
    classMs,
  }),
  fc.record({
    type: fc.constant('reps-noted' as const),
    block: name,
    round: fc.integer({ min: 1, max: 7 }),
    reps: fc.integer({ min: 0, max: 30 }),
    classMs,
  }),
  fc.record({
    type: fc.constantFrom('block-finished' as const),
    block: name,
    ms: fc.integer({ min: 0, max: 700_000 }),
    classMs,
  }),
  fc.record({
    type: fc.constantFrom('rest-taken' as const, 'rest-lengthened' as const, 'rest-cut' as const),
    block: name,
    segment: fc.integer({ min: 0, max: 11 }),
    ms: fc.integer({ min: 0, max: 60_000 }),
    classMs,
  }),
  fc.record({ type: fc.constant('block-skipped' as const), block: name, classMs }),
  fc.record({
    type: fc.constant('option-chosen' as const),
    block: name,
    station: fc.integer({ min: 0, max: 2 }),
    option: fc.constantFrom('to-a-chair', 'no-load', 'as-planned', 'nothing'),
    classMs,
  }),
  fc.record({
    type: fc.constantFrom(
      'paused' as const,
      'resumed' as const,
      'stopped' as const,
      'finished' as const,
    ),
    classMs,
  }),
  fc.record({ type: fc.constant('rated' as const), rpe: fc.integer({ min: 0, max: 10 }), classMs }),
)
const anyEvents = fc
  .array(fc.tuple(draft, fc.integer({ min: 1, max: 12 }), fc.constantFrom('laptop', 'phone')), {
    maxLength: 40,
  })
  .map((all) =>
    all.map(([one, seq, device], index): ClassEvent => ({
      ...stamp(one, seq, device),
      id: `${device}-${index}`,
    })),
  )

describe('fold: whatever arrives', () => {
  it('is the same in any order and with any duplicates', () => {
    fc.assert(
      fc.property(anyEvents, fc.infiniteStream(fc.nat()), (events, keys) => {
        const shuffled = [...events, ...events.slice(0, 7)]
          .map((event) => ({ event, key: keys.next().value ?? 0 }))
          .sort((a, b) => a.key - b.key)
          .map((one) => one.event)
        expect(fold(version, shuffled)).toEqual(fold(version, events))
      }),
      { seed: 4_711, numRuns: 400 },
    )
  })
  it('does not depend on which of two contents under one id came first', () => {
    const one = stamp(done('main', 1), 1)
    const other = { ...stamp(done('main', 2), 1), id: one.id }
    expect(fold(version, [one, other])).toEqual(fold(version, [other, one]))
  })
  it('never throws and never counts below nothing, whatever the numbers', () => {
    const strange = [Number.NaN, Infinity, -1, 1.5, 1e308, Number.MAX_SAFE_INTEGER]
    const hostile: unknown[] = [
      null,
      7,
      'event',
      {},
      { id: 'x' },
      { id: 'a', seq: Number.NaN, type: 'paused' },
    ]
    const types = [
      'started',
      'round-done',
      'reps-noted',
      'block-finished',
      'rest-taken',
      'rest-cut',
      'rest-lengthened',
      'block-skipped',
      'option-chosen',
      'load-noted',
      'hurt',
      'stopped',
      'rated',
      'made-up',
    ]
    strange.forEach((value, index) => {
      types.forEach((type, at) => {
        hostile.push({
          id: `${index}-${at}`,
          seq: index * 100 + at,
          type,
          block: 'main',
          classMs: value,
          round: value,
          reps: value,
          ms: value,
          segment: value,
          station: value,
          kilograms: value,
        })
      })
    })
    // The schema refuses all of these at the door; the fold must not lean on it.
    const tally = fold(version, hostile as ClassEvent[])
    for (const one of tally.blocks) {
      expect(one.rounds).toBeGreaterThanOrEqual(0)
      expect(one.totalReps).toBeGreaterThanOrEqual(0)
      expect(Number.isNaN(one.totalReps)).toBe(false)
      expect(Number.isFinite(one.restLengthenedMs + one.restCutMs + one.restTakenMs)).toBe(true)
    }
  })
})
