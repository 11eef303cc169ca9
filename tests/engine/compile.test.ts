import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Block, Cue, Format, SessionSpec } from '@/server/engine/spec/schema'
import { check } from '@/server/engine/spec/problems'
import { briefMs, compile, realLengthMs } from '@/server/engine/timeline/compile'
import type { Mark } from '@/server/engine/timeline/types'

const rounds = (seconds: number): Format => ({
  type: 'rounds',
  seconds,
  stations: [{ movement: 'squat', reps: 5 }],
})
const rest = (seconds: number): Format => ({ type: 'rest', seconds })
const block = (id: string, format: Format, more: Partial<Block> = {}): Block => ({
  id,
  kind: format.type === 'rest' ? 'rest' : 'mobility',
  title: id,
  format,
  ...more,
})
const spec = (...blocks: Block[]): SessionSpec => ({ spec: 1, title: 'Class', blocks })
const run = (...blocks: Block[]) => compile({ spec: spec(...blocks) })
const shape = (...blocks: Block[]) =>
  run(...blocks).segments.map(({ kind, startMs, endMs, round, station, side }) =>
    [kind, (endMs - startMs) / 1_000, round, station, side]
      .filter((part) => part !== undefined)
      .join(' '),
  )
const cue = (id: string, at: Cue['at'], kind: Cue['kind'] = 'form'): Cue => ({
  id,
  text: id,
  kind,
  at,
})

describe('segments', () => {
  it('are the whole work of rounds and of for-time, with the movement where there is one station', () => {
    expect(run(block('a', rounds(240))).segments).toEqual([
      { kind: 'work', block: 'a', startMs: 0, endMs: 240_000, movement: 'squat' },
    ])
    const two: Format = {
      type: 'for-time',
      rounds: 3,
      cap: 300,
      stations: [
        { movement: 'a', reps: 1 },
        { movement: 'b', reps: 1 },
      ],
    }
    expect(run(block('a', two)).segments).toEqual([
      { kind: 'work', block: 'a', startMs: 0, endMs: 300_000 },
    ])
  })

  it('of intervals: work and rest in turn, round rest instead of the last rest, nothing after the last work', () => {
    const format = (roundRest?: number): Format => ({
      type: 'intervals',
      rounds: 2,
      ...(roundRest === undefined ? {} : { roundRest }),
      stations: [
        { movement: 'a', work: 40, rest: 20 },
        { movement: 'b', work: 30, rest: 10 },
      ],
    })
    expect(shape(block('a', format(60)))).toEqual([
      'work 40 1 0',
      'rest 20 1 0',
      'work 30 1 1',
      'rest 60 1 1',
      'work 40 2 0',
      'rest 20 2 0',
      'work 30 2 1',
    ])
    expect(shape(block('a', format(0)))[3]).toBe('rest 10 1 1')
    expect(shape(block('a', format()))[3]).toBe('rest 10 1 1')
  })

  it('of each side: left, switch, right, then the rest; a switch of 0 is left out', () => {
    const format = (more: object): Format => ({
      type: 'intervals',
      rounds: 1,
      stations: [
        { movement: 'a', work: 20, rest: 10, sides: 'each', ...more },
        { movement: 'b', work: 30, rest: 10 },
      ],
    })
    expect(shape(block('a', format({ switch: 4 })))).toEqual([
      'work 20 1 0 left',
      'switch 4 1 0',
      'work 20 1 0 right',
      'rest 10 1 0',
      'work 30 1 1',
    ])
    expect(shape(block('a', format({})))).toEqual([
      'work 20 1 0 left',
      'work 20 1 0 right',
      'rest 10 1 0',
      'work 30 1 1',
    ])
  })

  it('of every: one work an interval, stations in turn', () => {
    const format: Format = {
      type: 'every',
      seconds: 60,
      times: 3,
      stations: [
        { movement: 'a', reps: 5 },
        { movement: 'b', reps: 5 },
      ],
    }
    expect(shape(block('a', format))).toEqual(['work 60 1 0', 'work 60 1 1', 'work 60 2 0'])
  })

  it('of holds: a switch of 5 s unless set, no rest after the last', () => {
    const format: Format = {
      type: 'holds',
      stations: [
        { movement: 'a', seconds: 40, sides: 'each', rest: 15 },
        { movement: 'b', seconds: 30, rest: 15 },
      ],
    }
    expect(shape(block('a', format))).toEqual([
      'work 40 1 0 left',
      'switch 5 1 0',
      'work 40 1 0 right',
      'rest 15 1 0',
      'work 30 1 1',
    ])
  })

  it.each<[string, Block[], string[]]>([
    ['5 s before work', [block('a', rounds(60), { kind: 'work' })], ['count-in 5', 'work 60']],
    [
      '5 s before a finisher',
      [block('a', rounds(60), { kind: 'finisher' })],
      ['count-in 5', 'work 60'],
    ],
    ['none before a warm-up', [block('a', rounds(60), { kind: 'warm-up' })], ['work 60']],
    [
      'none straight after a rest',
      [block('r', rest(30)), block('a', rounds(60), { kind: 'work' })],
      ['rest 30', 'work 60'],
    ],
    [
      '5 s after a rest with a brief between',
      [block('r', rest(30)), block('a', rounds(60), { kind: 'work', brief: 'Go' })],
      ['rest 30', 'brief 0', 'count-in 5', 'work 60'],
    ],
    [
      'as set, even straight after a rest',
      [block('r', rest(30)), block('a', rounds(60), { kind: 'work', countIn: 3 })],
      ['rest 30', 'count-in 3', 'work 60'],
    ],
    [
      'none where it is set to 0',
      [block('a', rounds(60), { kind: 'work', countIn: 0 })],
      ['work 60'],
    ],
  ])('count in: %s', (_name, blocks, expected) => {
    expect(shape(...blocks)).toEqual(expected)
  })

  it('of a brief have no length in class time, and the real length adds it', () => {
    const blocks = [block('a', rounds(60), { brief: 'Set up two dumbbells.', briefSeconds: 20 })]
    expect(run(...blocks).lengthMs).toBe(60_000)
    expect(realLengthMs({ spec: spec(...blocks) })).toBe(80_000)
    expect(shape(block('a', rounds(60), { brief: 'x', briefSeconds: 0 }))).toEqual([
      'brief 0',
      'work 60',
    ])
  })
  it.each([
    ['one', 6],
    ['one two three four five', 7],
    ['one two three four five six', 8],
  ])('give a brief its reading time, words ÷ 2.5 + 5 s rounded up: %s', (brief, seconds) => {
    expect(briefMs(block('a', rounds(60), { brief }))).toBe(seconds * 1_000)
  })
})

describe('marks by length', () => {
  /** Marks of one work of `seconds` alone, as seconds left. */
  const of = (seconds: number) => {
    const { marks, lengthMs } = run(block('a', rounds(seconds)))
    const left = (mark: Mark) => (lengthMs - mark.atMs) / 1_000
    return {
      calls: marks.flatMap((mark) =>
        mark.what === 'call' ? [`${mark.left}${mark.half ? ' half' : ''}`] : [],
      ),
      callsAt: marks.flatMap((mark) => (mark.what === 'call' ? [left(mark)] : [])),
      short: marks.flatMap((mark) =>
        mark.what === 'beep' && mark.sound === 'short' ? [left(mark)] : [],
      ),
      double: marks.flatMap((mark) =>
        mark.what === 'beep' && mark.sound === 'double' ? [left(mark)] : [],
      ),
    }
  }
  it.each<[number, string[], number[]]>([
    [1, [], []],
    [2, [], [1]],
    [3, [], [2, 1]],
    [4, [], [3, 2, 1]],
    [9, [], [3, 2, 1]],
    [10, [], [3, 2, 1]],
    [15, [], [3, 2, 1]],
    [16, ['10'], [3, 2, 1]],
    [29, ['10'], [3, 2, 1]],
    [30, ['10'], [5, 4, 3, 2, 1]],
    [45, ['10'], [5, 4, 3, 2, 1]],
    [46, ['30', '10'], [5, 4, 3, 2, 1]],
    [119, ['30', '10'], [5, 4, 3, 2, 1]],
    [120, ['60 half', '30', '10'], [5, 4, 3, 2, 1]],
    [121, ['60.5 half', '30', '10'], [5, 4, 3, 2, 1]],
    [130, ['65 half', '30', '10'], [5, 4, 3, 2, 1]],
    [131, ['65.5 half', '60', '30', '10'], [5, 4, 3, 2, 1]],
    [300, ['150 half', '60', '30', '10'], [5, 4, 3, 2, 1]],
  ])('%d s', (seconds, calls, short) => {
    const marks = of(seconds)
    expect(marks.calls).toEqual(calls)
    expect(marks.callsAt).toEqual(calls.map((call) => Number.parseFloat(call)))
    expect(marks.short).toEqual(short)
    expect(marks.double).toEqual(seconds >= 120 ? [seconds / 2] : [])
  })

  it('end with start where work comes at once, else with end', () => {
    const ends = (...blocks: Block[]) =>
      run(...blocks).marks.flatMap((mark) =>
        mark.what === 'beep' && (mark.sound === 'start' || mark.sound === 'end')
          ? [mark.sound]
          : [],
      )
    expect(ends(block('a', rest(20)), block('b', rounds(20)))).toEqual(['start', 'end'])
    expect(ends(block('a', rest(20)), block('b', rounds(20), { brief: 'x' }))).toEqual([
      'end',
      'end',
    ])
    expect(ends(block('a', rounds(20)), block('b', rounds(20), { kind: 'work' }))).toEqual([
      'end',
      'start',
      'end',
    ])
  })
})

describe('next', () => {
  const nexts = (...blocks: Block[]) => run(...blocks).marks.filter((mark) => mark.what === 'next')
  it('comes 15 s before the end of work and rest of 30 s or more, and says what follows', () => {
    expect(nexts(block('a', rounds(30)), block('b', rest(30)), block('c', rounds(40)))).toEqual([
      { atMs: 15_000, what: 'next', block: 'b' },
      { atMs: 45_000, what: 'next', block: 'c' },
    ])
  })
  it('comes at the start of a shorter rest, and never in shorter work', () => {
    expect(nexts(block('a', rounds(29)), block('b', rest(29)), block('c', rounds(40)))).toEqual([
      { atMs: 29_000, what: 'next', block: 'c' },
    ])
  })
  it('looks past briefs, count-ins and switches, with round and station where there are any', () => {
    const holds: Format = {
      type: 'holds',
      stations: [{ movement: 'a', seconds: 40, sides: 'each' }],
    }
    expect(nexts(block('a', rounds(60)), block('b', holds, { brief: 'x', kind: 'work' }))).toEqual([
      { atMs: 45_000, what: 'next', block: 'b', round: 1, station: 0 },
      { atMs: 90_000, what: 'next', block: 'b', round: 1, station: 0 },
    ])
  })
  it.each([
    [{ from: 'end', s: 20 }, false],
    [{ from: 'end', s: 1 }, false],
    [{ from: 'end', s: 21 }, true],
    [{ from: 'end', s: 0 }, true],
  ] as const)('gives way to the coach’s own in the last 20 s: %o', (at, stays) => {
    const own = block('a', rounds(60), { cues: [cue('own', at, 'next')] })
    expect(nexts(own, block('b', rounds(60))).length).toBe(stays ? 1 : 0)
    const other = block('a', rounds(60), { cues: [cue('own', at, 'form')] })
    expect(nexts(other, block('b', rounds(60))).length).toBe(1)
  })
})

describe('cues', () => {
  const intervals: Format = {
    type: 'intervals',
    rounds: 2,
    stations: [
      { movement: 'a', work: 20, rest: 10, sides: 'each' },
      { movement: 'b', work: 30, rest: 10 },
    ],
  }
  const momentOf = (format: Format, at: Cue['at'], more: Partial<Block> = {}) => {
    const { marks, pending } = run(
      block('z', rest(10)),
      block('a', format, { cues: [cue('c', at)], ...more }),
    )
    return marks.find((mark) => mark.what === 'cue')?.atMs ?? pending[0]
  }
  it('count from the start and the end of the body, after its count-in', () => {
    expect(momentOf(rounds(60), { from: 'start', s: 0 }, { countIn: 5 })).toBe(15_000)
    expect(momentOf(rounds(60), { from: 'end', s: 0 }, { countIn: 5 })).toBe(75_000)
  })
  it('of rounds and stations stand where the clock sets them', () => {
    expect(momentOf(intervals, { round: 2 })).toBe(10_000 + 90_000)
    expect(momentOf(intervals, { station: 1 })).toBe(10_000 + 50_000)
    expect(momentOf(intervals, { station: 1, round: 2 })).toBe(10_000 + 140_000)
  })
  it('of rounds and stations wait for the member where the rounds are the member’s', () => {
    expect(momentOf(rounds(60), { round: 3 })).toEqual({ block: 'a', id: 'c', round: 3 })
    expect(momentOf(rounds(60), { station: 0 })).toEqual({
      block: 'a',
      id: 'c',
      round: 1,
      station: 0,
    })
  })
  it('at one moment stand in the order beep, call, cue as written, next', () => {
    const blocks = [
      block('a', rounds(60), {
        cues: [
          cue('second', { from: 'end', s: 15 }),
          cue('first', { from: 'start', s: 45 }),
          cue('ten', { from: 'end', s: 10 }),
          cue('five', { from: 'end', s: 5 }),
        ],
      }),
      block('b', rounds(60)),
    ]
    const at = (ms: number) =>
      run(...blocks)
        .marks.filter((mark) => mark.atMs === ms)
        .map((mark) => (mark.what === 'cue' ? mark.id : mark.what))
    expect(at(45_000)).toEqual(['second', 'first', 'next'])
    expect(at(50_000)).toEqual(['call', 'ten'])
    expect(at(55_000)).toEqual(['beep', 'five'])
  })
})

describe('any sound class', () => {
  const stationArb = fc.record({
    movement: fc.constant('a'),
    reps: fc.integer({ min: 1, max: 20 }),
  })
  const formatArb: fc.Arbitrary<Format> = fc.oneof(
    fc.record({
      type: fc.constant('rounds' as const),
      seconds: fc.integer({ min: 1, max: 400 }),
      stations: fc.array(stationArb, { minLength: 1, maxLength: 3 }),
    }),
    fc.record({
      type: fc.constant('intervals' as const),
      rounds: fc.integer({ min: 1, max: 4 }),
      roundRest: fc.integer({ min: 0, max: 40 }),
      stations: fc.array(
        fc.record({
          movement: fc.constant('a'),
          work: fc.integer({ min: 1, max: 60 }),
          rest: fc.integer({ min: 0, max: 40 }),
          sides: fc.constantFrom('each' as const, 'together' as const),
          switch: fc.integer({ min: 0, max: 6 }),
        }),
        { minLength: 1, maxLength: 3 },
      ),
    }),
    fc.record({
      type: fc.constant('every' as const),
      seconds: fc.integer({ min: 1, max: 90 }),
      times: fc.integer({ min: 1, max: 6 }),
      stations: fc.array(stationArb, { minLength: 1, maxLength: 3 }),
    }),
    fc.record({ type: fc.constant('rest' as const), seconds: fc.integer({ min: 1, max: 120 }) }),
  )
  const specArb = fc
    .array(fc.tuple(formatArb, fc.constantFrom('work', 'finisher', 'mobility'), fc.boolean()), {
      minLength: 1,
      maxLength: 5,
    })
    .map((parts) =>
      spec(
        ...parts.map(([format, kind, hasBrief], index) =>
          block(`b${index}`, format, {
            ...(format.type === 'rest' ? {} : { kind: kind as Block['kind'] }),
            ...(hasBrief ? { brief: 'Set up.' } : {}),
            cues: [cue('start', { from: 'start', s: 0 }), cue('end', { from: 'end', s: 0 })],
          }),
        ),
      ),
    )
  it('lies end to end, with its marks in order and inside it', () => {
    fc.assert(
      fc.property(specArb, (one) => {
        expect(check(one)).toEqual([])
        const timeline = compile({ spec: one })
        let atMs = 0
        for (const segment of timeline.segments) {
          expect(segment.startMs).toBe(atMs)
          expect(segment.endMs > segment.startMs || segment.kind === 'brief').toBe(true)
          atMs = segment.endMs
        }
        expect(timeline.lengthMs).toBe(atMs)
        const rank = { beep: 0, call: 1, cue: 2, next: 3 }
        timeline.marks.forEach((mark, index) => {
          expect(Number.isInteger(mark.atMs) && mark.atMs >= 0 && mark.atMs <= atMs).toBe(true)
          const before = timeline.marks[index - 1]
          if (!before) return
          expect(
            before.atMs < mark.atMs ||
              (before.atMs === mark.atMs && rank[before.what] <= rank[mark.what]),
          ).toBe(true)
        })
        // One end to each segment, none of it twice.
        const ends = timeline.marks.filter(
          (mark) => mark.what === 'beep' && (mark.sound === 'start' || mark.sound === 'end'),
        )
        expect(ends.length).toBe(
          timeline.segments.filter((segment) => segment.kind !== 'brief').length,
        )
      }),
      { numRuns: 150 },
    )
  })
})
