/** Loads of small classes, worked out by hand from the rules; the figures for kit and floor are the house's own. */
import { describe, expect, it } from 'vitest'
import type { FittedTo } from '@/server/engine/fit/fit'
import { classLoad, sumLoads, swaps, tonnage } from '@/server/engine/load/class-load'
import { forecast } from '@/server/engine/pace/forecast'
import type { Movement } from '@/server/engine/spec/movement'
import { AS_PLANNED, IMPACTS, JOINTS, PATTERNS, POSITIONS } from '@/server/engine/spec/names'
import type { Block, Format, Reps } from '@/server/engine/spec/schema'
import { fold } from '@/server/engine/tally/fold'
import { block, press, randomOf, squat, stamped, versionOf, type Draft } from './classes'

const row: Movement = {
  ...squat,
  slug: 'row',
  name: 'Row',
  pattern: 'horizontal-pull',
  joints: ['lower-back', 'shoulder'],
}
const jack: Movement = {
  ...squat,
  slug: 'jack',
  name: 'Jumping jack',
  pattern: 'jump',
  impact: 'jump',
  joints: ['ankle-or-foot', 'knee'],
  kit: [],
  secondsPerRep: 1,
}
const plank: Movement = {
  ...squat,
  slug: 'plank',
  name: 'Plank',
  pattern: 'core',
  position: 'hands-and-feet',
  joints: ['shoulder', 'wrist'],
  kit: ['mat'],
}
const all = [squat, press, row, jack, plank]

describe('what a class asks of a body', () => {
  it('counts the reps of rounds at the expected pace, of starts as planned, of timed work by the seconds', () => {
    const load = classLoad(
      versionOf(
        [
          // A rep that begins at t takes 3·(1 + 0.25·t/60), so n of them end at 240·(1.0125ⁿ - 1): within
          // 60 s where 1.0125ⁿ ≤ 1.25, so n = 17 (ln 1.25 ÷ ln 1.0125 = 17.96).
          block('rounds', {
            type: 'rounds',
            seconds: 60,
            stations: [{ movement: 'goblet-squat', reps: 5 }],
          }),
          // Ten starts in turn: five of 4 each side (40 reps), five of 6, 8, 10, 12, 14 (50 reps).
          block('every', {
            type: 'every',
            seconds: 60,
            times: 10,
            stations: [
              { movement: 'row', reps: 4, sides: 'each' },
              { movement: 'floor-press', reps: { from: 6, step: 2 } },
            ],
          }),
          // 3 × 30 s at 1 s a rep.
          block('intervals', {
            type: 'intervals',
            rounds: 3,
            stations: [{ movement: 'jack', work: 30, rest: 30 }],
          }),
          block('holds', {
            type: 'holds',
            stations: [{ movement: 'plank', seconds: 40, sides: 'each' }],
          }),
        ],
        all,
      ),
    )
    expect(load.patterns).toEqual([
      { pattern: 'squat', reps: 17, estimatedReps: 0, holdSeconds: 0 },
      { pattern: 'horizontal-push', reps: 50, estimatedReps: 0, holdSeconds: 0 },
      { pattern: 'horizontal-pull', reps: 40, estimatedReps: 0, holdSeconds: 0 },
      { pattern: 'core', reps: 0, estimatedReps: 0, holdSeconds: 80 },
      { pattern: 'jump', reps: 90, estimatedReps: 90, holdSeconds: 0 },
    ])
    expect([load.pushReps, load.pullReps, load.pushToPull]).toEqual([50, 40, 1.25])
    expect(load.jumpContacts).toBe(90)
  })

  it('has no ratio of push to pull where one of them is nothing', () => {
    const only = classLoad(
      versionOf([
        block('b', {
          type: 'every',
          seconds: 60,
          times: 1,
          stations: [{ movement: 'floor-press', reps: 5 }],
        }),
      ]),
    )
    expect(only.pushToPull).toBeNull()
    expect(classLoad(versionOf([block('r', { type: 'rest', seconds: 60 })])).patterns).toEqual([])
  })

  it('counts the ways to the floor and back in a round, and what they and the kit imply', () => {
    const stations = [
      { movement: 'goblet-squat', reps: 5 },
      { movement: 'plank', reps: 1 },
      { movement: 'row', reps: 5 },
    ]
    const [ways] = classLoad(
      versionOf([block('b', { type: 'rounds', seconds: 300, stations })], all),
    ).floorWays
    // Squat → plank: down (6 s), dumbbell away (2 s). Plank → row: up (6 s), dumbbell (2 s). Row → squat: nothing.
    expect(ways).toEqual({ block: 'b', perRound: 2, impliedSeconds: 16, plannedSeconds: 12 })
    const once = classLoad(
      versionOf(
        [
          block('b', {
            type: 'intervals',
            rounds: 1,
            stations: [
              { movement: 'plank', work: 30, rest: 10 },
              { movement: 'jack', work: 30, rest: 10 },
            ],
          }),
        ],
        all,
      ),
    ).floorWays
    // Once through: nobody goes back to the first.
    expect(once).toEqual([{ block: 'b', perRound: 1, impliedSeconds: 6, plannedSeconds: 10 }])
  })

  it('names joints and the grip in work blocks that follow one another, over a rest between them', () => {
    const of = (id: string, movement: string) =>
      block(id, { type: 'rounds', seconds: 60, stations: [{ movement, reps: 5 }] })
    const load = classLoad(
      versionOf(
        [
          of('a', 'goblet-squat'),
          block('r', { type: 'rest', seconds: 60 }),
          of('b', 'jack'),
          of('c', 'row'),
          of('d', 'plank'),
        ],
        all,
      ),
    )
    expect(load.inARow).toEqual([
      { what: 'knee', blocks: ['a', 'b'] },
      { what: 'shoulder', blocks: ['c', 'd'] },
    ])
  })

  it('adds classes up', () => {
    const one = classLoad(
      versionOf(
        [
          block('b', {
            type: 'every',
            seconds: 60,
            times: 2,
            stations: [
              { movement: 'row', reps: 10 },
              { movement: 'floor-press', reps: 5 },
            ],
          }),
        ],
        all,
      ),
    )
    const both = sumLoads([one, one])
    expect(both.patterns.map(({ pattern, reps }) => [pattern, reps])).toEqual([
      ['horizontal-push', 10],
      ['horizontal-pull', 20],
    ])
    expect(both.pushToPull).toBe(0.5)
    expect(sumLoads([])).toEqual({
      patterns: [],
      pushReps: 0,
      pullReps: 0,
      pushToPull: null,
      jumpContacts: 0,
    })
  })

  it('counts ways over the whole class, from block to block as well', () => {
    const load = classLoad(
      versionOf(
        [
          block('a', {
            type: 'for-time',
            rounds: 2,
            cap: 900,
            stations: [
              { movement: 'goblet-squat', reps: 5 },
              { movement: 'plank', reps: 1 },
              { movement: 'row', reps: 5 },
            ],
          }),
          block('r', { type: 'rest', seconds: 60 }),
          block('b', {
            type: 'intervals',
            rounds: 1,
            stations: [
              { movement: 'plank', work: 30, rest: 10 },
              { movement: 'jack', work: 30, rest: 10 },
            ],
          }),
        ],
        all,
      ),
    )
    // Squat ↓ plank ↑ row, squat ↓ plank ↑ row: 4 ways, each with the dumbbell, 8 s. Then row ↓ plank with
    // the dumbbell, 8 s, and plank ↑ jack with nothing, 6 s.
    expect(load.changesInClass).toEqual({ floorWays: 6, impliedSeconds: 46 })
  })

  it('goes through rounds as far as the pace goes', () => {
    const version = versionOf(
      [
        block('b', {
          type: 'rounds',
          seconds: 30,
          stations: [
            { movement: 'goblet-squat', reps: 2 },
            { movement: 'plank', reps: 1 },
          ],
        }),
      ],
      all,
    )
    // Fresh: squats to 6 s, change to 10, plank to 13, change to 17, squats to 23, change to 27, plank to 30.
    expect(classLoad(version, { tiring: 0 }).changesInClass).toEqual({
      floorWays: 3,
      impliedSeconds: 24,
    })
    // 3 s later with each rep of 4 s: squats to 8 s, 12, plank to 16, 20, squats to 28, change to 32: not in time.
    expect(
      classLoad(
        { ...version, movements: all.map((one) => ({ ...one, secondsPerRep: 4 })) },
        { tiring: 0 },
      ).changesInClass.floorWays,
    ).toBe(2)
  })

  it('counts kit that is put down and picked up, piece by piece', () => {
    const swing: Movement = { ...squat, slug: 'swing', kit: ['kettlebell'] }
    const pair: Movement = { ...squat, slug: 'pair', kit: ['dumbbell', 'dumbbell'] }
    const of = (...slugs: string[]) =>
      classLoad(
        versionOf(
          [
            block('b', {
              type: 'holds',
              stations: slugs.map((movement) => ({ movement, seconds: 20 })),
            }),
          ],
          [...all, swing, pair],
        ),
      ).changesInClass.impliedSeconds
    expect(of('goblet-squat', 'row')).toBe(0)
    expect(of('goblet-squat', 'jack')).toBe(2)
    expect(of('goblet-squat', 'pair')).toBe(2)
    expect(of('pair', 'goblet-squat')).toBe(2)
    // One down, another up.
    expect(of('goblet-squat', 'swing')).toBe(4)
    // A mat lies where it lies: 6 s to get down to it.
    expect(of('jack', 'plank')).toBe(6)
  })

  it('knows what is planned between stations, by format', () => {
    const planned = (format: Format) =>
      classLoad(versionOf([block('b', format)], all)).floorWays[0]?.plannedSeconds
    expect(
      planned({
        type: 'intervals',
        rounds: 2,
        roundRest: 45,
        stations: [
          { movement: 'plank', work: 30, rest: 10 },
          { movement: 'jack', work: 30, rest: 5 },
        ],
      }),
      // 10 s after the plank, the rest between rounds in place of 5 s.
    ).toBe(55)
    expect(
      planned({
        type: 'every',
        seconds: 60,
        times: 4,
        stations: [
          { movement: 'goblet-squat', reps: { from: 5, step: 5 } },
          { movement: 'plank', reps: 10 },
        ],
      }),
      // Squats of 3 s: 5 leave 45 s, 10 leave 30 s, the least; 10 of the plank leave 30 s.
    ).toBe(60)
    expect(
      planned({
        type: 'holds',
        stations: [
          { movement: 'plank', seconds: 30, rest: 12 },
          { movement: 'row', seconds: 30, rest: 99 },
        ],
      }),
    ).toBe(12)
  })

  it('takes options that are in force: their reps, and what they leave out', () => {
    const spared: Movement[] = all.map((movement) => ({
      ...movement,
      options: [
        {
          option: 'spared',
          name: 'Spared',
          level: 'easier',
          reasons: ['no-jumping', 'cannot-get-down'],
          description: '',
          reps: 3,
        },
        ...movement.options,
      ],
    }))
    const version = versionOf(
      [
        block('b', {
          type: 'every',
          seconds: 60,
          times: 4,
          stations: [
            { movement: 'jack', reps: 10 },
            { movement: 'plank', reps: 5 },
          ],
        }),
      ],
      spared,
    )
    const planned = classLoad(version)
    // Two starts each: 2 × 10 and 2 × 5; jack ↓ plank ↑ jack ↓ plank.
    expect(planned.patterns.map((one) => one.reps)).toEqual([10, 20])
    expect([planned.jumpContacts, planned.changesInClass.floorWays]).toEqual([20, 3])
    const load = classLoad(version, { options: { 'b/0': 'spared', 'b/1': 'spared' } })
    expect(load.patterns.map((one) => one.reps)).toEqual([6, 6])
    expect([load.jumpContacts, load.changesInClass.floorWays, load.floorWays]).toEqual([0, 0, []])
  })

  it('ends a row with a block that is no work, and needs half of a block’s stations', () => {
    const of = (id: string, movements: string[], kind: Block['kind'] = 'work') =>
      block(
        id,
        {
          type: 'rounds',
          seconds: 60,
          stations: movements.map((movement) => ({ movement, reps: 5 })),
        },
        { kind },
      )
    const rows = (...blocks: Block[]) => classLoad(versionOf(blocks, all)).inARow
    expect(rows(of('a', ['goblet-squat']), of('b', ['row'], 'finisher'))).toEqual([
      { what: 'grip', blocks: ['a', 'b'] },
    ])
    expect(rows(of('a', ['jack']), of('m', ['jack'], 'mobility'), of('b', ['jack']))).toEqual([])
    // A knee in one of three stations is not what the block loads; in one of two it is.
    expect(rows(of('a', ['jack']), of('b', ['plank', 'row', 'goblet-squat']))).toEqual([])
    expect(rows(of('a', ['jack']), of('b', ['plank', 'goblet-squat']))).toEqual([
      { what: 'knee', blocks: ['a', 'b'] },
    ])
  })
})

const start: Draft = { type: 'started', version: 'v1', counting: 'press', options: [] }

describe('what was moved', () => {
  const rounds = versionOf(
    [
      block('b', {
        type: 'rounds',
        seconds: 240,
        stations: [
          { movement: 'goblet-squat', reps: 5 },
          { movement: 'row', reps: 4, sides: 'each' },
        ],
      }),
    ],
    all,
  )
  const moved = (drafts: Draft[], version = rounds) =>
    tonnage(fold(version, stamped([start, ...drafts])), version)
  const done = (round: number): Draft => ({ type: 'round-done', block: 'b', round, by: 'member' })
  const load = (station: number, kilograms: number): Draft => ({
    type: 'load-noted',
    block: 'b',
    station,
    kilograms,
  })

  it('is the load of a station times its reps, of rounds done and of the one begun', () => {
    // Squats 5 + 5 and 5 of the 7 reps begun: 15 × 12 kg = 180. Rows 8 + 8 and the other 2: 18 × 8 kg = 144.
    expect(
      moved([
        load(0, 12),
        load(1, 8),
        done(1),
        done(2),
        { type: 'reps-noted', block: 'b', round: 3, reps: 7 },
      ]),
    ).toEqual({ kilograms: 324, isEstimated: false })
    // Of a station without a load nothing is said.
    expect(moved([load(0, 12), done(1)])).toEqual({ kilograms: 60, isEstimated: false })
    expect(moved([done(1)])).toBeNull()
  })

  it('takes the reps of the option in force, and says where it was changed on the way', () => {
    const chosen = { block: 'b', station: 0, option: 'to-a-chair' } as const
    const fitted: Draft = { ...start, options: [{ ...chosen, from: 'fitted' }] }
    const of = (drafts: Draft[]) => tonnage(fold(rounds, stamped(drafts)), rounds)
    // To a chair it is 4 reps: 2 × 4 × 10 kg.
    expect(of([fitted, load(0, 10), done(1), done(2)])).toEqual({
      kilograms: 80,
      isEstimated: false,
    })
    expect(
      of([
        start,
        load(0, 10),
        done(1),
        { type: 'option-chosen', ...chosen, classMs: 60_000 },
        done(2),
      ])?.isEstimated,
    ).toBe(true)
  })

  it('climbs a ladder', () => {
    const version = versionOf([
      block('b', {
        type: 'rounds',
        seconds: 240,
        stations: [{ movement: 'goblet-squat', reps: { from: 2, step: 2 } }],
      }),
    ])
    // 2 + 4 + 6 reps of 10 kg.
    expect(moved([load(0, 10), done(1), done(2), done(3)], version)?.kilograms).toBe(120)
  })

  it('is all of the planned reps where every piece is done, and an estimate where not', () => {
    const version = versionOf([
      block('b', {
        type: 'every',
        seconds: 60,
        times: 4,
        stations: [{ movement: 'floor-press', reps: 5 }],
      }),
    ])
    const until = (classMs: number) => moved([load(0, 10), { type: 'paused', classMs }], version)
    // A count-in of 5 s, then four minutes: 4 × 5 × 10 kg; half of it after two.
    expect(until(245_000)).toEqual({ kilograms: 200, isEstimated: false })
    expect(until(125_000)).toEqual({ kilograms: 100, isEstimated: true })
    expect(until(5_000)).toEqual({ kilograms: 0, isEstimated: false })
    // A rest as needed in one of the four (segment 0 is the count-in): 3½ of 4, so 17.5 reps, to the nearest 18.
    expect(
      moved(
        [
          load(0, 10),
          { type: 'rest-taken', block: 'b', segment: 2, ms: 9_000, classMs: 100_000 },
          { type: 'paused', classMs: 245_000 },
        ],
        version,
      ),
    ).toEqual({ kilograms: 180, isEstimated: true })
  })

  it('is estimated in timed work, and nothing in a hold', () => {
    const stations = { movement: 'goblet-squat' }
    const timed = versionOf([
      block('b', { type: 'intervals', rounds: 2, stations: [{ ...stations, work: 30, rest: 30 }] }),
    ])
    const held = versionOf([
      block('b', { type: 'holds', stations: [{ ...stations, seconds: 60 }] }),
    ])
    const over: Draft = { type: 'paused', classMs: 95_000 }
    // 2 × 30 s ÷ 3 s a rep = 20 reps of 10 kg.
    expect(moved([load(0, 10), over], timed)).toEqual({ kilograms: 200, isEstimated: true })
    expect(moved([load(0, 10), over], held)).toEqual({ kilograms: 0, isEstimated: false })
  })
})

const nobody: FittedTo = { notes: [], holds: [], wantsMore: false, kit: null, rules: [] }
const crowd: FittedTo[] = [
  nobody,
  { ...nobody, notes: ['knee'] },
  { ...nobody, holds: ['hip'] },
  { ...nobody, rules: [{ movement: 'goblet-squat', option: AS_PLANNED }], notes: ['knee'] },
]

describe('how many start on another option', () => {
  it('is counted by station, the coach’s ‘as planned’ not among them', () => {
    const version = versionOf([
      block('a', {
        type: 'rounds',
        seconds: 60,
        stations: [
          { movement: 'floor-press', reps: 5 },
          { movement: 'goblet-squat', reps: 5 },
        ],
      }),
      block('r', { type: 'rest', seconds: 60 }),
      block('b', { type: 'holds', stations: [{ movement: 'gone', seconds: 30 }] }),
    ])
    expect(swaps(version, crowd)).toEqual([
      { block: 'a', station: 0, members: 0, of: 4 },
      { block: 'a', station: 1, members: 2, of: 4 },
      { block: 'b', station: 0, members: 0, of: 4 },
    ])
    expect(swaps(version, [])[1]).toEqual({ block: 'a', station: 1, members: 0, of: 0 })
  })
})

describe('of any class', () => {
  it('a load is worked out, never thrown, and adds up', () => {
    const random = randomOf(23)
    const whole = (least: number, most: number) => least + Math.floor(random() * (most - least + 1))
    const pick = <T>(list: readonly [T, ...T[]]): T => list[whole(0, list.length - 1)] ?? list[0]
    const reps = (): Reps =>
      pick<() => Reps>([
        () => whole(1, 30),
        () => ({ from: whole(1, 5), step: whole(1, 5) }),
        () => ({ from: 12, step: -3, to: 3, then: pick(['hold', 'repeat', 'done']) }),
        () => ({ list: [5, 10, 15], then: pick(['hold', 'repeat', 'done']) }),
      ])()
    const many = <T>(make: () => T) => Array.from({ length: whole(1, 5) }, make)
    const base = () => ({
      movement: pick(['goblet-squat', 'floor-press', 'row', 'jack', 'plank', 'gone']),
      sides: pick(['together', 'alternate', 'each'] as const),
    })
    const format = (): Format =>
      pick<() => Format>([
        () => ({
          type: 'rounds',
          seconds: whole(1, 900),
          stations: many(() => ({ ...base(), reps: reps() })),
        }),
        () => ({
          type: 'for-time',
          rounds: whole(1, 6),
          cap: whole(1, 900),
          stations: many(() => ({ ...base(), reps: reps() })),
        }),
        () => ({
          type: 'intervals',
          rounds: whole(1, 5),
          roundRest: whole(0, 60),
          stations: many(() => ({ ...base(), work: whole(1, 60), rest: whole(0, 30) })),
        }),
        () => ({
          type: 'every',
          seconds: whole(1, 120),
          times: whole(1, 12),
          stations: many(() => ({ ...base(), reps: reps() })),
        }),
        () => ({ type: 'holds', stations: many(() => ({ ...base(), seconds: whole(1, 60) })) }),
        () => ({ type: 'rest', seconds: whole(1, 90) }),
      ])()
    for (let run = 0; run < 150; run += 1) {
      const movements = all.map((movement) => ({
        ...movement,
        pattern: pick(PATTERNS),
        position: pick(POSITIONS),
        impact: pick(IMPACTS),
        joints: JOINTS.filter(() => random() < 0.3),
        kit: ['dumbbell', 'dumbbell', 'kettlebell', 'mat'].filter(() => random() < 0.4),
      }))
      const version = versionOf(
        many(format).map((one, index) =>
          block(`b${index}`, one, { kind: pick(['work', 'finisher', 'mobility']) }),
        ),
        movements,
      )
      const options = Object.fromEntries(
        version.spec.blocks.flatMap(({ id }) => [
          [`${id}/0`, 'to-a-chair'],
          [`${id}/1`, 'nothing-known'],
        ]),
      )
      for (const input of [{}, { options, tiring: 0.6, tempoSeconds: 2 }]) {
        const load = classLoad(version, input)
        for (const one of load.patterns) {
          expect(one.estimatedReps).toBeLessThanOrEqual(one.reps)
          expect(Number.isSafeInteger(one.reps) && Number.isSafeInteger(one.holdSeconds)).toBe(true)
        }
        const total = load.patterns.reduce((sum, one) => sum + one.reps, 0)
        expect(load.jumpContacts).toBeLessThanOrEqual(total)
        expect(load.pushToPull === null).toBe(load.pushReps === 0 || load.pullReps === 0)
        for (const ways of load.floorWays) {
          expect(ways.perRound).toBeGreaterThan(0)
          expect(ways.impliedSeconds).toBeGreaterThanOrEqual(6 * ways.perRound)
          expect(ways.plannedSeconds).toBeGreaterThanOrEqual(0)
        }
        const { floorWays, impliedSeconds } = load.changesInClass
        expect(impliedSeconds).toBeGreaterThanOrEqual(6 * floorWays)
        for (const row of load.inARow) expect(row.blocks.length).toBeGreaterThan(1)
        const twice = sumLoads([load, load])
        expect(twice.patterns.reduce((sum, one) => sum + one.reps, 0)).toBe(2 * total)
        // Rounds come to what the forecast says of them.
        const isKnown = (one: Block) =>
          (one.format.type === 'rounds' || one.format.type === 'for-time') &&
          one.format.stations.every((station) => station.movement !== 'gone')
        for (const one of version.spec.blocks.filter(isKnown)) {
          const alone = { ...version, spec: { ...version.spec, blocks: [one] } }
          expect(
            classLoad(alone, input).patterns.reduce((sum, pattern) => sum + pattern.reps, 0),
          ).toBe(forecast(alone, { tiring: 0.25, ...input })[0]?.totalReps)
        }
      }
      const events = version.spec.blocks.flatMap((one): Draft[] => [
        { type: 'load-noted', block: one.id, station: whole(0, 4), kilograms: whole(0, 50) },
        { type: 'round-done', block: one.id, round: whole(1, 4), by: 'member' },
        { type: 'reps-noted', block: one.id, round: whole(1, 4), reps: whole(0, 90) },
        { type: 'paused', classMs: whole(0, 900_000) },
      ])
      const sum = tonnage(fold(version, stamped([start, ...events])), version)
      if (sum) expect(Number.isFinite(sum.kilograms) && sum.kilograms >= 0).toBe(true)
      expect(swaps(version, crowd).every((one) => one.members <= one.of)).toBe(true)
    }
  })
})
