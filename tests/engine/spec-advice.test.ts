import { describe, expect, it } from 'vitest'
import { advise } from '@/server/engine/spec/advice'
import { check } from '@/server/engine/spec/problems'
import type { Movement } from '@/server/engine/spec/movement'
import type { Block, Cue, Format } from '@/server/engine/spec/schema'
import { block, press, squat, versionOf } from './classes'

const warmUp = block('w', rounds(60, 'march'), { kind: 'warm-up', brief: 'Easy.' })
const march: Movement = { ...squat, slug: 'march', joints: [] }
const plank: Movement = { ...press, slug: 'plank', position: 'hands-and-feet', joints: ['wrist'] }
const chair: Movement = { ...squat, slug: 'chair', position: 'seated', joints: [] }

function rounds(seconds: number, ...movements: string[]): Format {
  return {
    type: 'rounds',
    seconds,
    stations: movements.map((movement) => ({ movement, reps: 5 })),
  }
}
function adviceOn(...blocks: Block[]) {
  const version = versionOf(blocks, [squat, press, march, plank, chair])
  expect(check(version.spec)).toEqual([])
  return advise(version).map((one) => `${one.kind} ${one.path}`)
}

describe('advice', () => {
  it('has nothing to say of a class with all in place', () => {
    expect(adviceOn(warmUp, block('a', rounds(240, 'goblet-squat')))).toEqual([])
  })

  describe('on the warm-up', () => {
    it('misses one before the first work, though one comes later', () => {
      expect(adviceOn(block('a', rounds(60, 'march')))).toEqual(['warm-up blocks[0]'])
      expect(adviceOn(block('a', rounds(60, 'march')), warmUp)).toEqual(['warm-up blocks[0]'])
    })
    it('asks for none where nothing is worked', () => {
      expect(adviceOn(block('a', rounds(60, 'march'), { kind: 'mobility' }))).toEqual([])
    })
  })

  describe('on what is said', () => {
    const cue = (id: string, s: number, words: number, more: Partial<Cue> = {}): Cue => ({
      id,
      text: 'Tall',
      spoken: Array.from({ length: words }, () => 'tall').join(' '),
      kind: 'form',
      at: { from: 'start', s },
      ...more,
    })
    const withCues = (...cues: Cue[]) =>
      adviceOn(warmUp, block('a', rounds(240, 'goblet-squat'), { cues }))
    it('finds the cue that cannot start within 5 s', () => {
      expect(withCues(cue('a', 10, 15), cue('b', 11, 2))).toEqual([])
      expect(withCues(cue('a', 10, 16), cue('b', 11, 2))).toEqual(['speech blocks[1].cues[1]'])
      expect(withCues(cue('a', 10, 16), cue('b', 11, 2, { say: false }))).toEqual([])
    })
    it('finds the cue that a safety cue cuts', () => {
      expect(withCues(cue('a', 10, 10), cue('b', 12, 2, { kind: 'safety' }))).toEqual([
        'speech blocks[1].cues[0]',
      ])
    })
  })

  describe('on the joints', () => {
    const work = (id: string, ...movements: string[]) => block(id, rounds(240, ...movements))
    const rest = block('r', { type: 'rest', seconds: 60 })
    it('counts three blocks in a row once, whatever rests lie between', () => {
      const blocks = [warmUp, work('a', 'goblet-squat'), rest, work('b', 'goblet-squat')]
      expect(adviceOn(...blocks)).toEqual([])
      expect(adviceOn(...blocks, work('c', 'goblet-squat'), work('d', 'goblet-squat'))).toEqual([
        'load blocks[4]',
        'load blocks[4]',
      ])
    })
    it('begins anew after a block that spares the joint, or is no work', () => {
      const two = [warmUp, work('a', 'goblet-squat'), work('b', 'goblet-squat')]
      expect(adviceOn(...two, work('m', 'march'), work('c', 'goblet-squat'))).toEqual([])
      const easy = block('m', rounds(60, 'goblet-squat'), { kind: 'mobility' })
      expect(adviceOn(...two, easy, work('c', 'goblet-squat'))).toEqual([])
    })
    it('takes a block as loading what at least half of its stations load', () => {
      const third = (id: string) => work(id, 'goblet-squat', 'march', 'march')
      expect(adviceOn(warmUp, third('a'), third('b'), third('c'))).toEqual([])
    })
  })

  describe('on the room from floor to standing', () => {
    const inside = (format: Format) => adviceOn(warmUp, block('a', format))
    it.each<[string, number | undefined, string[]]>([
      ['the default change of 4 s', undefined, ['room blocks[1].format.stations[0]']],
      ['a change of 5.9 s', 5.9, ['room blocks[1].format.stations[0]']],
      ['a change of 6 s', 6, []],
    ])('between stations of a round: %s', (_name, change, expected) => {
      const from = { movement: 'plank', reps: 5, ...(change === undefined ? {} : { change }) }
      const stations = [from, { movement: 'goblet-squat', reps: 5 }]
      expect(inside({ type: 'rounds', seconds: 240, stations })).toEqual(expected)
    })
    it('between pieces by the clock, a round’s last and first among them', () => {
      const timed = (rest: number, roundRest: number): Format => ({
        type: 'intervals',
        rounds: 2,
        roundRest,
        stations: [
          { movement: 'goblet-squat', work: 40, rest: 0 },
          { movement: 'plank', work: 40, rest },
        ],
      })
      expect(inside(timed(5, 0))).toEqual(['room blocks[1].format.stations[1]'])
      expect(inside(timed(6, 0))).toEqual([])
      expect(inside(timed(0, 6))).toEqual([])
    })
    it('in what is left of an interval', () => {
      const every = (reps: number): Format => ({
        type: 'every',
        seconds: 30,
        times: 2,
        stations: [
          { movement: 'plank', reps, tempo: [1, 0, 1, 0] },
          { movement: 'goblet-squat', reps: 5 },
        ],
      })
      expect(inside(every(12))).toEqual([])
      expect(inside(every(13))).toEqual(['room blocks[1].format.stations[0]'])
    })
    it('between blocks: rests, briefs and count-in are room', () => {
      const floor = block('f', rounds(240, 'plank'))
      const standing = (more: Partial<Block>) =>
        block('s', rounds(240, 'goblet-squat'), { ...more })
      expect(adviceOn(warmUp, floor, standing({}))).toEqual(['room blocks[2]'])
      expect(adviceOn(warmUp, floor, standing({ countIn: 6 }))).toEqual([])
      expect(adviceOn(warmUp, floor, standing({ brief: 'Get up.' }))).toEqual([])
      const rest = block('r', { type: 'rest', seconds: 6 })
      expect(adviceOn(warmUp, floor, rest, standing({}))).toEqual([])
    })
    it('asks none from a chair', () => {
      expect(inside(rounds(240, 'chair', 'goblet-squat'))).toEqual([])
    })
  })
})
