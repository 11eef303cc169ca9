/**
 * A run of a class: dated facts, never a counter. `now` is always an argument: whole milliseconds on
 * a clock that never goes back (the rim maps it to the computer's own). What is happening at an
 * instant is computed from the facts, so a hidden tab or a slow machine cannot make it drift.
 */
import type { Reason } from '../spec/movement'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent, CountedBy, Counting, HurtPlace, StopSign } from '../tally/events'
import type { Mark, Segment, Timeline } from './types'

type DistributiveOmit<T, K extends PropertyKey> = T extends unknown ? Omit<T, K> : never
/** An event before the rim stamps it with id, device, seq and wallMs. */
export type EventDraft = DistributiveOmit<ClassEvent, 'id' | 'device' | 'seq' | 'wallMs'>

export interface RunSettings {
  /** Briefs wait for the member instead of going on by themselves. */
  waitAtBriefs: boolean
  /** 'More time to change': added to every switch and count-in. Recorded as `rest-lengthened`. */
  changeExtraMs: number
}

export type Command =
  | {
      type: 'start'
      versionId: string
      counting: Counting
      options: { block: string; station: number; option: string; from: 'fitted' | 'chosen' | 'coach' }[]
    }
  | { type: 'pause' }
  /** After a pause or a gap: from where the member was, or from where the clock would be by now. */
  | { type: 'resume'; from?: 'where-i-was' | 'where-the-clock-would-be' }
  | { type: 'pass-brief' }
  | { type: 'lengthen-rest'; ms: number }
  /** Go on now; only in a rest, after its least time. */
  | { type: 'cut-rest' }
  | { type: 'skip-block'; reason?: string }
  /** `for-time` or a `done` ladder worked off: the member goes on. */
  | { type: 'finish-block' }
  | { type: 'log-round'; by: CountedBy }
  | { type: 'undo-round' }
  /** Corrections in a rest or after class. */
  | { type: 'set-round'; block: string; round: number; done: boolean; by: CountedBy }
  | { type: 'note-reps'; block: string; round: number; reps: number }
  | { type: 'choose-option'; block: string; station: number; option: string; reason?: Reason }
  | { type: 'note-load'; block: string; station: number; kilograms: number }
  /** Rest as needed inside work: class time runs on. */
  | { type: 'rest-as-needed' }
  | { type: 'end-rest-as-needed' }
  | { type: 'hurt'; where: HurtPlace; note?: string }
  /** Halts the clock at once; `describe-stop` adds what the member chooses to say. */
  | { type: 'stop' }
  | { type: 'describe-stop'; sign?: StopSign; where?: string; note?: string }
  /** Not offered after a red-flag sign. */
  | { type: 'go-on-after-stop' }
  | { type: 'end-class' }
  | { type: 'rate'; rpe: number; note?: string; hurts?: { where: HurtPlace; note?: string }[] }

/** What the rim must do besides storing the events. */
export type Effect = { type: 'sound'; sound: 'logged' | 'start' } | { type: 'say'; text: string }

export interface Applied {
  run: Run
  events: EventDraft[]
  effects: Effect[]
  /** Set where nothing was done, with a sentence for the member ('Round 4 logged a second ago…'). */
  refused: string | null
}

/** Opaque to the rim, plain data (survives structured clone into IndexedDB). */
export interface Run {
  version: PublishedVersion
  versionId: string
  settings: RunSettings
  /** As compiled. */
  base: Timeline
  /** With rests lengthened and cut, blocks skipped or finished early, more time to change. */
  timeline: Timeline
  facts: Fact[]
}

export type Fact =
  | { type: 'started'; atMs: number }
  | { type: 'paused'; atMs: number }
  /** The clock goes on at `classMs`, `briefElapsedMs` into a brief if it stands in one. */
  | { type: 'resumed'; atMs: number; segment: number; classMs: number; briefElapsedMs: number }
  | { type: 'brief-passed'; atMs: number; segment: number }
  | { type: 'stretched'; segment: number; ms: number }
  /** The segment ends at this class time; those of the same block after it are gone. */
  | { type: 'cut-off'; segment: number; atClassMs: number; wholeBlock: boolean }
  | { type: 'resting'; atMs: number }
  | { type: 'rested'; atMs: number }
  | { type: 'logged'; atMs: number; block: string; round: number }
  | { type: 'unlogged'; atMs: number; block: string; round: number }
  | { type: 'chose'; block: string; station: number; option: string; from: 'fitted' | 'chosen' | 'coach' }
  | { type: 'stopped'; atMs: number; redFlag: boolean }
  | { type: 'ended'; atMs: number }

export interface Position {
  /** `over`: the last segment ran out, or the class was ended. */
  phase: 'ready' | 'brief' | 'segment' | 'over'
  halted: 'paused' | 'stopped' | null
  classMs: number
  /** Index into `run.timeline.segments`; -1 before class. */
  segmentIndex: number
  segment: Segment | null
  elapsedMs: number
  leftMs: number
  /** In a brief; null while it waits for the member. */
  briefLeftMs: number | null
  /** Index into spec.blocks; -1 before class. */
  blockIndex: number
  /** Into and before the end of the block's body; 0 where the body has not begun. */
  bodyElapsedMs: number
  bodyLeftMs: number
  /** Member's own place in `rounds` and `for-time`: the round being worked on, from 1; null elsewhere. */
  round: number | null
  /** A `done` ladder has run out, or `for-time` rounds are all done: the screen shows rest, the member may go on. */
  workedOff: boolean
  /** Rest as needed in progress: how long, else null. */
  restingMs: number | null
  /** In a rest: when it may be cut ('go'), and how far it may still be lengthened. */
  rest: { mayCutInMs: number; mayLengthenMs: number } | null
}

/** A mark with a key that stays the same however the timeline is edited, so that none sounds twice. */
export type PlacedMark = Mark & { key: string; segmentIndex: number }
