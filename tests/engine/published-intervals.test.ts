/** Lengths of interval and tempo schemes against published figures (shared reference: coaching-tempo-and-rest). */
import { describe, expect, it } from 'vitest'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { leadSchedule } from '@/server/engine/pace/lead'
import { FROM_THE_START } from '@/server/engine/pace/walk'
import type { Format, Tempo } from '@/server/engine/spec/schema'
import { compile } from '@/server/engine/timeline/compile'
import { block, versionOf } from './classes'

const secondsOf = (format: Format) =>
  compile(versionOf([block('b', format, { countIn: 0 })])).lengthMs / 1_000

describe('intervals of published length', () => {
  it('20 s of work and 10 s of rest eight times are 230 s, without a rest after the last (Tabata et al. 1996; 240 s with it)', () => {
    const stations = [{ movement: 'goblet-squat', work: 20, rest: 10 }]
    expect(secondsOf({ type: 'intervals', rounds: 8, stations })).toBe(230)
  })

  it.each([
    // NSCA Essentials, 4th ed., table 3.6: 5–10 s at 1:12 to 1:20, the worked example of 10 s.
    [10, 12, 120],
    [10, 20, 200],
    // 60–180 s at 1:3 to 1:4, at both ends of the range.
    [60, 3, 180],
    [180, 4, 720],
  ])('work of %s s at 1:%s rests %s s before the next', (work, ratio, rest) => {
    const stations = [{ movement: 'goblet-squat', work, rest: work * ratio }]
    const [, resting, next] = compile(
      versionOf([block('b', { type: 'intervals', rounds: 2, stations }, { countIn: 0 })]),
    ).segments
    expect((resting?.endMs ?? 0) - (resting?.startMs ?? 0)).toBe(rest * 1_000)
    expect(next?.startMs).toBe((work + rest) * 1_000)
  })
})

describe('tempo of published length', () => {
  // Examples of the notation: eccentric, pause, concentric (and pause at the top); the last from BMJ Military Health.
  it.each<[Tempo, number, number]>([
    [[2, 0, 2, 0], 10, 40],
    [[1, 0, 1, 0], 20, 40],
    [[3, 1, 2, 0], 8, 48],
    [[3, 1, 1, 0], 1, 5],
  ])('%j for %s reps takes %s s', (tempo, reps, seconds) => {
    // In a block without end in sight nobody tires by a tenth of a second a rep.
    const format: Format = {
      type: 'rounds',
      seconds: 10_800,
      stations: [{ movement: 'goblet-squat', reps, tempo }],
    }
    const plan = blockPlan(versionOf([block('b', format)]), block('b', format))
    const [first] = plan ? leadSchedule(plan, FROM_THE_START).rounds : []
    expect((first?.endMs ?? 0) / 1_000).toBeCloseTo(seconds, 0)
  })
})
