import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { repsInRound, rungCount } from '@/server/engine/spec/reps'
import type { Reps } from '@/server/engine/spec/schema'
import oeis from './reference/oeis-ladders.json'

const first = (reps: Reps, rounds: number) =>
  Array.from({ length: rounds }, (_, index) => repsInRound(reps, index + 1))
const sum = (reps: Reps, rounds: number) =>
  first(reps, rounds).reduce<number>((total, one) => total + (one ?? 0), 0)
const sequence = (id: string) => {
  const found = oeis.sequences.find((one) => one.oeis === id)
  if (!found) throw new Error(`no ${id}`)
  return found
}

describe('reps in a round', () => {
  it.each<[string, Reps, (number | null)[]]>([
    ['one number', 10, [10, 10, 10, 10]],
    ['a ladder up without end', { from: 3, step: 3 }, [3, 6, 9, 12]],
    ['up to a last rung, held', { from: 3, step: 3, to: 9 }, [3, 6, 9, 9, 9]],
    ['up to a value that is no rung', { from: 3, step: 3, to: 10 }, [3, 6, 9, 9]],
    ['up, then again', { from: 3, step: 3, to: 9, then: 'repeat' }, [3, 6, 9, 3, 6]],
    ['down, then done', { from: 9, step: -3, to: 3, then: 'done' }, [9, 6, 3, null, null]],
    ['down, held', { from: 12, step: -3, to: 3 }, [12, 9, 6, 3, 3]],
    ['down to a value that is no rung', { from: 12, step: -5, to: 1 }, [12, 7, 2, 2]],
    ['one rung', { from: 5, step: 4, to: 5 }, [5, 5]],
    ['a list, which repeats', { list: [5, 10, 15, 10, 5] }, [5, 10, 15, 10, 5, 5, 10]],
    ['a list that holds', { list: [5, 10], then: 'hold' }, [5, 10, 10]],
    ['a list that is done', { list: [5, 10], then: 'done' }, [5, 10, null]],
  ])('follows %s', (_name, reps, expected) => {
    expect(first(reps, expected.length)).toEqual(expected)
  })

  it('has no rung before round 1', () => {
    for (const round of [0, -1, NaN]) expect(repsInRound({ from: 3, step: 3 }, round)).toBeNull()
  })

  // Worked in the session spec.
  it('comes to 45 a station after 3, 6, 9, 12, 15, and 90 for two', () => {
    expect(sum({ from: 3, step: 3 }, 5)).toBe(45)
    expect(2 * sum({ from: 3, step: 3, to: 15 }, 5)).toBe(90)
  })
  it('comes to 30 from 12 down to 3, and to 12 again in round 5 with repeat', () => {
    expect(sum({ from: 12, step: -3, to: 3 }, 4)).toBe(30)
    expect(repsInRound({ from: 12, step: -3, to: 3, then: 'repeat' }, 5)).toBe(12)
  })

  // Partial sums of ladders against terms of the On-Line Encyclopedia of Integer Sequences, oeis.org.
  it.each<[string, Reps]>([
    ['A000217', { from: 1, step: 1 }],
    ['A002378', { from: 2, step: 2 }],
    ['A045943', { from: 3, step: 3 }],
    ['A046092', { from: 4, step: 4 }],
    ['A028895', { from: 5, step: 5 }],
    ['A028896', { from: 6, step: 6 }],
  ])('sums to OEIS %s', (id, reps) => {
    const { terms } = sequence(id)
    expect(terms.map((_, rounds) => sum(reps, rounds))).toEqual(terms)
  })
  it('sums a pyramid 2, 4 … 2n … 4, 2 to OEIS A001105', () => {
    const { terms } = sequence('A001105')
    for (let n = 1; n <= 20; n += 1) {
      const up = Array.from({ length: n }, (_, index) => 2 * (index + 1))
      const list = [...up, ...up.slice(0, -1).reverse()]
      expect(sum({ list: list.slice(0, 40) }, list.length)).toBe(terms[n])
    }
  })

  it('sums as arithmetic series do: n/2 · (first + last)', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 50 }),
        fc.integer({ min: 1, max: 20 }),
        fc.integer({ min: 1, max: 40 }),
        (from, step, rounds) => {
          const last = from + (rounds - 1) * step
          expect(2 * sum({ from, step }, rounds)).toBe(rounds * (from + last))
        },
      ),
    )
  })
  it('counts its rungs as the values from first to last', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 200 }),
        fc.integer({ min: -30, max: 30 }).filter((step) => step !== 0),
        fc.integer({ min: 0, max: 60 }),
        fc.integer({ min: 0, max: 29 }),
        (from, step, more, rest) => {
          const to = from + step * more + Math.sign(step) * (rest % Math.abs(step))
          if (to < 1) return
          expect(rungCount({ from, step, to })).toBe(more + 1)
        },
      ),
    )
  })
})
