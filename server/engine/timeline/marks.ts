/** Beeps, calls, cues and announcements around the segments of a class, by session-spec's table. */
import type { Anchor, Block, SessionSpec } from '../spec/schema'
import type { Mark, Segment } from './types'

/** Cues of kind `next` this near a segment's end stand for the automatic announcement. */
const OWN_NEXT_WINDOW_MS = 20_000
const ANNOUNCE_BEFORE_MS = 15_000
const LONG_MS = 30_000

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

const NO_CALLS: readonly number[] = []
const SHORT_BEEPS: readonly number[] = [3, 2, 1]
const LONG_BEEPS: readonly number[] = [5, 4, 3, 2, 1]

/** Seconds left at which a segment of `length` seconds is called; the half apart. */
function callsFor(length: number): readonly number[] {
  if (length <= 15) return NO_CALLS
  if (length <= 45) return [10]
  if (length < 120) return [30, 10]
  return Math.abs(60 - length / 2) > 5 ? [60, 30, 10] : [30, 10]
}

/** In order of time, a beep before a call of its moment. */
function addTimeMarks(marks: Mark[], segment: Segment, following: Segment | undefined): void {
  const { endMs } = segment
  const length = secondsOf(segment)
  if (length >= 120) {
    const left = length / 2
    const atMs = endMs - left * 1_000
    marks.push({ atMs, what: 'beep', sound: 'double' })
    marks.push({ atMs, what: 'call', left, half: true })
  }
  for (const left of callsFor(length))
    marks.push({ atMs: endMs - left * 1_000, what: 'call', left })
  for (const left of length < 30 ? SHORT_BEEPS : LONG_BEEPS) {
    if (left < length) marks.push({ atMs: endMs - left * 1_000, what: 'beep', sound: 'short' })
  }
  marks.push({ atMs: endMs, what: 'beep', sound: following?.kind === 'work' ? 'start' : 'end' })
}

/** A round, or a station of it, as one number: a block has far fewer stations than the factor. */
function placeKey(round: number, station = -1): number {
  return round * 1_000 + station + 1
}

/** Where each round, and each station of it, first begins in a body. */
function firstWork(body: readonly Segment[]): Map<number, number> {
  const starts = new Map<number, number>()
  for (const { kind, round, station, startMs } of body) {
    if (kind !== 'work' || round === undefined) continue
    const ofRound = placeKey(round)
    if (!starts.has(ofRound)) starts.set(ofRound, startMs)
    const ofStation = placeKey(round, station)
    if (!starts.has(ofStation)) starts.set(ofStation, startMs)
  }
  return starts
}

interface CueMoments {
  /** In order of time; of one moment as written. */
  marks: Mark[]
  /** Moments of cues of kind `next`, by block. */
  ownNext: Map<string, number[]>
}

function cueMarks(spec: SessionSpec, bodies: Map<string, Segment[]>): CueMoments {
  const marks: Mark[] = []
  const ownNext = new Map<string, number[]>()
  for (const block of spec.blocks) {
    const body = bodies.get(block.id)
    const startMs = body?.[0]?.startMs
    const endMs = body?.at(-1)?.endMs
    if (!block.cues || !body || startMs === undefined || endMs === undefined) continue
    const nextMoments: number[] = []
    let starts: Map<number, number> | undefined
    const momentOf = (at: Anchor): number | undefined => {
      if ('from' in at) return at.from === 'start' ? startMs + at.s * 1_000 : endMs - at.s * 1_000
      if (isMembersOwnPace(block)) return undefined
      starts ??= firstWork(body)
      return starts.get(placeKey(at.round ?? 1, 'station' in at ? at.station : undefined))
    }
    for (const cue of block.cues) {
      const atMs = momentOf(cue.at)
      if (atMs === undefined) continue
      marks.push({ atMs, what: 'cue', block: block.id, id: cue.id })
      if (cue.kind === 'next') nextMoments.push(atMs)
    }
    if (nextMoments.length > 0) ownNext.set(block.id, nextMoments)
  }
  // Array.prototype.sort is stable, so cues of one moment stay as written.
  return { marks: marks.sort((a, b) => a.atMs - b.atMs), ownNext }
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
  const mark: Mark = {
    atMs: isLong ? segment.endMs - ANNOUNCE_BEFORE_MS : segment.startMs,
    what: 'next',
    block: announced.block,
  }
  if (announced.round !== undefined) mark.round = announced.round
  if (announced.station !== undefined) mark.station = announced.station
  return mark
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
  const timeMarks: Mark[] = []
  segments.forEach((segment, index) => {
    if (segment.kind !== 'brief') addTimeMarks(timeMarks, segment, segments[index + 1])
  })
  return merged(merged(timeMarks, cues.marks), announcements.reverse())
}

/** Two lists in order of time as one; of one moment those of `first` stand before those of `second`. */
function merged(first: readonly Mark[], second: readonly Mark[]): Mark[] {
  const marks: Mark[] = []
  let index = 0
  for (const mark of first) {
    for (let one = second[index]; one && one.atMs < mark.atMs; one = second[index]) {
      marks.push(one)
      index += 1
    }
    marks.push(mark)
  }
  for (; index < second.length; index += 1) {
    const one = second[index]
    if (one) marks.push(one)
  }
  return marks
}
