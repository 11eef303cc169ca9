/** What is said aloud in a class, when, and what finds no time to be said. */
import type { PublishedVersion } from '../spec/version'
import { wordCount } from './compile'
import type { Mark, Segment, Timeline } from './types'

const MS_PER_WORD = 400
const SHORTEST_MS = 1_000
/** What cannot start this soon after its moment is shown and not said. */
const LATEST_START_MS = 5_000

/** First said first; a safety cue also cuts what is being said. */
const RANK = { safety: 0, call: 1, cue: 2, next: 3, brief: 4 } as const

/** A text that wants to be said at `atMs`. */
export interface Utterance {
  atMs: number
  what: keyof typeof RANK
  text: string
  /** Only of a coach's cue, its kind `safety` among them. */
  cue?: { block: string; id: string }
}

/** What became of it: said from `startMs` to `endMs`, or shown only. Times are class time. */
export type Spoken = Utterance &
  ({ isSaid: true; startMs: number; endMs: number; isCut: boolean } | { isSaid: false })

/** How long a text takes to say, in milliseconds: 150 words a minute, a second at least. */
export function speechMs(text: string): number {
  return Math.max(SHORTEST_MS, wordCount(text) * MS_PER_WORD)
}

/** What a time call says, by the seconds left. */
export function callText(left: number, isHalf: boolean): string {
  if (isHalf) return 'Half-way'
  return left === 60 ? '1 minute' : `${left} seconds`
}

function mayStart(utterance: Utterance, nowMs: number): boolean {
  return nowMs <= utterance.atMs + LATEST_START_MS
}

/**
 * Which of those that wait (in order of their moments) is said at `nowMs`: the first in rank, of equals
 * the earlier; what is more than 5 s past its moment is said no more. Null where none may be.
 */
export function nextToSay<T extends Utterance>(waiting: readonly T[], nowMs: number): T | null {
  return waiting.reduce<T | null>((first, one) => {
    if (!mayStart(one, nowMs)) return first
    return first && RANK[first.what] <= RANK[one.what] ? first : one
  }, null)
}

/** Whether a safety cue that falls due cuts what is being said. */
export function isCutBySafety(current: Utterance): boolean {
  return current.what !== 'safety'
}

/**
 * Gives the one voice to `utterances` (sorted by `atMs`) by session-spec's rules: safety, time call,
 * coach's cue, `next`; of equals the earlier; never two at once. In the order of their moments.
 */
export function speak(utterances: readonly Utterance[]): Spoken[] {
  type Turn = { utterance: Utterance; startMs: number | null; endMs: number; isCut: boolean }
  const turns: Turn[] = utterances.map((utterance) => ({
    utterance,
    startMs: null,
    endMs: 0,
    isCut: false,
  }))
  let waiting: Turn[] = []
  let current: Turn | null = null
  let freeAtMs = -Infinity

  const startBest = (nowMs: number) => {
    waiting = waiting.filter((turn) => mayStart(turn.utterance, nowMs))
    const utterance = nextToSay(
      waiting.map((turn) => turn.utterance),
      nowMs,
    )
    const best = waiting.find((turn) => turn.utterance === utterance)
    if (!best) return
    waiting = waiting.filter((turn) => turn !== best)
    best.startMs = nowMs
    best.endMs = freeAtMs = nowMs + speechMs(best.utterance.text)
    current = best
  }
  /** Lets those who wait speak one after another until `untilMs`. */
  const runOut = (untilMs: number) => {
    while (waiting.length > 0 && freeAtMs < untilMs) startBest(freeAtMs)
  }
  const cut = (turn: Turn | null, nowMs: number) => {
    if (!turn || !isCutBySafety(turn.utterance)) return
    turn.endMs = freeAtMs = nowMs
    turn.isCut = true
  }

  let index = 0
  while (index < turns.length) {
    const nowMs = turns[index]?.utterance.atMs ?? 0
    runOut(nowMs)
    let isSafetyDue = false
    for (let turn = turns[index]; turn?.utterance.atMs === nowMs; turn = turns[index]) {
      waiting.push(turn)
      isSafetyDue ||= turn.utterance.what === 'safety'
      index += 1
    }
    if (isSafetyDue && freeAtMs > nowMs) cut(current, nowMs)
    if (freeAtMs <= nowMs) startBest(nowMs)
  }
  runOut(Infinity)
  return turns.map(({ utterance, startMs, endMs, isCut }) =>
    startMs === null
      ? { ...utterance, isSaid: false }
      : { ...utterance, isSaid: true, startMs, endMs, isCut },
  )
}

/**
 * What a `next` mark says: rest, or the movement that follows with its side, else the block. `segments`:
 * the timeline that it is a mark of, in order.
 */
export function nextText(
  version: PublishedVersion,
  segments: readonly Segment[],
  mark: Mark & { what: 'next' },
): string | null {
  const block = version.spec.blocks.find((one) => one.id === mark.block)
  if (!block) return null
  const coming = segments.find(
    ({ kind, startMs, endMs }) =>
      (kind === 'work' || kind === 'rest') && startMs > mark.atMs && endMs > startMs,
  )
  const isRest = coming?.block === block.id && coming.kind === 'rest'
  if (isRest || block.format.type === 'rest') return 'Next: rest'
  const station = mark.station === undefined ? undefined : block.format.stations[mark.station]
  const movement = version.movements.find((one) => one.slug === station?.movement)
  const side = coming?.block === block.id ? coming.side : undefined
  return `Next: ${movement?.name ?? block.title}${side ? `, ${side}` : ''}`
}

/** What a mark of `segments` wants said at `atMs`; null for a beep and for a cue that is only shown. */
export function utteranceOf(
  version: PublishedVersion,
  segments: readonly Segment[],
  mark: Mark,
  atMs: number,
): Utterance | null {
  if (mark.what === 'beep') return null
  if (mark.what === 'call') {
    return { atMs, what: 'call', text: callText(mark.left, mark.half === true) }
  }
  if (mark.what === 'next') {
    const text = nextText(version, segments, mark)
    return text === null ? null : { atMs, what: 'next', text }
  }
  const block = version.spec.blocks.find((one) => one.id === mark.block)
  const cue = block?.cues?.find((one) => one.id === mark.id)
  if (!cue || cue.say === false) return null
  return {
    atMs,
    what: cue.kind === 'safety' ? 'safety' : 'cue',
    text: cue.spoken ?? cue.text,
    cue: { block: mark.block, id: mark.id },
  }
}

/**
 * Everything of a compiled class that wants to be said at a fixed moment, in order of time: calls,
 * cues with `say`, announcements. Cues that wait for the member's own rounds are not among them.
 */
export function utterancesOf(version: PublishedVersion, timeline: Timeline): Utterance[] {
  return timeline.marks.flatMap(
    (mark) => utteranceOf(version, timeline.segments, mark, mark.atMs) ?? [],
  )
}

/** The most letters that are said in one go: some browsers fall silent in the middle of longer ones. */
const MOST_LETTERS = 160

/** A longer text, such as a brief, in parts that end where a sentence or at least a word does. */
export function sentencesOf(text: string): string[] {
  const parts: string[] = []
  let part = ''
  for (const word of text.split(/\s+/).filter(Boolean)) {
    const longer = part === '' ? word : `${part} ${word}`
    if (part !== '' && (longer.length > MOST_LETTERS || /[.!?…:]$/.test(part))) {
      parts.push(part)
      part = word
    } else part = longer
  }
  return part === '' ? parts : [...parts, part]
}
