/**
 * A run of a class: dated facts, never a counter. `now` is always an argument: whole milliseconds on
 * a clock that never goes back (the rim maps it to the computer's own). What is happening at an
 * instant is computed from the facts, so a hidden tab or a slow machine cannot make it drift.
 */
import type { Reason } from '../spec/movement'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent, CountedBy, Counting, HurtPlace, StopSign } from '../tally/events'
import type { LeadNow } from '../pace/lead'
import type { PaceStart } from '../pace/walk'
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
      options: {
        block: string
        station: number
        option: string
        from: 'fitted' | 'chosen' | 'coach'
      }[]
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
  /** Rounds that a followed lead has completed: owed by the run itself. */
  | { type: 'log-lead-rounds' }
  /** The lead counts from now, from the member's own round and this station of it (from 0). */
  | { type: 'follow-lead'; station?: number; logs: boolean }
  | { type: 'leave-lead' }
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
export type Effect = { type: 'sound'; sound: 'logged' }

export interface Applied {
  run: Run
  /** To be stamped and stored in this order. */
  events: EventDraft[]
  effects: Effect[]
  /** Set where nothing was done, with a sentence for the member ('Round 4 was logged a second ago…'). */
  refused: string | null
}

/** Where in the class somebody is. */
export interface Place {
  /** Index into `run.timeline.segments`; their number where the class is over. */
  segment: number
  classMs: number
  /** Into a brief, which has no length in class time; 0 elsewhere. */
  briefElapsedMs: number
  /** Only in `Position.place`: class time at which a rest as needed began that is still going on. */
  restingSinceMs?: number
  /** Only in `Position.place`: from where the lead of this block goes. */
  lead?: LeadAnchor
}

/** From where a followed lead counts. */
export type LeadAnchor = PaceStart & {
  /** It logs the rounds that it completes. */
  logs: boolean
}

/** How a segment differs from the compiled one. */
export interface SegmentEdit {
  lengthenedMs: number
  cutMs: number
  /** Length at which it was left, by a skip or an early finish of its block; null where it was not. */
  leftAtMs: number | null
}

/** Where the body of a block lies in the edited class. */
export interface BlockSpan {
  /** Index of its first and last segment of any kind, and of the first of its body. */
  firstSegment: number
  lastSegment: number
  bodySegment: number
  bodyStartMs: number
  bodyEndMs: number
}

/** The compiled class with what the member has changed. Segments keep their indexes; those that are gone have no length. */
export interface RunTimeline extends Timeline {
  marks: PlacedMark[]
  /** One per block of the spec. */
  blocks: BlockSpan[]
}

export interface RunBlock {
  /** Rounds done, with the class time at which each was logged; in order of round. */
  logged: { round: number; classMs: number }[]
  /** Option in force, by station. */
  options: string[]
  /** Null where the lead is not followed in this block. */
  lead: LeadAnchor | null
  /** Rests as needed that are over: the lead waited. Class time, in order. */
  rests: { fromClassMs: number; toClassMs: number }[]
}

/** Opaque to the rim, plain data (survives structured clone into IndexedDB). */
export interface Run {
  version: PublishedVersion
  versionId: string
  settings: RunSettings
  /** As compiled. */
  base: Timeline
  /** With rests lengthened and cut, blocks skipped or finished early, more time to change. */
  timeline: RunTimeline
  /** By segment. */
  edits: (SegmentEdit | null)[]
  /** The last dated fact: at `atMs` the member was at `place`. Null before class. The class runs from there unless halted. */
  clock: { atMs: number; place: Place } | null
  halted: 'paused' | 'stopped' | null
  /** Class time at which the class was last halted. */
  haltedClassMs: number
  /** How the member counts, from the start of the class; a lead that is joined again logs where this is `lead`. */
  counting: Counting | null
  /** A red-flag sign was given: going on is not offered in this class. */
  redFlag: boolean
  /** `end-class` was given. */
  ended: boolean
  /** Rest as needed in progress, since this class time. */
  resting: { segment: number; sinceClassMs: number } | null
  blocks: RunBlock[]
  /** For the guard against a double press, on the clock of `now`. */
  lastLogged: { block: string; round: number; atMs: number } | null
}

export interface Position {
  /** `over`: the last segment ran out, or the class was ended. */
  phase: 'ready' | 'brief' | 'segment' | 'over'
  halted: 'paused' | 'stopped' | null
  /** Going on after the stop is not offered. */
  redFlag: boolean
  classMs: number
  /** Index into `run.timeline.segments`; -1 before class. */
  segmentIndex: number
  segment: Segment | null
  elapsedMs: number
  leftMs: number
  /** In a brief; null while it waits for the member. */
  briefLeftMs: number | null
  /** Index into spec.blocks; -1 before class; the last block where the class is over. */
  blockIndex: number
  /** Into and before the end of the block's body; 0 where the body has not begun. */
  bodyElapsedMs: number
  bodyLeftMs: number
  /** Member's own place in `rounds` and `for-time`: the lowest round not done, from 1; null elsewhere. */
  round: number | null
  /** A `done` ladder has run out, or `for-time` rounds are all done: the screen shows rest, the member may go on. */
  workedOff: boolean
  /** Rest as needed in progress: how long, else null. */
  restingMs: number | null
  /** What the lead does, where it is followed and the block's work goes on; it waits during a rest as needed. */
  lead: (LeadNow & { logs: boolean; isWaiting: boolean }) | null
  /** In a rest: when it may be cut ('go'), and how far it may still be lengthened. */
  rest: { mayCutInMs: number; mayLengthenMs: number } | null
  /** To be kept by the rim as the sign of life, with the computer's time, about every second and with every event. */
  place: Place | null
  /** A command that is due by itself (a rest as needed that its segment ended, the natural end): the rim sends it at once. */
  owed: Extract<Command, { type: 'end-rest-as-needed' | 'log-lead-rounds' | 'end-class' }> | null
}

/** The last that is known of a run before a reload. */
export interface SignOfLife {
  /** How long ago, in milliseconds. Negative or not a number (the computer's clock was changed): taken as a long gap. */
  agoMs: number
  /** From `Position.place`; null where only the events are known, as on another device. */
  place: Place | null
}

/** A gap up to this long runs on as if nothing had been (session-spec.md, Gaps). */
export const GAP_MS = 30_000

/** A mark with a key that stays the same however the timeline is edited, so that none sounds twice. */
export type PlacedMark = Mark & { key: string; segmentIndex: number }

/** A mark and the instant, on the clock of `now`, at which it falls due. */
export type DueMark = PlacedMark & { dueAtMs: number }
