import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { forecast, lastForecastRound, rungs } from '@/server/engine/pace/forecast'
import { TIRING, expectedStationStartMs } from '@/server/engine/pace/walk'
import type { Format, Reps, Sides, Station, Tempo } from '@/server/engine/spec/schema'
import { block, press, squat, versionOf } from './classes'

const bare: Pick<typeof squat, 'secondsPerRep' | 'change'> = {}
const untimed = [squat, press].map(({ secondsPerRep: _, change: __, ...rest }) => ({
  ...rest,
  ...bare,
}))

function station(reps: Reps, seconds?: number, change?: number, sides?: Sides): Station {
  const tempo: Tempo | undefined = seconds === undefined ? undefined : [seconds, 0, 0, 0]
  return {
    movement: 'goblet-squat',
    reps,
    ...(tempo ? { tempo } : {}),
    ...(change === undefined ? {} : { change }),
    ...(sides ? { sides } : {}),
  }
}

function forecastOf(
  format: Format,
  tiring = 0,
  more: { tempoSeconds?: number; changeSeconds?: number } = {},
) {
  const [only] = forecast(versionOf([block('b1', format)], untimed), { tiring, ...more })
  if (!only) throw new Error('no forecast')
  return only
}

/** Reps of round n by the rules of the spec, written anew: an endless array of rungs. */
function rungAt(reps: Reps, round: number): number | null {
  if (typeof reps === 'number') return reps
  const all: number[] = []
  if ('list' in reps) all.push(...reps.list)
  else {
    const isUp = reps.step > 0
    for (let rung = reps.from; all.length < round + 1; rung += reps.step) {
      if (reps.to !== undefined && (isUp ? rung > reps.to : rung < reps.to)) break
      all.push(rung)
    }
  }
  const then = reps.then ?? ('list' in reps ? 'repeat' : 'hold')
  if (round <= all.length) return all[round - 1] ?? null
  if (then === 'done') return null
  if (then === 'hold') return all.at(-1) ?? null
  return all[(round - 1) % all.length] ?? null
}

/**
 * An independent forecast: the whole schedule as a list of things that take time, then a clock run
 * over it. With f = 0 the clock counts whole tenths of a second, so it is exact.
 */
function schedule(format: Extract<Format, { type: 'rounds' | 'for-time' }>, tiring: number) {
  type Thing =
    | { kind: 'rep'; round: number; station: number; lastOfRound: boolean; tenths: number }
    | { kind: 'change'; tenths: number }
  const lengthTenths = (format.type === 'rounds' ? format.seconds : format.cap) * 10
  const things: Thing[] = []
  let least = 0
  for (let round = 1; least <= lengthTenths; round += 1) {
    if (format.type === 'for-time' && round > format.rounds) break
    const reps = format.stations.map((one) => rungAt(one.reps, round))
    if (reps.some((one) => one === null)) break
    format.stations.forEach((one, index) => {
      const count = (reps[index] ?? 0) * (one.sides === 'each' ? 2 : 1)
      const tenths = Math.round((one.tempo ?? [3, 0, 0, 0]).reduce((a, b) => a + b, 0) * 10)
      for (let rep = 1; rep <= count && least <= lengthTenths; rep += 1) {
        const lastOfRound = index === format.stations.length - 1 && rep === count
        things.push({ kind: 'rep', round, station: index, lastOfRound, tenths })
        least += tenths
      }
      if (format.stations.length > 1) {
        things.push({ kind: 'change', tenths: Math.round((one.change ?? 4) * 10) })
      }
    })
  }
  const perStation = format.stations.map(() => 0)
  let clock = 0
  let rounds = 0
  let reps = 0
  let finish: number | null = null
  for (const thing of things) {
    clock += thing.tenths * (1 + (tiring * clock) / lengthTenths)
    if (clock > lengthTenths + (tiring === 0 ? 0 : 1e-6)) break
    if (thing.kind === 'change') continue
    perStation[thing.station] = (perStation[thing.station] ?? 0) + 1
    reps += 1
    if (thing.lastOfRound) {
      rounds = thing.round
      reps = 0
      if (format.type === 'for-time' && rounds === format.rounds) finish = clock / 10
    }
  }
  return { rounds, reps, perStation, finish }
}

describe('forecast: worked examples of the session spec', () => {
  it('gives 20 reps and 4 + 0 for one station of 5 reps at 3 s a rep in 60 s', () => {
    expect(forecastOf({ type: 'rounds', seconds: 60, stations: [station(5, 3)] })).toEqual({
      block: 'b1',
      rounds: 4,
      reps: 0,
      totalReps: 20,
      perStation: [20],
      finishSeconds: null,
    })
  })

  const two = [station(4, 2, 5), { ...station(6, 2, 5), movement: 'floor-press' }]
  it('ends the seventh round exactly at 205 s: 7 + 0', () => {
    expect(forecastOf({ type: 'rounds', seconds: 205, stations: two })).toMatchObject({
      rounds: 7,
      reps: 0,
      totalReps: 70,
      perStation: [28, 42],
    })
  })
  it('reaches 6 + 7 in 200 s, since a rep that ends after T does not count', () => {
    expect(forecastOf({ type: 'rounds', seconds: 200, stations: two })).toMatchObject({
      rounds: 6,
      reps: 7,
      perStation: [28, 39],
    })
  })
})

describe('forecast: rules', () => {
  it('counts a rep that ends exactly at T where tenths of seconds do not add up in binary', () => {
    // 600 × 0.1 s is 60 s; the floating-point sum is not.
    const made = forecastOf({ type: 'rounds', seconds: 60, stations: [station(1, 0.1)] })
    expect(made).toMatchObject({ rounds: 600, reps: 0 })
    const ladder = forecastOf({ type: 'rounds', seconds: 63, stations: [station(3, 0.7)] })
    expect(ladder).toMatchObject({ rounds: 30, reps: 0 })
  })
  it('pays nothing after the last rep of all and finishes at the cap exactly', () => {
    const stations = [station(5, 2, 10), station(5, 2, 10)]
    // Two rounds: 4 × 10 s of reps and three changes of 10 s.
    const format: Format = { type: 'for-time', rounds: 2, cap: 70, stations }
    expect(forecastOf(format)).toMatchObject({ rounds: 2, reps: 0, finishSeconds: 70 })
    expect(forecastOf({ ...format, cap: 69 })).toMatchObject({
      rounds: 1,
      reps: 9,
      finishSeconds: null,
    })
  })
  it('counts both sides of each, and an alternating total once', () => {
    expect(
      forecastOf({ type: 'rounds', seconds: 60, stations: [station(5, 3, 0, 'each')] }),
    ).toMatchObject({ rounds: 2, reps: 0, totalReps: 20 })
    expect(
      forecastOf({ type: 'rounds', seconds: 60, stations: [station(5, 3, 0, 'alternate')] }),
    ).toMatchObject({ rounds: 4, totalReps: 20 })
  })
  it('ends with the last rung that every station of a done ladder has', () => {
    const stations = [
      station({ from: 12, step: -3, to: 3, then: 'done' }, 1, 0),
      station({ list: [2, 4], then: 'done' }, 1, 0),
    ]
    // Rounds 1 and 2: 12 + 2 and 9 + 4.
    expect(forecastOf({ type: 'rounds', seconds: 3_600, stations })).toEqual({
      block: 'b1',
      rounds: 2,
      reps: 0,
      totalReps: 27,
      perStation: [21, 6],
      finishSeconds: null,
    })
  })
  it('forecasts blocks whose rounds nobody could log', () => {
    const format: Format = {
      type: 'rounds',
      seconds: 60,
      counted: false,
      stations: [station(5, 3)],
    }
    expect(forecastOf(format)).toMatchObject({ rounds: 4 })
  })
  it('takes 3 s a rep and 4 s a change, or what is given, where nothing says better', () => {
    const format: Format = { type: 'rounds', seconds: 38, stations: [station(5), station(5)] }
    expect(forecastOf(format)).toMatchObject({ rounds: 1, reps: 0 })
    expect(forecastOf(format, 0, { tempoSeconds: 1, changeSeconds: 0 })).toMatchObject({
      rounds: 3,
      reps: 8,
    })
  })
  it('takes the option in force: its reps and its tempo', () => {
    const version = versionOf([
      block('b1', {
        type: 'rounds',
        seconds: 84,
        stations: [{ movement: 'goblet-squat', reps: 4 }],
      }),
    ])
    expect(forecast(version, { tiring: 0 })[0]).toMatchObject({ rounds: 7, reps: 0 })
    const slow = forecast(version, { tiring: 0, options: { 'b1/0': 'slow' } })
    expect(slow[0]).toMatchObject({ rounds: 3, reps: 0 })
  })
  it('is not hung by a tempo of nothing or by the longest block of the quickest reps', () => {
    const idle: Station = { movement: 'goblet-squat', reps: 500, tempo: [0, 0, 0, 0], change: 0 }
    expect(forecastOf({ type: 'rounds', seconds: 60, stations: [idle] })).toMatchObject({
      reps: 20,
    })
    const quick = forecastOf({
      type: 'rounds',
      seconds: 10_800,
      stations: [station({ from: 1, step: 500 }, 0.1)],
    })
    expect(quick.totalReps).toBe(108_000)
  })
  it('takes, for reps of one length, the closed form of t → t + d (1 + f t / T)', () => {
    // t_n = (T / f) ((1 + f d / T)^n − 1), so n = ⌊ln(1 + f) / ln(1 + f d / T)⌋.
    for (const f of [TIRING.expected, TIRING.tiring, 1]) {
      for (const [seconds, d] of [
        [60, 3],
        [240, 2.5],
        [600, 4],
        [1_200, 3.3],
      ] as const) {
        const made = forecastOf({ type: 'rounds', seconds, stations: [station(1, d)] }, f)
        expect(made.rounds).toBe(Math.floor(Math.log(1 + f) / Math.log(1 + (f * d) / seconds)))
      }
    }
  })
})

describe('forecast against an independent schedule', () => {
  const reps: fc.Arbitrary<Reps> = fc.oneof(
    fc.integer({ min: 1, max: 20 }),
    fc.record({ from: fc.integer({ min: 1, max: 6 }), step: fc.integer({ min: 1, max: 5 }) }),
    fc.record({
      from: fc.integer({ min: 9, max: 15 }),
      step: fc.integer({ min: -4, max: -1 }),
      to: fc.integer({ min: 1, max: 8 }),
      then: fc.constantFrom('hold', 'repeat', 'done'),
    }),
    fc.record({
      list: fc.array(fc.integer({ min: 1, max: 12 }), { minLength: 1, maxLength: 6 }),
      then: fc.constantFrom('hold', 'repeat', 'done'),
    }),
  )
  const stationOf = fc
    .record({
      reps,
      tenths: fc.integer({ min: 5, max: 60 }),
      changeTenths: fc.integer({ min: 0, max: 120 }),
      sides: fc.constantFrom<Sides>('together', 'alternate', 'each'),
    })
    .map((one) => station(one.reps, one.tenths / 10, one.changeTenths / 10, one.sides))
  const stations = fc.array(stationOf, { minLength: 1, maxLength: 4 })

  it.each([0, 0.25, 0.6])('agrees for rounds with f = %s', (tiring) => {
    fc.assert(
      fc.property(stations, fc.integer({ min: 10, max: 900 }), (all, seconds) => {
        const format = { type: 'rounds' as const, seconds, stations: all }
        const { finish: _, ...expected } = schedule(format, tiring)
        expect(forecastOf(format, tiring)).toMatchObject(expected)
      }),
      { seed: 20_261_201, numRuns: 150 },
    )
  })
  it.each([0, 0.25])('agrees for time with f = %s', (tiring) => {
    const few = fc.integer({ min: 1, max: 8 })
    fc.assert(
      fc.property(stations, few, fc.integer({ min: 10, max: 900 }), (all, rounds, cap) => {
        // `check` refuses more rounds than rungs, so no ladder here may run out.
        const open = all.map((one) =>
          typeof one.reps === 'object' && one.reps.then === 'done'
            ? { ...one, reps: { ...one.reps, then: 'repeat' as const } }
            : one,
        )
        const format = { type: 'for-time' as const, rounds, cap, stations: open }
        const { finish, ...expected } = schedule(format, tiring)
        const made = forecastOf(format, tiring)
        expect(made).toMatchObject(expected)
        if (finish === null) expect(made.finishSeconds).toBeNull()
        else expect(made.finishSeconds).toBeCloseTo(finish, 5)
      }),
      { seed: 20_261_202, numRuns: 150 },
    )
  })
})

describe('rungs and the places inside a round', () => {
  const version = versionOf([
    block('b1', {
      type: 'rounds',
      seconds: 205,
      stations: [station(4, 2, 5), station(6, 2, 5)],
    }),
  ])
  const [only] = version.spec.blocks
  const plan = only ? blockPlan(version, only) : null

  it('draws rungs as long as their reps, up to the last one that can come', () => {
    if (!plan) throw new Error('no plan')
    expect(rungs(plan, 3)).toEqual([
      { round: 1, reps: 10 },
      { round: 2, reps: 10 },
      { round: 3, reps: 10 },
    ])
    expect(rungs({ ...plan, roundLimit: 2 }, 9)).toHaveLength(2)
    expect(lastForecastRound({ rounds: 6, reps: 7 })).toBe(7)
    expect(lastForecastRound({ rounds: 7, reps: 0 })).toBe(7)
  })
  it('puts a later station where the expected pace does, and nowhere past the end', () => {
    if (!plan) throw new Error('no plan')
    // By hand: 4 reps of 2 s and a change of 5 s, each × (1 + 0.25 t / 205).
    let at = 0
    for (const planned of [2, 2, 2, 2, 5]) at += planned * (1 + (0.25 * at) / 205)
    expect(expectedStationStartMs(plan, 1, 1, 0)).toBe(Math.round(at * 1_000))
    expect(expectedStationStartMs(plan, 7, 1, 200_000)).toBeNull()
  })
})
