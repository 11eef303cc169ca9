import { describe, expect, it } from 'vitest'
import { rungLength, rungWindow, type RungWindowInput } from '@/components/lane/rung-window'

/** A ladder of 3, 6, 9 … without end. */
const endless = (round: number): number | null => round * 3
const threeRungs = (round: number): number | null => (round <= 3 ? 12 - round * 3 : null)

const input = (over: Partial<RungWindowInput>): RungWindowInput => ({
  repsOf: endless,
  done: [],
  present: 1,
  forecastRounds: 4,
  limit: 7,
  ...over,
})

describe('the window of rungs', () => {
  it('fills what is done, marks the present and dashes the forecast’s last', () => {
    const { rungs } = rungWindow(input({ done: [1, 2], present: 3 }))
    expect(rungs.map((rung) => [rung.reps, rung.state])).toEqual([
      [3, 'done'],
      [6, 'done'],
      [9, 'present'],
      [12, 'coming'],
      [15, 'forecast-last'],
    ])
  })

  it.each([1, 2, 5, 17, 41, 60])(
    'shows the present of round %i of 60 with one to come',
    (present) => {
      const done = Array.from({ length: present - 1 }, (_, index) => index + 1)
      const repsOf = (round: number) => (round <= 60 ? 8 : null)
      const { rungs, before, after } = rungWindow(
        input({ repsOf, done, present, forecastRounds: 59 }),
      )
      expect(rungs.length).toBeLessThanOrEqual(7)
      expect(rungs.find((rung) => rung.state === 'present')?.round).toBe(present)
      if (present < 60) expect(rungs.some((rung) => rung.round > present)).toBe(true)
      expect(before).toBe((rungs[0]?.round ?? 1) - 1)
      expect(after).toBe((rungs[rungs.length - 1]?.round ?? 0) < 60)
    },
  )

  it('keeps the rounds in a row, whatever was logged', () => {
    const { rungs } = rungWindow(
      input({ done: [1, 2, 3, 5, 9], present: 10, forecastRounds: null }),
    )
    rungs.forEach((rung, index) => expect(rung.round).toBe((rungs[0]?.round ?? 0) + index))
    expect(rungs.find((rung) => rung.round === 9)?.state).toBe('done')
    expect(rungs.find((rung) => rung.round === 8)?.state).toBe('coming')
  })

  it('ends with the ladder, worked off or not', () => {
    const { rungs, after } = rungWindow(
      input({ repsOf: threeRungs, done: [1, 2, 3], present: null, forecastRounds: 3 }),
    )
    expect(rungs.map((rung) => rung.state)).toEqual(['done', 'done', 'done'])
    expect(after).toBe(false)
  })

  it('is never empty before the block begins', () => {
    expect(rungWindow(input({ present: null, forecastRounds: null })).rungs.length).toBeGreaterThan(
      0,
    )
  })
})

describe('the length of a rung', () => {
  it('grows with its reps and never vanishes', () => {
    expect(rungLength(500, 500)).toBe(1)
    expect(rungLength(9, 12)).toBeGreaterThan(rungLength(6, 12))
    expect(rungLength(1, 500)).toBeGreaterThan(0.2)
  })
})
