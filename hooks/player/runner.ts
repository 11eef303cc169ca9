/** Marks of a run as they fall due: each sounds once, none late, and the latest that says something is shown. */
import type { PublishedVersion } from '@/server/engine/spec/version'
import { marksBetween } from '@/server/engine/timeline/run'
import { markSound } from '@/server/engine/timeline/mark-sound'
import type { DueMark, Run } from '@/server/engine/timeline/run-types'
import { markText } from './mark-text'
import type { SoundPort } from './ports'
import type { RunClock } from './run-clock'
import type { PlayerState } from './types'

/** How far ahead sounds are put on the audio clock; the ticker wakes several times within it. */
const LOOK_AHEAD_MS = 200
/** A mark later than this is dropped, never bunched with the next. */
const TOO_LATE_MS = 250
/** Within this time of a mark that matters more, a lesser one is not shown over it. */
const HOLDS_MS = 1_000
const IMPORTANCE = { cue: 3, call: 2, next: 1, beep: 0 } as const

export interface Runner {
  /** A run begins, or is gone on with after a reload: what lies before `nowMs` is past. */
  begin(nowMs: number): void
  /** What was scheduled for later than `nowMs` is called off and asked for anew: the run has changed. */
  changed(nowMs: number): void
  /** Nothing more sounds: paused by a gap, taken by another tab, closed. */
  silence(): void
  /** Puts what falls due within the look-ahead on the audio clock. */
  sound(run: Run, nowMs: number): void
  /** The cue, call or announcement that is due. */
  due(run: Run, nowMs: number): PlayerState['due']
}

export function createRunner(
  version: PublishedVersion,
  port: Pick<SoundPort, 'schedule'>,
  clock: Pick<RunClock, 'toMonotonic'>,
): Runner {
  const sounded = new Map<string, { dueAtMs: number; callOff: () => void }>()
  let askedToMs = 0
  let shownToMs = 0
  let shown: { mark: DueMark; text: string } | null = null

  function callOffAfter(atMs: number): void {
    for (const [key, one] of sounded) {
      if (one.dueAtMs <= atMs) continue
      one.callOff()
      sounded.delete(key)
    }
  }

  return {
    begin(nowMs) {
      callOffAfter(-Infinity)
      askedToMs = nowMs
      shownToMs = nowMs
      shown = null
    },
    changed(nowMs) {
      callOffAfter(nowMs)
      // What was held back until sound runs lies before now and is still asked for.
      askedToMs = Math.min(askedToMs, nowMs)
    },
    silence: () => callOffAfter(-Infinity),
    sound(run, nowMs) {
      const toMs = nowMs + LOOK_AHEAD_MS
      let heardToMs = toMs
      for (const mark of marksBetween(run, askedToMs, toMs)) {
        const name = markSound(mark, run.timeline.segments[mark.segmentIndex]?.kind)
        if (!name || sounded.has(mark.key)) continue
        const isLate = nowMs - mark.dueAtMs > TOO_LATE_MS
        const callOff = isLate ? null : port.schedule(name, clock.toMonotonic(mark.dueAtMs))
        if (callOff || isLate) {
          sounded.set(mark.key, { dueAtMs: mark.dueAtMs, callOff: callOff ?? (() => undefined) })
        } else {
          // Sound does not run yet: the next wake asks again until the mark is too late.
          heardToMs = Math.min(heardToMs, mark.dueAtMs)
        }
      }
      askedToMs = Math.max(askedToMs, heardToMs)
    },
    due(run, nowMs) {
      for (const mark of marksBetween(run, shownToMs, nowMs + 1)) {
        const text = markText(version, run.timeline.segments, mark)
        if (text === null) continue
        const isLess =
          shown !== null &&
          mark.dueAtMs - shown.mark.dueAtMs < HOLDS_MS &&
          IMPORTANCE[mark.what] < IMPORTANCE[shown.mark.what]
        if (!isLess) shown = { mark, text }
      }
      shownToMs = Math.max(shownToMs, nowMs + 1)
      return shown && { ...shown, sinceMs: Math.max(0, nowMs - shown.mark.dueAtMs) }
    },
  }
}
