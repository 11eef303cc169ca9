/** Marks of an edited class, each tied to its segment and to a key that outlives further edits. */
import type { SessionSpec } from '../spec/schema'
import type { Edits } from './edits'
import { isLive } from './edits'
import { marksOf } from './marks'
import type { BlockSpan, PlacedMark } from './run-types'
import type { Mark, Segment, Timeline } from './types'

/**
 * The marks of `segments` (the whole class with its edits), by segment and then by time. Marks of
 * parts that are gone are left out, as are cues that fall after the end of a body cut short.
 */
export function placeMarks(
  spec: SessionSpec,
  base: Timeline,
  segments: readonly Segment[],
  blocks: readonly BlockSpan[],
  edits: Edits,
): PlacedMark[] {
  const live = segments.flatMap((segment, index) => (isLive(segment) ? [{ segment, index }] : []))
  const isEdited = edits.some((edit) => edit !== null && edit !== undefined)
  const marks = isEdited
    ? marksOf(
        live.map((one) => one.segment),
        spec,
      )
    : base.marks
  const timed = live.filter((one) => one.segment.kind !== 'brief')
  const placed = marks.flatMap((mark) => {
    const segmentIndex = segmentOf(mark, spec, timed, segments, blocks)
    const segment = segments[segmentIndex]
    if (!segment) return []
    // A length that was edited need not halve to whole milliseconds.
    return [
      {
        ...mark,
        atMs: Math.round(mark.atMs),
        key: keyOf(mark, segmentIndex, segment, edits),
        segmentIndex,
      },
    ]
  })
  return placed.sort((a, b) => a.segmentIndex - b.segmentIndex || a.atMs - b.atMs)
}

function segmentOf(
  mark: Mark,
  spec: SessionSpec,
  timed: readonly { segment: Segment; index: number }[],
  segments: readonly Segment[],
  blocks: readonly BlockSpan[],
): number {
  if (mark.what === 'cue') {
    const span = blocks[spec.blocks.findIndex((block) => block.id === mark.block)]
    if (!span || mark.atMs < span.bodyStartMs || mark.atMs > span.bodyEndMs) return -1
    let last = -1
    for (let index = span.bodySegment; index <= span.lastSegment; index += 1) {
      const segment = segments[index]
      if (!segment || !isLive(segment)) continue
      if (segment.startMs <= mark.atMs) last = index
    }
    return last
  }
  // Beeps and calls lie up to and including the end of their segment, a `next` from its start on.
  let low = 0
  let high = timed.length - 1
  while (low < high) {
    const middle = (low + high) >> 1
    const endMs = timed[middle]?.segment.endMs ?? 0
    if (mark.what === 'next' ? endMs <= mark.atMs : endMs < mark.atMs) low = middle + 1
    else high = middle
  }
  return timed[low]?.index ?? -1
}

function keyOf(mark: Mark, segmentIndex: number, segment: Segment, edits: Edits): string {
  if (mark.what === 'cue') return `cue/${mark.block}/${mark.id}`
  if (mark.what === 'next') return `${segmentIndex}/next`
  // Half-way is where it is by length, so it is named and not measured.
  const isHalf = mark.what === 'call' ? mark.half === true : mark.sound === 'double'
  const left = isHalf ? 'half' : segment.endMs - mark.atMs
  const lengthenedMs = edits[segmentIndex]?.lengthenedMs ?? 0
  return `${segmentIndex}/${mark.what}/${left}${lengthenedMs > 0 ? `+${lengthenedMs}` : ''}`
}
