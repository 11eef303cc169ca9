/** Weights as people write them, in kilograms or pounds; kept in kilograms. */

/** The international avoirdupois pound is exactly this (agreement of 1959; NIST Handbook 44, appendix C). */
export const KILOGRAMS_PER_POUND = 0.45359237

/** Items whose pieces have a weight. */
export const WEIGHED_ITEMS = ['dumbbell', 'kettlebell'] as const

export type WeightUnit = 'kg' | 'lb'

const MOST_KILOGRAMS = 200
const MOST_WEIGHTS = 20

export function kilogramsOf(pounds: number): number {
  return pounds * KILOGRAMS_PER_POUND
}

export function poundsOf(kilograms: number): number {
  return kilograms / KILOGRAMS_PER_POUND
}

/**
 * '8 kg', '1.25 kg', '17.6 lb': rounded for reading alone, kilograms to hundredths, so that the smallest
 * plates keep their weight, pounds to tenths, no zeros behind. What is kept is never rounded so.
 */
export function weightText(kilograms: number, unit: WeightUnit = 'kg'): string {
  const [value, parts] = unit === 'kg' ? [kilograms, 100] : [poundsOf(kilograms), 10]
  return `${Math.round(value * parts) / parts} ${unit}`
}

/** '2 × 8 kg, 12 kg': equal ones together, the lightest first. */
export function weightsText(kilograms: readonly number[], unit: WeightUnit = 'kg'): string {
  const counts = new Map<string, number>()
  for (const one of [...kilograms].sort((a, b) => a - b)) {
    const text = weightText(one, unit)
    counts.set(text, (counts.get(text) ?? 0) + 1)
  }
  return [...counts].map(([text, count]) => (count > 1 ? `${count} × ${text}` : text)).join(', ')
}

/**
 * Weights from what somebody wrote: '8, 8', '2 x 8 kg', '20 lb; 12kg', with a comma or a point for
 * decimals ('7,5'). A number without a unit is kilograms. Gives kilograms as written (pounds by the exact
 * definition, to the milligram), or a sentence about what cannot be read.
 */
export function parseWeights(text: string): { kilograms: number[] } | { problem: string } {
  const kilograms: number[] = []
  // A comma between digits without a space is a decimal one: '7,5'; with a space it parts two weights.
  const pieces = text
    .replace(/(\d),(\d)/g, '$1.$2')
    .split(/[,;\n]+|\band\b/i)
    .map((piece) => piece.trim())
    .filter(Boolean)
  for (const piece of pieces) {
    const match =
      /^(?:(\d{1,2})\s*[x×*]\s*)?(\d+(?:\.\d+)?)\s*(kg|kgs|kilo|kilos|kilograms?|lb|lbs|pounds?)?$/i.exec(
        piece,
      )
    if (!match) return { problem: `‘${piece}’ is no weight. Write it as 8 kg, 2 × 8 kg or 20 lb.` }
    const [, times = '1', number = '', unit = 'kg'] = match
    const value = Number(number)
    const own = /^(?:lb|pound)/i.test(unit) ? kilogramsOf(value) : value
    if (!(own > 0 && own <= MOST_KILOGRAMS)) {
      return { problem: `‘${piece}’ is outside what can be: above 0 and up to 200 kg.` }
    }
    for (let count = 0; count < Number(times); count += 1)
      kilograms.push(Math.round(own * 1e6) / 1e6)
    if (kilograms.length > MOST_WEIGHTS) return { problem: 'That is more than 20 pieces.' }
  }
  return { kilograms }
}
