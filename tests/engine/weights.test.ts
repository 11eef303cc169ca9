import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  kilogramsOf,
  parseWeights,
  poundsOf,
  weightsText,
  weightText,
} from '@/server/engine/fit/weights'

describe('kilograms and pounds', () => {
  // The exact definition of the international avoirdupois pound: 0.45359237 kg (agreement of 1959; NIST Handbook 44, appendix C).
  it.each([
    [1, 0.45359237],
    [100, 45.359237],
    [2.5, 1.133980925],
  ])('%s lb are %s kg', (pounds, kilograms) => {
    expect(kilogramsOf(pounds)).toBeCloseTo(kilograms, 12)
  })
  it('there and back is where one was', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.1, max: 500, noNaN: true }), (pounds) => {
        expect(poundsOf(kilogramsOf(pounds))).toBeCloseTo(pounds, 9)
      }),
    )
  })
  it.each([
    [8, 'kg', '8 kg'],
    [7.5, 'kg', '7.5 kg'],
    // The smallest common plates.
    [1.25, 'kg', '1.25 kg'],
    [0.5, 'kg', '0.5 kg'],
    // 20 lb and 50 lb by the definition.
    [9.0718474, 'kg', '9.07 kg'],
    [9.0718474, 'lb', '20 lb'],
    [22.6796185, 'lb', '50 lb'],
    // 8 ÷ 0.45359237 = 17.636…
    [8, 'lb', '17.6 lb'],
  ] as const)('%s kg are shown in %s as %s', (kilograms, unit, text) => {
    expect(weightText(kilograms, unit)).toBe(text)
  })
  it('are shown together where they are equal', () => {
    expect(weightsText([12, 8, 8])).toBe('2 × 8 kg, 12 kg')
  })
})

describe('weights as they are written', () => {
  it.each([
    ['8', [8]],
    ['8, 8', [8, 8]],
    ['2 x 8 kg', [8, 8]],
    ['2×7,5', [7.5, 7.5]],
    ['8 and 12', [8, 12]],
    ['20 lb', [9.071847]],
    ['20 LBS; 8kg', [9.071847, 8]],
    ['', []],
  ])('%j are %j kg', (text, kilograms) => {
    expect(parseWeights(text)).toEqual({ kilograms })
  })
  it.each(['heavy', '8 stone', '-4', '0', '500', '8 8', '30 x 4'])('%j is a problem', (text) => {
    expect(parseWeights(text)).toEqual({ problem: expect.any(String) })
  })
  it('of any kind are read or told, never thrown', () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        const read = parseWeights(text)
        if ('kilograms' in read) for (const one of read.kilograms) expect(one).toBeGreaterThan(0)
      }),
    )
  })
  it('come back from their own text', () => {
    const own = [1.25, 4, 7.5, 7.5, 12]
    expect(parseWeights(weightsText(own))).toEqual({ kilograms: own })
  })
})
