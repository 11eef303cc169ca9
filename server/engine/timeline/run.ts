/**
 * The run of a class by one member: commands in, events and the next run out. Nothing here has a
 * clock: `now` is an argument, in milliseconds on a clock that never goes back.
 */
import { AS_PLANNED } from '../spec/names'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent } from '../tally/events'
import { inOrder } from '../tally/order'
import { carryOut, logLeadRounds, NOTHING, type Step } from './commands'
import { compile } from './compile'
import { dueMarks } from './due-marks'
import { withEdit } from './edits'
import { at, editedTimeline, reduce } from './facts'
import { describe, placeAt, stationsOf, wholeMs } from './place'
import {
  GAP_MS,
  type Applied,
  type Command,
  type DueMark,
  type EventDraft,
  type LeadAnchor,
  type Place,
  type Position,
  type Run,
  type RunBlock,
  type RunSettings,
  type SignOfLife,
} from './run-types'

/**
 * A run that has not started. `settings.changeExtraMs` (milliseconds) goes into the class at `start`,
 * as events, so that the events alone tell the whole run.
 */
export function newRun(version: PublishedVersion, versionId: string, settings: RunSettings): Run {
  const base = compile(version)
  const blocks: RunBlock[] = version.spec.blocks.map((block) => ({
    logged: [],
    options: stationsOf(block).map(() => AS_PLANNED),
    lead: null,
    rests: [],
  }))
  return {
    version,
    versionId,
    settings,
    base,
    timeline: editedTimeline(version, base, []),
    edits: [],
    clock: null,
    halted: null,
    haltedClassMs: 0,
    counting: null,
    redFlag: false,
    ended: false,
    resting: null,
    blocks,
    lastLogged: null,
  }
}

/** What is happening at `now`. */
export function positionAt(run: Run, now: number): Position {
  const place = placeAt(run, now)
  return describe(run, place)
}

/**
 * The marks that fall due from `fromMs` up to, not including, `toMs`, on the clock of `now`, with the
 * start sound of work that a brief or 'Start class' leads straight into. Empty while halted, and never
 * before the last command. The rim's part: at a command it cancels what it had scheduled for later than
 * that instant, asks again from it, and plays no key that it has played. A rest that is lengthened
 * counts down anew, so its beeps and calls have new keys.
 */
export function marksBetween(run: Run, fromMs: number, toMs: number): DueMark[] {
  if (!run.clock || run.halted || run.ended) return []
  return dueMarks(run, run.clock.place, run.clock.atMs, fromMs, toMs)
}

/**
 * The marks of the next `horizonMs` as they would come if the class ran on from `now`, also while it
 * is halted: what the live cue timeline draws.
 */
export function marksAhead(run: Run, now: number, horizonMs: number): DueMark[] {
  const place = placeAt(run, now)
  if (!place || run.ended) return []
  const atMs = wholeMs(now)
  return dueMarks(run, place, atMs, atMs, atMs + horizonMs)
}

/**
 * Carries out what the member does at `now`: the next run, the events to store and what to sound. A
 * command that makes no sense at this moment changes nothing and says why in `refused`.
 */
export function apply(run: Run, command: Command, now: number): Applied {
  const place = placeAt(run, now)
  const anchored: Run = place ? { ...run, clock: { atMs: anchorMs(run, now), place } } : run
  const step: Step = { run: anchored, events: [], effects: [] }
  // What the lead has counted up to now comes first, so that events tell things in their order.
  const isOwed = logLeadRounds(step, describe(run, place), wholeMs(now))
  const position = isOwed ? describe(step.run, placeAt(step.run, now)) : describe(run, place)
  const refused = carryOut(step, command, position, wholeMs(now))
  return refused === null
    ? { ...step, refused: null }
    : { run, events: [], effects: [], refused: refused === NOTHING ? null : refused }
}

/** While the class stands still its last dated fact stays: a resume may ask how long ago it was. */
function anchorMs(run: Run, now: number): number {
  return run.clock && (run.halted || run.ended)
    ? run.clock.atMs
    : Math.max(wholeMs(now), run.clock?.atMs ?? -Infinity)
}

export interface Reloaded {
  run: Run
  /** To be stored: the pause of a long gap. */
  events: EventDraft[]
  /**
   * Set where the gap is a pause, so that the member is asked where to go on: how long it was, null
   * where that cannot be known.
   */
  gap: { agoMs: number | null } | null
}

/**
 * Rebuilds a run from its stored events (in any order, doubled or not) and the last sign of life. Up to
 * `GAP_MS` ago the class runs on as if nothing had been; else it is paused at that sign, to be gone on
 * with by `resume`. With `alive` null, or without its place, the last event's class time is the place.
 */
export function runFromEvents(
  version: PublishedVersion,
  versionId: string,
  settings: RunSettings,
  events: readonly ClassEvent[],
  now: number,
  alive: SignOfLife | null,
): Reloaded {
  const agoMs = alive && alive.agoMs >= 0 ? alive.agoMs : Infinity
  const lastMs = Number.isFinite(agoMs) ? wholeMs(now) - wholeMs(agoMs) : wholeMs(now)
  let run = newRun(version, versionId, settings)
  let isLaidOut = true
  for (const event of inOrder(events)) {
    if (event.type === 'started' && !run.clock) {
      run = {
        ...run,
        clock: { atMs: lastMs, place: { segment: 0, classMs: 0, briefElapsedMs: 0 } },
      }
    }
    if (event.type === 'rest-lengthened' && event.classMs === 0) {
      // 'More time to change' comes as one event a segment: the class is laid out once for them all.
      const edits = withEdit(version.spec, run.base.segments, run.edits, event)
      isLaidOut &&= edits === run.edits
      run = { ...run, edits }
      continue
    }
    if (!isLaidOut) run = laidOut(run)
    isLaidOut = true
    run = reduce(run.ended ? run : caughtUp(run, event), event)
  }
  if (!isLaidOut) run = laidOut(run)
  if (!run.clock) return { run, events: [], gap: null }
  if (alive?.place && isAhead(alive.place, run.clock.place)) {
    const { restingSinceMs, lead, ...place } = alive.place
    run = at(run, place)
    if (lead) run = withLeadAt(run, place.segment, lead)
    if (restingSinceMs !== undefined && !run.ended && run.halted !== 'stopped') {
      run = { ...run, resting: { segment: place.segment, sinceClassMs: restingSinceMs } }
    }
  }
  if (run.halted || run.ended || agoMs <= GAP_MS) return { run, events: [], gap: null }
  return pausedAt(run, lastMs, Number.isFinite(agoMs) ? agoMs : null)
}

/**
 * A gap without a reload (sleep, a closed lid), noticed at `now` where the last sign of life was at
 * `lastAliveMs`: nothing up to `GAP_MS`, else a pause from that sign of life.
 */
export function afterGap(run: Run, lastAliveMs: number, now: number): Reloaded {
  const agoMs = wholeMs(now) - wholeMs(lastAliveMs)
  return agoMs <= GAP_MS ? { run, events: [], gap: null } : pausedAt(run, lastAliveMs, agoMs)
}

function pausedAt(run: Run, lastAliveMs: number, agoMs: number | null): Reloaded {
  const position = positionAt(run, lastAliveMs)
  const runs = position.phase === 'brief' || position.phase === 'segment'
  if (!runs || position.halted) return { run, events: [], gap: null }
  const paused = apply(run, { type: 'pause' }, lastAliveMs)
  return { run: paused.run, events: paused.events, gap: { agoMs } }
}

/** The lead as it was kept: events do not tell the station from which it was joined. */
function withLeadAt(run: Run, segment: number, lead: LeadAnchor): Run {
  const id = run.timeline.segments[segment]?.block
  const index = run.version.spec.blocks.findIndex((block) => block.id === id)
  const block = run.blocks[index]
  return block?.lead ? { ...run, blocks: run.blocks.with(index, { ...block, lead }) } : run
}

function laidOut(run: Run): Run {
  return { ...run, timeline: editedTimeline(run.version, run.base, run.edits) }
}

function isAhead(place: Place, other: Place): boolean {
  return (
    place.segment > other.segment ||
    (place.segment === other.segment &&
      (place.classMs > other.classMs ||
        (place.classMs === other.classMs && place.briefElapsedMs >= other.briefElapsedMs)))
  )
}

/** The run with its place moved on to where `event` happened, passing no brief that it need not. */
function caughtUp(run: Run, event: ClassEvent): Run {
  if (!run.clock) return run
  const { segments, blocks } = run.timeline
  let { segment: index, classMs, briefElapsedMs } = run.clock.place
  const own =
    'block' in event ? run.version.spec.blocks.findIndex((one) => one.id === event.block) : -1
  const isInBody =
    event.type === 'block-finished' ||
    event.type === 'rest-taken' ||
    (event.type === 'round-done' && event.by !== 'afterwards')
  const body = isInBody ? blocks[own] : undefined
  for (; index < segments.length; index += 1) {
    const segment = segments[index]
    if (!segment) break
    if (segment.kind === 'brief') {
      const isBehind =
        event.classMs > classMs ||
        (body !== undefined && index < body.bodySegment && event.classMs >= body.bodyStartMs)
      if (!isBehind) break
    } else {
      if (event.classMs < segment.endMs) {
        classMs = Math.max(classMs, event.classMs)
        break
      }
      classMs = Math.max(classMs, segment.endMs)
    }
    briefElapsedMs = 0
  }
  return at(run, { segment: index, classMs, briefElapsedMs })
}
