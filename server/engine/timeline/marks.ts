/** Beeps, calls, cues and announcements around the segments of a class, by session-spec's table. */
import type { Anchor, Block, SessionSpec } from '../spec/schema'
import type { Mark, Segment } from './types'

/** Cues of kind `next` this near a segment's end stand for the automatic announcement. */
const OWN_NEXT_WINDOW_MS = 20_000
const ANNOUNCE_BEFORE_MS = 15_000
const LONG_MS = 30_000

const RANK = { beep: 0, call: 1, cue: 2, next: 3 } as const

/** Whether a block's rounds are the member's own, so that round and station anchors wait for them. */
export function isMembersOwnPace(block: Block): boolean {
  return block.format.type === 'rounds' || block.format.type === 'for-time'
}

function isBody(segment: Segment): boolean {
  return segment.kind !== 'brief' && segment.kind !== 'count-in'
}

function secondsOf(segment: Segment): number {
  return (segment.endMs - segment.startMs) / 1_000
}

/** Seconds left at which a segment of `length` seconds is called; the half apart. */
function callsFor(length: number): number[] {
  if (length < 10) return []
  if (length < 30) return length > 15 ? [10] : []
  if (length < 120) return length > 45 ? [30, 10] : [10]
  return Math.abs(60 - length / 2) > 5 ? [60, 30, 10] : [30, 10]
}

function addTimeMarks(marks: Mark[], segment: Segment, following: Segment | undefined): void {
  const length = secondsOf(segment)
  const at = (left: number) => segment.endMs - left * 1_000
  const inside = (left: number) => left < length
  if (length >= 120) {
    const left = length / 2
    marks.push({ atMs: at(left), what: 'beep', sound: 'double' })
    marks.push({ atMs: at(left), what: 'call', left, half: true })
  }
  for (const left of callsFor(length)) {
    if (inside(left) && !(length >= 120 && left === length / 2)) {
      marks.push({ atMs: at(left), what: 'call', left })
    }
  }
  for (const left of length < 30 ? [3, 2, 1] : [5, 4, 3, 2, 1]) {
    if (inside(left)) marks.push({ atMs: at(left), what: 'beep', sound: 'short' })
  }
  marks.push({
    atMs: segment.endMs,
    what: 'beep',
    sound: following?.kind === 'work' ? 'start' : 'end',
  })
}

/** Class time of a cue with a fixed moment; null where it has none, or none that comes. */
function fixedMoment(at: Anchor, body: readonly Segment[], ownPace: boolean): number | null {
  const first = body[0]
  const last = body.at(-1)
  if (!first || !last) return null
  if ('from' in at)
    return at.from === 'start' ? first.startMs + at.s * 1_000 : last.endMs - at.s * 1_000
  if (ownPace) return null
  const round = at.round ?? 1
  const station = 'station' in at ? at.station : undefined
  const work = body.find(
    (one) =>
      one.kind === 'work' &&
      one.round === round &&
      (station === undefined || one.station === station),
  )
  return work ? work.startMs : null
}

interface CueMoments {
  marks: Mark[]
  /** Moments of cues of kind `next`, by block. */
  ownNext: Map<string, number[]>
}

function cueMarks(spec: SessionSpec, bodies: Map<string, Segment[]>): CueMoments {
  const marks: Mark[] = []
  const ownNext = new Map<string, number[]>()
  for (const block of spec.blocks) {
    const body = bodies.get(block.id) ?? []
    const ownPace = isMembersOwnPace(block)
    for (const cue of block.cues ?? []) {
      const atMs = fixedMoment(cue.at, body, ownPace)
      if (atMs === null) continue
      marks.push({ atMs, what: 'cue', block: block.id, id: cue.id })
      if (cue.kind === 'next') ownNext.set(block.id, [...(ownNext.get(block.id) ?? []), atMs])
    }
  }
  return { marks, ownNext }
}

function announcement(
  segment: Segment,
  announced: Segment,
  ownNext: readonly number[],
): Mark | null {
  const lengthMs = segment.endMs - segment.startMs
  const isLong = lengthMs >= LONG_MS
  if (segment.kind !== 'rest' && !(segment.kind === 'work' && isLong)) return null
  const covered = ownNext.some(
    (ms) => ms >= segment.endMs - OWN_NEXT_WINDOW_MS && ms < segment.endMs,
  )
  if (covered) return null
  return {
    atMs: isLong ? segment.endMs - ANNOUNCE_BEFORE_MS : segment.startMs,
    what: 'next',
    block: announced.block,
    ...(announced.round === undefined ? {} : { round: announced.round }),
    ...(announced.station === undefined ? {} : { station: announced.station }),
  }
}

/**
 * The marks of `segments`, which lie end to end and belong to blocks of `spec`, in order of time; at
 * one moment beep, call, cue as written, next. Times are milliseconds of class time. Takes the
 * segments as compiled or as a member has edited them (rests lengthened or cut, blocks cut off).
 */
export function marksOf(segments: readonly Segment[], spec: SessionSpec): Mark[] {
  const bodies = new Map<string, Segment[]>()
  for (const segment of segments) {
    if (!isBody(segment)) continue
    const body = bodies.get(segment.block)
    if (body) body.push(segment)
    else bodies.set(segment.block, [segment])
  }
  const cues = cueMarks(spec, bodies)
  const marks: Mark[] = []
  const announcements: Mark[] = []
  let announced: Segment | undefined
  for (let index = segments.length - 1; index >= 0; index -= 1) {
    const segment = segments[index]
    if (!segment) continue
    if (announced) {
      const mark = announcement(segment, announced, cues.ownNext.get(segment.block) ?? [])
      if (mark) announcements.push(mark)
    }
    if (segment.kind === 'work' || segment.kind === 'rest') announced = segment
  }
  segments.forEach((segment, index) => {
    if (segment.kind !== 'brief') addTimeMarks(marks, segment, segments[index + 1])
  })
  // Array.prototype.sort is stable, so cues of one moment stay as written.
  return [...marks, ...cues.marks, ...announcements].sort(
    (a, b) => a.atMs - b.atMs || RANK[a.what] - RANK[b.what],
  )
}
