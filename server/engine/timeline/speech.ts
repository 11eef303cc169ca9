/** What is said aloud in a class, when, and what finds no time to be said. */
import type { PublishedVersion } from '../spec/version'
import { wordCount } from './compile'
import type { Mark, Timeline } from './types'

const MS_PER_WORD = 400
const SHORTEST_MS = 1_000
/** What cannot start this soon after its moment is shown and not said. */
const LATEST_START_MS = 5_000

/** First said first; a safety cue also cuts what is being said. */
const RANK = { safety: 0, call: 1, cue: 2, next: 3 } as const

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
    waiting = waiting.filter((turn) => nowMs <= turn.utterance.atMs + LATEST_START_MS)
    const best = waiting.reduce<Turn | null>(
      (first, turn) =>
        first && RANK[first.utterance.what] <= RANK[turn.utterance.what] ? first : turn,
      null,
    )
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
    if (!turn || turn.utterance.what === 'safety') return
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

/** What a `next` mark says: the movement that follows, else the block. */
export function nextText(version: PublishedVersion, mark: Mark & { what: 'next' }): string | null {
  const block = version.spec.blocks.find((one) => one.id === mark.block)
  if (!block) return null
  if (block.format.type === 'rest') return 'Next: rest'
  const station = mark.station === undefined ? undefined : block.format.stations[mark.station]
  const movement = version.movements.find((one) => one.slug === station?.movement)
  return `Next: ${movement?.name ?? block.title}`
}

/**
 * Everything of a compiled class that wants to be said at a fixed moment, in order of time: calls,
 * cues with `say`, announcements. Cues that wait for the member's own rounds are not among them.
 */
export function utterancesOf(version: PublishedVersion, timeline: Timeline): Utterance[] {
  const cues = new Map(
    version.spec.blocks.flatMap((block) =>
      (block.cues ?? []).map((cue) => [`${block.id}/${cue.id}`, cue] as const),
    ),
  )
  return timeline.marks.flatMap((mark): Utterance[] => {
    const { atMs } = mark
    if (mark.what === 'beep') return []
    if (mark.what === 'call') {
      return [{ atMs, what: 'call', text: callText(mark.left, mark.half === true) }]
    }
    if (mark.what === 'next') {
      const text = nextText(version, mark)
      return text === null ? [] : [{ atMs, what: 'next', text }]
    }
    const cue = cues.get(`${mark.block}/${mark.id}`)
    if (!cue || cue.say === false) return []
    return [
      {
        atMs,
        what: cue.kind === 'safety' ? 'safety' : 'cue',
        text: cue.spoken ?? cue.text,
        cue: { block: mark.block, id: mark.id },
      },
    ]
  })
}
