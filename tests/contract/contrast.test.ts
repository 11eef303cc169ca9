/**
 * Every pair of colours that meets on a screen, by WCAG 2.2's contrast ratio (definitions 'contrast ratio'
 * and 'relative luminance'; success criteria 1.4.3, 1.4.6, 1.4.11).
 */
import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'

function luminance(colour: string): number {
  const channel = (from: number): number => {
    const share = Number.parseInt(colour.slice(from, from + 2), 16) / 255
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
  }
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5)
}

function contrast(one: string, other: string): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b)
  return (light + 0.05) / (dark + 0.05)
}

// As printed in WCAG 2.2 (definition of contrast ratio), techniques G195, G207, G223, and Understanding 1.4.11.
test.each([
  ['#000000', '#ffffff', '21'],
  ['#ffffff', '#ffffff', '1'],
  ['#ff3838', '#ffffff', '3.6'],
  ['#e3660e', '#ffffff', '3.4'],
  ['#ca0000', '#ffffff', '6'],
  ['#949494', '#ffffff', '3'],
  ['#fff000', '#ffffff', '1.2'],
  ['#9d9d9d', '#ffffff', '2.7'],
])('the contrast of %s on %s is the published %s', (one, other, published) => {
  const decimals = published.split('.')[1]?.length ?? 0
  // Printed figures are rounded to tenths, zeros left out.
  expect(contrast(one, other).toFixed(Math.max(1, decimals))).toBe(Number(published).toFixed(1))
})

/** The colour tokens of a ground, as the style sheet has them. */
function tokens(selector: RegExp): Map<string, string> {
  const css = readFileSync('app/globals.css', 'utf8')
  const block = selector.exec(css)?.[0] ?? ''
  return new Map(
    [...block.matchAll(/--([a-z-]+):\s*(#[0-9a-f]{6});/g)].map(([, name = '', value = '']) => [
      name,
      value,
    ]),
  )
}

const birch = tokens(/\[data-ground='birch'\][^{]*\{[^}]*\}/)
const hall = tokens(/\[data-ground='hall'\][^{]*\{[^}]*\}/)

/** Pages are read close by: text 4.5. The player is read from across a room: text 7. State and lines: 3. */
const PAIRS: [front: string, back: string, least: number][] = [
  ...['ground', 'ground-board', 'raised', 'fill'].map((back): [string, string, number] => [
    'text',
    back,
    7,
  ]),
  ...['text-quiet', 'rest', 'stop', 'done'].flatMap((front) =>
    ['ground', 'ground-board', 'raised'].map((back): [string, string, number] => [
      front,
      back,
      4.5,
    ]),
  ),
  ['on-present', 'present', 7],
  ['on-button', 'button', 7],
  ['figure', 'ground', 7],
  ['line', 'ground', 3],
  ['line', 'raised', 3],
  ['line-lesser', 'ground', 3],
  ['kit', 'ground', 3],
]

describe.each([
  ['birch', birch],
  ['hall', hall],
])('on %s', (_, colours) => {
  test.each(PAIRS)('%s on %s reaches %d to 1', (front, back, least) => {
    const [one, other] = [colours.get(front), colours.get(back)]
    if (!one || !other) throw new Error(`The style sheet has no ${one ? back : front}.`)
    expect(contrast(one, other)).toBeGreaterThanOrEqual(least)
  })
})

test.each(['text', 'text-quiet', 'rest', 'stop', 'done', 'present'])(
  '%s is read from across the hall: 7 to 1 on its ground',
  (front) => {
    expect(contrast(hall.get(front) ?? '', hall.get('ground') ?? '')).toBeGreaterThanOrEqual(7)
  },
)

test('yellow on the dark ground may be text, on birch only a fill', () => {
  const [onHall, onBirch] = [hall, birch].map((ground) =>
    contrast(ground.get('present') ?? '', ground.get('ground') ?? ''),
  )
  expect(onHall).toBeGreaterThanOrEqual(7)
  expect(onBirch).toBeLessThan(3)
})
