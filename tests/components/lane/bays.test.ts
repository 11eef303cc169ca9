import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import {
  baysOf,
  clockText,
  laneLengthMs,
  nameWidthEm,
  percent,
  shortName,
  type LaneBlock,
} from '@/components/lane/bays'
import { placeFigures } from '@/components/lane/place-figures'
import type { Segment } from '@/server/engine/timeline/types'

const BLOCKS: LaneBlock[] = [
  { id: 'warm', title: 'Warm-up', kind: 'warm-up' },
  { id: 'one', title: 'Squat and push', kind: 'work' },
  { id: 'end', title: 'Finisher', kind: 'finisher' },
  { id: 'rest', title: 'Rest', kind: 'rest' },
  { id: 'two', title: 'Ladder: hinge and press', kind: 'work' },
]
const SEGMENTS: Segment[] = [
  { kind: 'brief', block: 'warm', startMs: 0, endMs: 0 },
  { kind: 'work', block: 'warm', startMs: 0, endMs: 40_000 },
  { kind: 'rest', block: 'warm', startMs: 40_000, endMs: 60_000 },
  { kind: 'work', block: 'warm', startMs: 60_000, endMs: 100_000 },
  { kind: 'count-in', block: 'one', startMs: 100_000, endMs: 105_000 },
  { kind: 'work', block: 'one', startMs: 105_000, endMs: 405_000 },
  { kind: 'count-in', block: 'end', startMs: 405_000, endMs: 410_000 },
  { kind: 'work', block: 'end', startMs: 410_000, endMs: 470_000 },
  { kind: 'rest', block: 'rest', startMs: 470_000, endMs: 530_000 },
  { kind: 'work', block: 'two', startMs: 530_000, endMs: 830_000 },
]

/** A class of any blocks, laid end to end, as a compiled one is. */
const anyClass = fc
  .array(
    fc.record({
      kind: fc.constantFrom<LaneBlock['kind'][]>(
        'work',
        'warm-up',
        'finisher',
        'rest',
        'mobility',
        'cool-down',
      ),
      pieces: fc.array(fc.integer({ min: 1000, max: 900_000 }), { minLength: 1, maxLength: 6 }),
    }),
    { minLength: 1, maxLength: 40 },
  )
  .map((list) => {
    const blocks: LaneBlock[] = []
    const segments: Segment[] = []
    let at = 0
    list.forEach(({ kind, pieces }, index) => {
      const id = `b${index}`
      blocks.push({ id, title: `Block ${index}`, kind })
      pieces.forEach((length, which) => {
        const rests = kind === 'rest' || which % 2 === 1
        segments.push({ kind: rests ? 'rest' : 'work', block: id, startMs: at, endMs: at + length })
        at += length
      })
    })
    return { blocks, segments }
  })

describe('bays of a lane', () => {
  it('lie side by side and sum to the whole class', () => {
    fc.assert(
      fc.property(anyClass, ({ blocks, segments }) => {
        const bays = baysOf(segments, blocks)
        expect(bays[0]?.startMs).toBe(0)
        bays.forEach((bay, index) => {
          if (index > 0) expect(bay.startMs).toBe(bays[index - 1]?.endMs)
        })
        const widths = bays.map((bay) =>
          parseFloat(percent(bay.endMs - bay.startMs, laneLengthMs(segments))),
        )
        expect(widths.reduce((sum, width) => sum + width, 0)).toBeCloseTo(100, 1)
      }),
    )
  })

  it('number the work blocks alone', () => {
    expect(baysOf(SEGMENTS, BLOCKS).map((bay) => bay.number)).toEqual([null, 1, null, null, 2])
  })

  it('paint work filled, finishers hatched, warm-ups low, rests open', () => {
    expect(baysOf(SEGMENTS, BLOCKS).map((bay) => bay.paint)).toEqual([
      'low',
      'filled',
      'hatched',
      'open',
      'filled',
    ])
  })

  it('leave rests inside a block open, unless they are too fine to see', () => {
    expect(baysOf(SEGMENTS, BLOCKS)[0]?.pieces).toHaveLength(2)
    expect(baysOf(SEGMENTS, BLOCKS, null, 20_000)[0]?.pieces).toEqual([
      { startMs: 0, endMs: 100_000 },
    ])
  })

  it('tell what is done, present and coming, and nothing is present before class', () => {
    const states = (at: number | null) => baysOf(SEGMENTS, BLOCKS, at).map((bay) => bay.state)
    expect(states(null)).toEqual(Array(5).fill('coming'))
    expect(states(0)).toEqual(Array(5).fill('coming'))
    expect(states(405_000)).toEqual(['done', 'done', 'present', 'coming', 'coming'])
    expect(states(830_000)).toEqual(Array(5).fill('done'))
  })
})

describe('names on a lane', () => {
  it('shorten to what says something alone', () => {
    expect(shortName('Ladder: hinge and press')).toBe('Hinge and press')
    expect(shortName('Circuit with two dumbbells')).toBe('Circuit')
    expect(shortName('Warm-up')).toBe('Warm-up')
    expect(shortName('Row and lunge')).toBe('Row and lunge')
  })

  it('are reckoned wider the longer they are', () => {
    expect(nameWidthEm('Row and lunge')).toBeGreaterThan(nameWidthEm('Row'))
  })

  it('write lengths as clocks', () => {
    expect([clockText(300_000), clockText(75_000), clockText(5_400_000)]).toEqual([
      '5:00',
      '1:15',
      '1:30:00',
    ])
  })
})

describe('figures on a lane', () => {
  it('never overlap, keep their order and stay inside', () => {
    const wanted = fc.array(
      fc.record({
        figure: fc.constant('standing'),
        centre: fc.integer({ min: 0, max: 7000 }),
        width: fc.integer({ min: 150, max: 1100 }),
        rank: fc.integer({ min: 0, max: 10 }),
      }),
      { maxLength: 30 },
    )
    fc.assert(
      fc.property(wanted, (list) => {
        const placed = placeFigures(list, 7000, 30)
        placed.forEach((each, index) => {
          const next = placed[index + 1]
          expect(each.left).toBeGreaterThanOrEqual(-1e-6)
          expect(each.left + each.width).toBeLessThanOrEqual(7000 + 1e-6)
          if (next) expect(next.left).toBeGreaterThanOrEqual(each.left + each.width + 30 - 1e-6)
        })
        const order = placed.map((each) =>
          list.findIndex(
            (one) =>
              one.centre === each.centre && one.width === each.width && one.rank === each.rank,
          ),
        )
        expect(order.every((index) => index >= 0)).toBe(true)
      }),
    )
  })

  it('give way by rank where there is no room for all', () => {
    const one = { figure: 'squat', centre: 100, width: 600, rank: 10 }
    const two = { figure: 'plank', centre: 200, width: 600, rank: 9 }
    expect(placeFigures([one, two], 1000, 30).map((each) => each.figure)).toEqual(['squat'])
  })
})
