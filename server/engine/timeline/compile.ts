/** A class as a timeline: segments end to end in class time, and the marks around them. */
import type { Block, Format, SessionSpec } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import { isMembersOwnPace, marksOf } from './marks'
import type { PendingCue, Segment, SegmentKind, Side, Timeline } from './types'

const WORDS_PER_SECOND = 2.5
const BRIEF_PAUSE_SECONDS = 5
export const DEFAULT_COUNT_IN_SECONDS = 5
export const DEFAULT_HOLD_SWITCH_SECONDS = 5

/** How many words a text has; a rough reading and speaking measure. */
export function wordCount(text: string): number {
  return text.split(/\s+/).filter(Boolean).length
}

/** How long a block's brief runs beside the class, in milliseconds; 0 without a brief. */
export function briefMs(block: Block): number {
  if (block.brief === undefined) return 0
  const seconds =
    block.briefSeconds ?? Math.ceil(wordCount(block.brief) / WORDS_PER_SECOND + BRIEF_PAUSE_SECONDS)
  return seconds * 1_000
}

export function isRestBlock(block: Block): boolean {
  return block.kind === 'rest' || block.format.type === 'rest'
}

/** Seconds of count-in of a block, by whether it stands straight after a rest block. */
export function countInSeconds(
  block: Pick<Block, 'kind' | 'countIn' | 'brief'>,
  isAfterRest: boolean,
): number {
  if (block.countIn !== undefined) return block.countIn
  if (block.kind !== 'work' && block.kind !== 'finisher') return 0
  return isAfterRest && block.brief === undefined ? 0 : DEFAULT_COUNT_IN_SECONDS
}

type Piece = {
  kind: SegmentKind
  seconds: number
  round?: number
  station?: number
  side?: Side
  movement?: string
}

/** Work of one station, once a side where its sides are done in turn. */
function timedWork(
  station: { movement: string; sides?: string | undefined },
  seconds: number,
  switchSeconds: number,
  round: number,
  index: number,
): Piece[] {
  const place = { round, station: index }
  const work: Piece = { kind: 'work', seconds, ...place, movement: station.movement }
  if (station.sides !== 'each') return [work]
  return [
    { ...work, side: 'left' },
    { kind: 'switch', seconds: switchSeconds, ...place },
    { ...work, side: 'right' },
  ]
}

/** The body of a block, pieces of length 0 among them. */
function bodyOf(format: Format): Piece[] {
  switch (format.type) {
    case 'rounds':
    case 'for-time': {
      const only = format.stations.length === 1 ? format.stations[0] : undefined
      const seconds = format.type === 'rounds' ? format.seconds : format.cap
      return [{ kind: 'work', seconds, ...(only ? { movement: only.movement } : {}) }]
    }
    case 'intervals': {
      const pieces: Piece[] = []
      const { rounds, stations, roundRest = 0 } = format
      for (let round = 1; round <= rounds; round += 1) {
        stations.forEach((station, index) => {
          pieces.push(...timedWork(station, station.work, station.switch ?? 0, round, index))
          const lastOfRound = index === stations.length - 1
          if (lastOfRound && round === rounds) return
          const seconds = lastOfRound && roundRest > 0 ? roundRest : station.rest
          pieces.push({ kind: 'rest', seconds, round, station: index })
        })
      }
      return pieces
    }
    case 'every':
      return Array.from({ length: format.times }, (_, interval) => {
        const index = interval % format.stations.length
        const movement = format.stations[index]?.movement
        return {
          kind: 'work' as const,
          seconds: format.seconds,
          round: Math.floor(interval / format.stations.length) + 1,
          station: index,
          ...(movement === undefined ? {} : { movement }),
        }
      })
    case 'holds':
      return format.stations.flatMap((station, index) => {
        const switchSeconds = station.switch ?? DEFAULT_HOLD_SWITCH_SECONDS
        const pieces = timedWork(station, station.seconds, switchSeconds, 1, index)
        if (index < format.stations.length - 1) {
          pieces.push({ kind: 'rest', seconds: station.rest ?? 0, round: 1, station: index })
        }
        return pieces
      })
    case 'rest':
      return [{ kind: 'rest', seconds: format.seconds }]
  }
}

/** Seconds of a block's body, its brief and count-in apart. */
export function bodySeconds(format: Format): number {
  return bodyOf(format).reduce((sum, piece) => sum + piece.seconds, 0)
}

/** Segments of a spec, end to end from 0. */
export function segmentsOf(spec: SessionSpec): Segment[] {
  const segments: Segment[] = []
  let atMs = 0
  let isAfterRest = false
  for (const block of spec.blocks) {
    const add = ({ kind, seconds, ...place }: Piece) => {
      if (seconds <= 0 && kind !== 'brief') return
      const startMs = atMs
      atMs += seconds * 1_000
      segments.push({ kind, block: block.id, startMs, endMs: atMs, ...place })
    }
    if (block.brief !== undefined) add({ kind: 'brief', seconds: 0 })
    add({ kind: 'count-in', seconds: countInSeconds(block, isAfterRest) })
    bodyOf(block.format).forEach(add)
    isAfterRest = isRestBlock(block)
  }
  return segments
}

function pendingOf(spec: SessionSpec): PendingCue[] {
  return spec.blocks.filter(isMembersOwnPace).flatMap((block) =>
    (block.cues ?? []).flatMap((cue) => {
      const { at } = cue
      if ('from' in at) return []
      const station = 'station' in at ? { station: at.station } : {}
      return [{ block: block.id, id: cue.id, round: at.round ?? 1, ...station }]
    }),
  )
}

/**
 * Compiles a sound class (see `check`) to its timeline, in whole milliseconds of class time. Linear in
 * the number of segments and cues but for the sorting of marks.
 */
export function compile(version: Pick<PublishedVersion, 'spec'>): Timeline {
  const { spec } = version
  const segments = segmentsOf(spec)
  return {
    lengthMs: segments.at(-1)?.endMs ?? 0,
    segments,
    marks: marksOf(segments, spec),
    pending: pendingOf(spec),
  }
}

/** Class time plus every brief, in milliseconds: the length that is shown to people. */
export function realLengthMs(version: Pick<PublishedVersion, 'spec'>): number {
  const classMs = segmentsOf(version.spec).at(-1)?.endMs ?? 0
  return version.spec.blocks.reduce((sum, block) => sum + briefMs(block), classMs)
}
