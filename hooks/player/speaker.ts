/**
 * The one voice of a running class: what falls due is said by session-spec's rules of speech, in real
 * time, and captioned as it is said. Where nothing can speak, the captions keep the same time.
 */
import type { PublishedVersion } from '@/server/engine/spec/version'
import { marksBetween } from '@/server/engine/timeline/run'
import type { Position, Run } from '@/server/engine/timeline/run-types'
import {
  isCutBySafety,
  nextToSay,
  sentencesOf,
  speechMs,
  utteranceOf,
  type Utterance,
} from '@/server/engine/timeline/speech'
import type { VoicePort } from './ports'

/** A voice cannot be turned down while it speaks: what a beep falls into is said this soft from the start. */
const UNDER_BEEPS = 0.45
/** A browser that never says it has done is given this many times the usual length, and some. */
const PATIENCE = 3
const PATIENCE_MS = 4_000
/** A brief that was entered longer ago than this, by a reload, is not said. */
const BRIEF_FRESH_MS = 5_000

export interface Speaker {
  /** What lies before `nowMs` is past. */
  begin(nowMs: number): void
  /** To be called at every wake and command; cuts what a pause, a stop or a passed brief leaves behind. */
  tick(run: Run, position: Position, nowMs: number): void
  silence(): void
}

interface Turn {
  utterance: Utterance
  /** What is left to say of it, the present part first. */
  parts: string[]
  sinceMs: number
  /** Null where it is only captioned. */
  cut: (() => void) | null
  hasEnded: boolean
}

/** `show` gets the caption of what is being said, null when that ends. */
export function createSpeaker(
  version: PublishedVersion,
  voice: Pick<VoicePort, 'say'>,
  show: (caption: string | null) => void,
): Speaker {
  let waiting: Utterance[] = []
  let current: Turn | null = null
  let askedToMs = 0
  let briefIn = -1
  const heard = new Set<string>()

  function end(): void {
    current?.cut?.()
    if (current) show(null)
    current = null
  }

  function silence(): void {
    waiting = []
    end()
  }

  function say(turn: Turn, run: Run, nowMs: number): void {
    const [text] = turn.parts
    if (text === undefined) return end()
    const endMs = nowMs + speechMs(text)
    const isUnderBeeps = marksBetween(run, nowMs, endMs).some((mark) => mark.what === 'beep')
    turn.sinceMs = nowMs
    turn.hasEnded = false
    turn.cut = voice.say(text, isUnderBeeps ? UNDER_BEEPS : 1, () => {
      turn.hasEnded = true
    })
    show(text)
  }

  function goOn(run: Run, nowMs: number): void {
    if (!current) return
    const [text = ''] = current.parts
    const takenMs = nowMs - current.sinceMs
    const usualMs = speechMs(text)
    if (current.cut === null) current.hasEnded ||= takenMs >= usualMs
    else if (takenMs > PATIENCE * usualMs + PATIENCE_MS) {
      current.cut()
      current.hasEnded = true
    }
    if (!current.hasEnded) return
    current.parts = current.parts.slice(1)
    current.cut = null
    if (current.parts.length > 0) say(current, run, nowMs)
    else end()
  }

  function dueOf(run: Run, position: Position, nowMs: number): Utterance[] {
    const due: Utterance[] = []
    for (const mark of marksBetween(run, askedToMs, nowMs + 1)) {
      if (heard.has(mark.key)) continue
      heard.add(mark.key)
      const utterance = utteranceOf(version, run.timeline.segments, mark, mark.dueAtMs)
      if (utterance) due.push(utterance)
    }
    askedToMs = Math.max(askedToMs, nowMs + 1)
    const isBrief = position.phase === 'brief'
    if (isBrief && briefIn !== position.segmentIndex && position.elapsedMs <= BRIEF_FRESH_MS) {
      const text = version.spec.blocks[position.blockIndex]?.brief
      if (text) due.push({ atMs: nowMs, what: 'brief', text })
    }
    briefIn = isBrief ? position.segmentIndex : -1
    return due
  }

  return {
    begin(nowMs) {
      silence()
      askedToMs = nowMs
      briefIn = -1
    },
    silence,
    tick(run, position, nowMs) {
      if (position.halted || position.phase === 'over' || position.phase === 'ready') {
        silence()
        askedToMs = Math.max(askedToMs, nowMs)
        return
      }
      if (current?.utterance.what === 'brief' && briefIn !== position.segmentIndex) end()
      const due = dueOf(run, position, nowMs)
      waiting.push(...due)
      if (due.some((one) => one.what === 'safety') && current && isCutBySafety(current.utterance)) {
        end()
      }
      goOn(run, nowMs)
      if (current) return
      const best = nextToSay(waiting, nowMs)
      // What was passed over in favour of another may still come; what is too late may not.
      waiting = best ? waiting.filter((one) => one !== best) : []
      if (!best) return
      current = {
        utterance: best,
        parts: sentencesOf(best.text),
        sinceMs: nowMs,
        cut: null,
        hasEnded: false,
      }
      say(current, run, nowMs)
    },
  }
}
