/** Loads of small classes, worked out by hand from the rules; the figures for kit and floor are the house's own. */
import { describe, expect, it } from 'vitest'
import { classLoad, sumLoads } from '@/server/engine/load/class-load'
import type { Movement } from '@/server/engine/spec/movement'
import { block, press, squat, versionOf } from './classes'

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
          // 20 reps of 3 s fit into 60 s fresh; at the expected pace (each t later by 0.25·t/60) it is 17.
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
})
