/** What a class looks like as a lane: one bay per block, to scale. Pure. */
import type { BlockKind } from '@/server/engine/spec/schema'
import type { Segment } from '@/server/engine/timeline/types'

export interface LaneBlock {
  id: string
  title: string
  kind: BlockKind
}

export type BayPaint = 'filled' | 'hatched' | 'low' | 'open'
export type BayState = 'done' | 'present' | 'coming'

export interface Bay {
  block: string
  title: string
  paint: BayPaint
  /** Work blocks are counted from 1; all else has no number. */
  number: number | null
  startMs: number
  endMs: number
  /** The stretches of work in it; rests between them stay open. */
  pieces: { startMs: number; endMs: number }[]
  state: BayState
}

export const PAINT: Record<BlockKind, BayPaint> = {
  work: 'filled',
  finisher: 'hatched',
  'warm-up': 'low',
  mobility: 'low',
  'cool-down': 'low',
  rest: 'open',
}

/** Whole class time, as painted: the end of the last segment. */
export function laneLengthMs(segments: readonly Segment[]): number {
  return segments.reduce((latest, segment) => Math.max(latest, segment.endMs), 0)
}

/**
 * The bays of a class, side by side without a hole.
 * @param segments compiled segments, in order, milliseconds of class time
 * @param presentMs where the class is; null or 0 before it: all is still to come
 * @param finestMs stretches of rest inside a block shorter than this are painted over
 */
export function baysOf(
  segments: readonly Segment[],
  blocks: readonly LaneBlock[],
  presentMs: number | null = null,
  finestMs = 0,
): Bay[] {
  let number = 0
  let at = 0
  const bays: Bay[] = []
  for (const block of blocks) {
    const own = segments.filter((segment) => segment.block === block.id)
    const endMs = own.reduce((latest, segment) => Math.max(latest, segment.endMs), at)
    const paint = PAINT[block.kind]
    if (paint === 'filled') number += 1
    if (endMs <= at) continue
    const pieces: Bay['pieces'] = []
    for (const { kind, startMs, endMs: until } of own) {
      if ((kind !== 'work' && kind !== 'switch') || until <= startMs) continue
      const last = pieces[pieces.length - 1]
      if (last && startMs - last.endMs <= finestMs) last.endMs = until
      else pieces.push({ startMs, endMs: until })
    }
    bays.push({
      block: block.id,
      title: block.title,
      paint,
      number: paint === 'filled' ? number : null,
      startMs: at,
      endMs,
      pieces: paint === 'open' ? [] : pieces,
      state: stateOf(at, endMs, presentMs),
    })
    at = endMs
  }
  return bays
}

function stateOf(startMs: number, endMs: number, presentMs: number | null): BayState {
  if (presentMs === null || presentMs <= 0 || presentMs < startMs) return 'coming'
  return presentMs >= endMs ? 'done' : 'present'
}

/** Part of the whole, in percent with enough digits for a three-hour class on a TV. */
export function percent(ms: number, ofMs: number): string {
  return `${ofMs > 0 ? Math.round((ms / ofMs) * 1_000_000) / 10_000 : 0}%`
}

/** Widths in em of the condensed face by kind of letter; the first that matches counts. */
const LETTER_WIDTHS: readonly (readonly [RegExp, number])[] = [
  [/[mwMWÆŒ@%&—]/, 0.78],
  [/[ilj.,:;'’!| ]/, 0.26],
  [/[tfrI()[\]1-]/, 0.36],
  [/[A-Z0-9À-Þ×–]/, 0.59],
]
const COMMON_WIDTH = 0.485

/** How wide a name is set, in em, a little on the generous side: a name is shown only where it surely fits. */
export function nameWidthEm(name: string): number {
  let width = 0
  for (const letter of name) {
    width += LETTER_WIDTHS.find(([kind]) => kind.test(letter))?.[1] ?? COMMON_WIDTH
  }
  return Math.round(width * 100) / 100
}

/** A shorter name that still says what it is: what a colon announces, without 'with …' and the like. */
export function shortName(title: string): string {
  const told = title.split(/:\s+/)
  const [name = title] = (told[1] ?? title).split(/\s+(?:with|then|for)\s+|,\s+/)
  return name.charAt(0).toUpperCase() + name.slice(1)
}

/** 5:00 of 300,000 ms; 1:05:00 of an hour and more. */
export function clockText(ms: number): string {
  const seconds = Math.round(ms / 1000)
  const two = (value: number) => String(value).padStart(2, '0')
  const minutes = Math.floor(seconds / 60)
  if (minutes < 60) return `${minutes}:${two(seconds % 60)}`
  return `${Math.floor(minutes / 60)}:${two(minutes % 60)}:${two(seconds % 60)}`
}
