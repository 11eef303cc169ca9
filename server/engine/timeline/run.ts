/**
 * The run of a class by one member: commands in, events and the next run out. Nothing here has a
 * clock: `now` is an argument, in milliseconds on a clock that never goes back.
 */
import { expectedStationStartMs } from '../pace/forecast'
import { blockPlan, roundReps, type BlockPlan } from '../pace/block-plan'
import { optionsOf } from '../spec/options'
import { AS_PLANNED } from '../spec/movement'
import type { Block } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import { HURT_PLACES, RED_FLAG_SIGNS, STOP_SIGNS, type ClassEvent } from '../tally/events'
import { inOrder } from '../tally/order'
import { briefMs, compile } from './compile'
import { blockSpans, editedSegments, isLive, withEdit } from './edits'
import { placeMarks } from './placed-marks'
import {
  GAP_MS,
  type Applied,
  type Command,
  type DueMark,
  type Effect,
  type EventDraft,
  type Place,
  type Position,
  type Run,
  type RunBlock,
  type RunSettings,
  type SignOfLife,
} from './run-types'
import type { PendingCue, Segment } from './types'

/** A second press within this time is one press. */
export const DOUBLE_PRESS_MS = 1_500
/** How far a rest may be lengthened where the coach gave no `atMost`. */
export const MOST_ADDED_TO_REST_MS = 300_000

type Step = { run: Run; events: EventDraft[]; effects: Effect[] }

/**
 * A run that has not started. `settings.changeExtraMs` (milliseconds) goes into the class at `start`,
 * as events, so that the events alone tell the whole run.
 */
export function newRun(version: PublishedVersion, versionId: string, settings: RunSettings): Run {
  const base = compile(version)
  const blocks: RunBlock[] = version.spec.blocks.map((block) => ({
    logged: [],
    options: stationsOf(block).map(() => AS_PLANNED),
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
    redFlag: false,
    ended: false,
    resting: null,
    blocks,
    lastLogged: null,
  }
}

function editedTimeline(
  version: PublishedVersion,
  base: Run['base'],
  edits: Run['edits'],
): Run['timeline'] {
  const segments = editedSegments(base.segments, edits)
  const blocks = blockSpans(version.spec, segments)
  return {
    lengthMs: segments.at(-1)?.endMs ?? 0,
    segments,
    marks: placeMarks(version.spec, base, segments, blocks, edits),
    pending: base.pending,
    blocks,
  }
}

function stationsOf(block: Block) {
  return block.format.type === 'rest' ? [] : block.format.stations
}

function wholeMs(value: number): number {
  return Number.isFinite(value) ? Math.floor(value) : 0
}

// ---------------------------------------------------------------------------------------------
// Where the member is

function briefLengthMs(run: Run, segment: Segment): number {
  const block = run.version.spec.blocks.find((one) => one.id === segment.block)
  return block ? briefMs(block) : 0
}

/** `place` after the class has run for `ms` more. A brief that waits for the member is never passed. */
function advance(run: Run, place: Place, ms: number): Place {
  const { segments } = run.timeline
  let { classMs, briefElapsedMs } = place
  let leftMs = Math.max(0, ms)
  for (let index = Math.max(0, place.segment); index < segments.length; index += 1) {
    const segment = segments[index]
    if (!segment) break
    if (segment.kind === 'brief') {
      const remainingMs = run.settings.waitAtBriefs
        ? Infinity
        : briefLengthMs(run, segment) - briefElapsedMs
      if (leftMs < remainingMs) {
        return { segment: index, classMs, briefElapsedMs: briefElapsedMs + leftMs }
      }
      leftMs -= Math.max(0, remainingMs)
    } else {
      const remainingMs = Math.max(0, segment.endMs - classMs)
      if (leftMs < remainingMs)
        return { segment: index, classMs: classMs + leftMs, briefElapsedMs: 0 }
      leftMs -= remainingMs
      classMs = Math.max(classMs, segment.endMs)
    }
    briefElapsedMs = 0
  }
  return { segment: segments.length, classMs, briefElapsedMs: 0 }
}

function placeAt(run: Run, now: number): Place | null {
  if (!run.clock) return null
  const standsStill = run.halted !== null || run.ended
  return standsStill
    ? run.clock.place
    : advance(run, run.clock.place, wholeMs(now) - run.clock.atMs)
}

function planOf(run: Run, blockIndex: number): BlockPlan | null {
  const block = run.version.spec.blocks[blockIndex]
  return block ? blockPlan(run.version, block, run.blocks[blockIndex]?.options) : null
}

function lowestUndone(logged: readonly { round: number }[]): number {
  let round = 1
  for (const one of logged) {
    if (one.round === round) round += 1
    else if (one.round > round) break
  }
  return round
}

function restLimits(run: Run, index: number): { leastMs: number; mostMs: number } {
  const planned = run.base.segments[index]
  const plannedMs = planned ? planned.endMs - planned.startMs : 0
  const format = run.version.spec.blocks.find((block) => block.id === planned?.block)?.format
  const isRestBlock = format?.type === 'rest'
  return {
    leastMs: isRestBlock && format.atLeast !== undefined ? format.atLeast * 1_000 : 0,
    mostMs:
      isRestBlock && format.atMost !== undefined
        ? format.atMost * 1_000
        : plannedMs + MOST_ADDED_TO_REST_MS,
  }
}

/** What is happening at `now`. */
export function positionAt(run: Run, now: number): Position {
  const place = placeAt(run, now)
  return describe(run, place)
}

function describe(run: Run, place: Place | null): Position {
  const { segments, blocks } = run.timeline
  const segment = place ? (segments[place.segment] ?? null) : null
  const isOver = place !== null && (run.ended || segment === null)
  const blockIndex = !place
    ? -1
    : segment
      ? run.version.spec.blocks.findIndex((block) => block.id === segment.block)
      : run.version.spec.blocks.length - 1
  const span = blocks[blockIndex]
  const format = run.version.spec.blocks[blockIndex]?.format
  const classMs = place?.classMs ?? 0
  const inBrief = segment?.kind === 'brief'
  const isRounds = format?.type === 'rounds' || format?.type === 'for-time'
  const plan = isRounds ? planOf(run, blockIndex) : null
  const round = plan ? lowestUndone(run.blocks[blockIndex]?.logged ?? []) : null
  const workedOff = plan !== null && round !== null && round > plan.roundLimit
  const isOwnSegment = run.resting !== null && place?.segment === run.resting.segment
  const base: Position = {
    phase: !place ? 'ready' : isOver ? 'over' : inBrief ? 'brief' : 'segment',
    halted: isOver ? null : run.halted,
    redFlag: run.redFlag,
    classMs,
    segmentIndex: place?.segment ?? -1,
    segment,
    elapsedMs: 0,
    leftMs: 0,
    briefLeftMs: null,
    blockIndex,
    bodyElapsedMs: span
      ? Math.min(Math.max(0, classMs - span.bodyStartMs), span.bodyEndMs - span.bodyStartMs)
      : 0,
    bodyLeftMs: span ? Math.max(0, span.bodyEndMs - Math.max(classMs, span.bodyStartMs)) : 0,
    round: workedOff ? plan.roundLimit : round,
    workedOff,
    restingMs: isOwnSegment && run.resting ? classMs - run.resting.sinceClassMs : null,
    rest: null,
    place: place && run.resting ? { ...place, restingSinceMs: run.resting.sinceClassMs } : place,
    owed: null,
  }
  if (!place) return base
  if (run.resting && place.segment > run.resting.segment) base.owed = { type: 'end-rest-as-needed' }
  else if (segment === null && !run.ended) base.owed = { type: 'end-class' }
  if (!segment) return base
  if (inBrief) {
    base.elapsedMs = place.briefElapsedMs
    base.briefLeftMs = run.settings.waitAtBriefs
      ? null
      : Math.max(0, briefLengthMs(run, segment) - place.briefElapsedMs)
    base.leftMs = base.briefLeftMs ?? 0
    return base
  }
  base.elapsedMs = classMs - segment.startMs
  base.leftMs = Math.max(0, segment.endMs - classMs)
  if (segment.kind === 'rest') {
    const { leastMs, mostMs } = restLimits(run, place.segment)
    base.rest = {
      mayCutInMs: Math.max(0, leastMs - base.elapsedMs),
      mayLengthenMs: Math.max(0, mostMs - (segment.endMs - segment.startMs)),
    }
  }
  return base
}

// ---------------------------------------------------------------------------------------------
// Marks

const RANK = { beep: 0, call: 1, cue: 2, next: 3 } as const

/**
 * The marks that fall due from `fromMs` up to, not including, `toMs`, on the clock of `now`, with the
 * start sound of work that a brief or 'Start class' leads straight into. Empty while halted, and never
 * before the last command: the rim asks again from the instant of a command, cancels what it had
 * scheduled and was not heard, and plays a key that was heard no second time. A rest that is
 * lengthened counts down anew, so its beeps and calls have new keys.
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

function dueMarks(run: Run, place: Place, atMs: number, fromMs: number, toMs: number): DueMark[] {
  const { segments, marks } = run.timeline
  const found: DueMark[] = []
  let clockMs = atMs
  let { classMs, briefElapsedMs } = place
  let next = marks.findIndex((mark) => mark.segmentIndex >= place.segment)
  if (next < 0) next = marks.length
  const add = (mark: DueMark) => {
    if (mark.dueAtMs >= fromMs && mark.dueAtMs < toMs) found.push(mark)
  }
  for (let index = place.segment; index < segments.length && clockMs < toMs; index += 1) {
    const segment = segments[index]
    if (!segment) break
    if (segment.kind === 'brief') {
      if (run.settings.waitAtBriefs) break
      clockMs += Math.max(0, briefLengthMs(run, segment) - briefElapsedMs)
      briefElapsedMs = 0
      continue
    }
    briefElapsedMs = 0
    const offsetMs = clockMs - classMs
    if (
      segment.kind === 'work' &&
      isLive(segment) &&
      classMs === segment.startMs &&
      comesUnannounced(segments, index)
    ) {
      add({
        atMs: classMs,
        what: 'beep',
        sound: 'start',
        key: `${index}/begin`,
        segmentIndex: index,
        dueAtMs: clockMs,
      })
    }
    for (let mark = marks[next]; mark && mark.segmentIndex <= index; mark = marks[next]) {
      next += 1
      if (mark.segmentIndex === index && mark.atMs >= classMs) {
        add({ ...mark, dueAtMs: mark.atMs + offsetMs })
      }
    }
    if (segment.kind === 'work') {
      for (const cue of run.timeline.pending) {
        if (cue.block !== segment.block) continue
        const cueMs = pendingMs(run, cue)
        if (cueMs === null || cueMs < classMs || cueMs >= segment.endMs) continue
        add({
          atMs: cueMs,
          what: 'cue',
          block: cue.block,
          id: cue.id,
          key: `cue/${cue.block}/${cue.id}`,
          segmentIndex: index,
          dueAtMs: cueMs + offsetMs,
        })
      }
    }
    clockMs += Math.max(0, segment.endMs - classMs)
    classMs = Math.max(classMs, segment.endMs)
  }
  return found.sort((a, b) => a.dueAtMs - b.dueAtMs || RANK[a.what] - RANK[b.what])
}

/** True where no end of a segment sounds the start of this one. */
function comesUnannounced(segments: readonly Segment[], index: number): boolean {
  for (let before = index - 1; before >= 0; before -= 1) {
    const segment = segments[before]
    if (segment && isLive(segment)) return segment.kind === 'brief'
  }
  return true
}

/**
 * Class time at which a pending cue falls due, or null while its round has not begun. A station inside
 * a round is where the expected pace, from the member's own start of the round, puts it; a round
 * logged before that passes the cue by.
 */
function pendingMs(run: Run, cue: PendingCue): number | null {
  const blockIndex = run.version.spec.blocks.findIndex((block) => block.id === cue.block)
  const span = run.timeline.blocks[blockIndex]
  if (!span) return null
  const startMs = roundStartMs(run, blockIndex, cue.round)
  if (startMs === null) return null
  if (cue.station === undefined || cue.station === 0) return startMs
  const plan = planOf(run, blockIndex)
  if (!plan) return null
  const offsetMs = expectedStationStartMs(plan, cue.round, cue.station, startMs - span.bodyStartMs)
  if (offsetMs === null) return null
  const nextRoundMs = roundStartMs(run, blockIndex, cue.round + 1)
  const dueMs = span.bodyStartMs + offsetMs
  return nextRoundMs !== null && dueMs >= nextRoundMs ? null : dueMs
}

function roundStartMs(run: Run, blockIndex: number, round: number): number | null {
  const span = run.timeline.blocks[blockIndex]
  const logged = run.blocks[blockIndex]?.logged ?? []
  if (!span || round > lowestUndone(logged)) return null
  let startMs = span.bodyStartMs
  for (const one of logged) if (one.round < round) startMs = Math.max(startMs, one.classMs)
  return startMs
}

// ---------------------------------------------------------------------------------------------
// Facts: live commands and stored events change a run through this one function

type AnyEvent = ClassEvent | EventDraft

function reduce(run: Run, event: AnyEvent): Run {
  switch (event.type) {
    case 'started': {
      const blocks = run.blocks.map((block) => ({ ...block, options: block.options.slice() }))
      for (const chosen of event.options) {
        const index = run.version.spec.blocks.findIndex((block) => block.id === chosen.block)
        const options = blocks[index]?.options
        if (options && chosen.station < options.length) options[chosen.station] = chosen.option
      }
      return { ...run, blocks }
    }
    case 'brief-passed': {
      const place = run.clock?.place
      const segment = place ? run.timeline.segments[place.segment] : undefined
      if (!place || segment?.kind !== 'brief' || segment.block !== event.block) return run
      return at(run, { segment: place.segment + 1, classMs: place.classMs, briefElapsedMs: 0 })
    }
    case 'round-done':
      return withLogged(run, event.block, (logged) =>
        logged.some((one) => one.round === event.round)
          ? logged
          : [...logged, { round: event.round, classMs: event.classMs }].sort(
              (a, b) => a.round - b.round,
            ),
      )
    case 'round-undone':
      return withLogged(run, event.block, (logged) =>
        logged.filter((one) => one.round !== event.round),
      )
    case 'option-chosen': {
      const index = run.version.spec.blocks.findIndex((block) => block.id === event.block)
      const block = run.blocks[index]
      if (!block || event.station >= block.options.length) return run
      const options = block.options.slice()
      options[event.station] = event.option
      return { ...run, blocks: run.blocks.with(index, { ...block, options }) }
    }
    case 'paused':
      return run.halted ? run : { ...run, halted: 'paused' }
    case 'resumed':
      return { ...run, halted: null }
    case 'stopped':
      return {
        ...run,
        halted: 'stopped',
        redFlag: run.redFlag || isRedFlag(event.sign),
      }
    case 'rest-taken':
      return { ...run, resting: null }
    case 'rest-lengthened':
    case 'rest-cut':
    case 'block-skipped':
    case 'block-finished': {
      const edits = withEdit(run.version.spec, run.base.segments, run.edits, event)
      if (edits === run.edits) return run
      const edited = { ...run, edits, timeline: editedTimeline(run.version, run.base, edits) }
      const place = run.clock?.place
      const segment = place ? run.timeline.segments[place.segment] : undefined
      const leavesBrief =
        event.type === 'block-skipped' && segment?.kind === 'brief' && segment.block === event.block
      if (!place || !leavesBrief) return edited
      const index = run.version.spec.blocks.findIndex((block) => block.id === event.block)
      const last = run.timeline.blocks[index]?.lastSegment ?? place.segment
      return at(edited, { segment: last + 1, classMs: place.classMs, briefElapsedMs: 0 })
    }
    case 'finished':
      return { ...run, ended: true, resting: null }
    default:
      return run
  }
}

function at(run: Run, place: Place): Run {
  return run.clock ? { ...run, clock: { atMs: run.clock.atMs, place } } : run
}

function withLogged(
  run: Run,
  blockId: string,
  change: (logged: RunBlock['logged']) => RunBlock['logged'],
): Run {
  const index = run.version.spec.blocks.findIndex((block) => block.id === blockId)
  const block = run.blocks[index]
  if (!block) return run
  const logged = change(block.logged)
  return logged === block.logged
    ? run
    : { ...run, blocks: run.blocks.with(index, { ...block, logged }) }
}

function isRedFlag(sign: string | undefined): boolean {
  return RED_FLAG_SIGNS.some((one) => one === sign)
}

// ---------------------------------------------------------------------------------------------
// Commands

/**
 * Carries out what the member does at `now`: the next run, the events to store and what to sound. A
 * command that makes no sense at this moment changes nothing and says why in `refused`.
 */
export function apply(run: Run, command: Command, now: number): Applied {
  const place = placeAt(run, now)
  const anchored: Run = place ? { ...run, clock: { atMs: anchorMs(run, now), place } } : run
  const step: Step = { run: anchored, events: [], effects: [] }
  const refused = carryOut(step, command, describe(run, place), wholeMs(now))
  return refused === null
    ? { ...step, refused: null }
    : { run, events: [], effects: [], refused: refused === '' ? null : refused }
}

/** While the class stands still its last dated fact stays: a resume may ask how long ago it was. */
function anchorMs(run: Run, now: number): number {
  return run.clock && (run.halted || run.ended)
    ? run.clock.atMs
    : Math.max(wholeMs(now), run.clock?.atMs ?? -Infinity)
}

function emit(step: Step, event: EventDraft): void {
  step.events.push(event)
  step.run = reduce(step.run, event)
}

/** Ends a rest as needed in progress, at the end of its segment where that is past. */
function settleRest(step: Step, classMs: number): void {
  const { resting } = step.run
  if (!resting) return
  const segment = step.run.timeline.segments[resting.segment]
  const endMs = Math.min(classMs, segment?.endMs ?? classMs)
  const ms = Math.max(0, endMs - resting.sinceClassMs)
  if (segment && ms > 0) {
    emit(step, {
      type: 'rest-taken',
      classMs: endMs,
      block: segment.block,
      segment: resting.segment,
      ms,
    })
  }
  step.run = { ...step.run, resting: null }
}

const NOT_STARTED = 'The class has not started yet.'
const IS_OVER = 'The class is over.'
const IS_PAUSED = 'The class is paused. Go on first.'
const IS_STOPPED = 'The class is stopped.'
/** Nothing to do and nothing to say. */
const NOTHING = ''

/** Changes `step`; gives the sentence of a refusal, `NOTHING` where there is nothing to do, or null. */
function carryOut(step: Step, command: Command, position: Position, now: number): string | null {
  const { run } = step
  const { classMs, segment } = position
  const blockId = run.version.spec.blocks[position.blockIndex]?.id
  if (command.type === 'start') return start(step, command, position, now)
  if (position.phase === 'ready') return NOT_STARTED
  if (position.owed) settleRest(step, classMs)

  switch (command.type) {
    case 'set-round':
      return setRound(step, command, position)
    case 'note-reps':
      return noteReps(step, command, position)
    case 'choose-option':
      return chooseOption(step, command, position)
    case 'note-load': {
      const block = run.version.spec.blocks.find((one) => one.id === command.block)
      if (!block || !stationsOf(block)[command.station]) return 'That station is not in this class.'
      if (!(command.kilograms >= 0 && command.kilograms <= 500)) {
        return 'Give the load as 0 to 500 kg.'
      }
      const { station, kilograms } = command
      emit(step, { type: 'load-noted', classMs, block: block.id, station, kilograms })
      return null
    }
    case 'hurt': {
      if (!HURT_PLACES.some((one) => one === command.where)) return 'Say where it hurts.'
      const station = segment?.station ?? (hasOneStation(run, position) ? 0 : undefined)
      emit(step, {
        type: 'hurt',
        classMs,
        ...(blockId === undefined ? {} : { block: blockId }),
        ...(station === undefined ? {} : { station }),
        where: command.where,
        ...(command.note ? { note: command.note } : {}),
      })
      return null
    }
    case 'rate': {
      if (position.phase !== 'over' && position.halted !== 'stopped') {
        return 'Rate the class once it is over.'
      }
      if (!(command.rpe >= 0 && command.rpe <= 10)) return 'Give a rating from 0 to 10.'
      emit(step, {
        type: 'rated',
        classMs,
        rpe: command.rpe,
        ...(command.note ? { note: command.note } : {}),
        ...(command.hurts ? { hurts: command.hurts } : {}),
      })
      return null
    }
    case 'end-class': {
      if (run.ended) return NOTHING
      settleRest(step, classMs)
      // A stopped class stays stopped on the board: it ends without being called finished.
      if (position.halted === 'stopped') step.run = { ...step.run, ended: true }
      else emit(step, { type: 'finished', classMs })
      return null
    }
    case 'describe-stop': {
      if (!run.halted || run.halted !== 'stopped') return 'The class is not stopped.'
      if (command.sign !== undefined && !STOP_SIGNS.some((one) => one === command.sign)) {
        return 'Choose one of the signs, or leave it out.'
      }
      emit(step, {
        type: 'stopped',
        classMs,
        ...(command.sign ? { sign: command.sign } : {}),
        ...(command.where ? { where: command.where } : {}),
        ...(command.note ? { note: command.note } : {}),
      })
      return null
    }
    case 'end-rest-as-needed': {
      if (!run.resting) return NOTHING
      settleRest(step, classMs)
      return null
    }
  }

  if (position.phase === 'over') return IS_OVER
  switch (command.type) {
    case 'stop': {
      if (position.halted === 'stopped') return NOTHING
      settleRest(step, classMs)
      emit(step, { type: 'stopped', classMs })
      return null
    }
    case 'go-on-after-stop': {
      if (position.halted !== 'stopped') return 'The class is not stopped.'
      if (run.redFlag) {
        return 'After a sign like this, going on is not offered today. Rest, and get help if it stays.'
      }
      goOnFrom(step, now)
      return null
    }
    case 'resume': {
      if (position.halted === 'stopped') return IS_STOPPED
      if (position.halted !== 'paused') return NOTHING
      if (command.from === 'where-the-clock-would-be' && run.clock) {
        const ahead = advance(run, run.clock.place, now - run.clock.atMs)
        step.run = at(step.run, ahead)
      }
      goOnFrom(step, now)
      return null
    }
  }

  if (position.halted === 'stopped') return IS_STOPPED
  if (command.type === 'pause') {
    if (position.halted) return NOTHING
    emit(step, { type: 'paused', classMs })
    return null
  }
  if (command.type === 'skip-block') return skipBlock(step, command, position)
  if (position.halted) return IS_PAUSED

  switch (command.type) {
    case 'pass-brief': {
      if (position.phase !== 'brief' || blockId === undefined) return 'There is no brief to pass.'
      emit(step, { type: 'brief-passed', classMs, block: blockId })
      return null
    }
    case 'lengthen-rest': {
      if (!position.rest || !segment) return 'Only a rest can be made longer.'
      const ms = Math.min(wholeMs(command.ms), position.rest.mayLengthenMs)
      if (position.rest.mayLengthenMs <= 0) return 'This rest is as long as it may be.'
      if (ms <= 0) return 'Say by how much the rest should be longer.'
      const at = { block: segment.block, segment: position.segmentIndex }
      emit(step, { type: 'rest-lengthened', classMs, ...at, ms })
      return null
    }
    case 'cut-rest': {
      if (!position.rest || !segment) return 'Only a rest can be cut short.'
      if (position.rest.mayCutInMs > 0) {
        return `This rest is at least ${secondsLeft(position.rest.mayCutInMs)} s more.`
      }
      const at = { block: segment.block, segment: position.segmentIndex }
      emit(step, { type: 'rest-cut', classMs, ...at, ms: position.leftMs })
      return null
    }
    case 'rest-as-needed': {
      if (segment?.kind !== 'work') return 'Rest as needed is for work; this is not work.'
      if (run.resting) return NOTHING
      step.run = {
        ...step.run,
        resting: { segment: position.segmentIndex, sinceClassMs: classMs },
      }
      return null
    }
    case 'log-round':
      return logRound(step, command, position, now)
    case 'undo-round':
      return undoRound(step, position)
    case 'finish-block':
      return finishBlock(step, position)
    default:
      return 'That cannot be done.'
  }
}

function secondsLeft(ms: number): number {
  return Math.ceil(ms / 1_000)
}

function goOnFrom(step: Step, now: number): void {
  const { clock } = step.run
  if (!clock) return
  step.run = { ...step.run, clock: { atMs: now, place: clock.place } }
  emit(step, { type: 'resumed', classMs: clock.place.classMs })
}

function start(
  step: Step,
  command: Extract<Command, { type: 'start' }>,
  position: Position,
  now: number,
): string | null {
  const { run } = step
  if (position.phase !== 'ready') return 'The class has started already.'
  for (const chosen of command.options) {
    const refused = unknownOption(run, chosen.block, chosen.station, chosen.option)
    if (refused) return refused
  }
  step.run = { ...run, clock: { atMs: now, place: { segment: 0, classMs: 0, briefElapsedMs: 0 } } }
  emit(step, {
    type: 'started',
    classMs: 0,
    version: command.versionId,
    counting: command.counting,
    options: command.options,
  })
  const ms = wholeMs(run.settings.changeExtraMs)
  if (ms > 0) {
    run.base.segments.forEach((segment, index) => {
      if (segment.kind !== 'switch' && segment.kind !== 'count-in') return
      const event: EventDraft = {
        type: 'rest-lengthened',
        classMs: 0,
        block: segment.block,
        segment: index,
        ms,
      }
      step.events.push(event)
      step.run = {
        ...step.run,
        edits: withEdit(run.version.spec, run.base.segments, step.run.edits, event),
      }
    })
    step.run = {
      ...step.run,
      timeline: editedTimeline(run.version, run.base, step.run.edits),
    }
  }
  return null
}

function skipBlock(
  step: Step,
  command: Extract<Command, { type: 'skip-block' }>,
  position: Position,
): string | null {
  const block = step.run.version.spec.blocks[position.blockIndex]
  if (!block) return 'There is no block to skip.'
  if (block.format.type === 'rest' && position.rest && position.rest.mayCutInMs > 0) {
    return `This rest is at least ${secondsLeft(position.rest.mayCutInMs)} s more.`
  }
  settleRest(step, position.classMs)
  emit(step, {
    type: 'block-skipped',
    classMs: position.classMs,
    block: block.id,
    ...(command.reason ? { reason: command.reason } : {}),
  })
  return null
}

/** The block whose rounds can be logged now, or why none can. */
function roundsNow(
  step: Step,
  position: Position,
): { block: Block; plan: BlockPlan; logged: RunBlock['logged']; isForTime: boolean } | string {
  const block = step.run.version.spec.blocks[position.blockIndex]
  const plan = planOf(step.run, position.blockIndex)
  const isRounds = block?.format.type === 'rounds' || block?.format.type === 'for-time'
  if (position.segment?.kind === 'count-in' || position.phase === 'brief') {
    return 'The work has not begun yet.'
  }
  if (!block || !plan || !isRounds || position.segment?.kind !== 'work') {
    return 'There are no rounds to count here. Rounds of an earlier block can be corrected in a rest.'
  }
  return {
    block,
    plan,
    logged: step.run.blocks[position.blockIndex]?.logged ?? [],
    isForTime: block.format.type === 'for-time',
  }
}

function logRound(
  step: Step,
  command: Extract<Command, { type: 'log-round' }>,
  position: Position,
  now: number,
): string | null {
  const here = roundsNow(step, position)
  if (typeof here === 'string') return here
  const { block, plan, logged } = here
  const { format } = block
  if (format.type === 'rounds' && format.counted === false) {
    return 'Rounds are not counted in this block. Just keep going.'
  }
  const last = step.run.lastLogged
  if (last && last.block === block.id && now - last.atMs < DOUBLE_PRESS_MS) {
    return `Round ${last.round} was logged a second ago, so this press is not counted.`
  }
  const round = lowestUndone(logged)
  if (round > plan.roundLimit) return 'All rounds of this block are done. Rest, or go on.'
  const { classMs } = position
  emit(step, { type: 'round-done', classMs, block: block.id, round, by: command.by })
  step.effects.push({ type: 'sound', sound: 'logged' })
  step.run = { ...step.run, lastLogged: { block: block.id, round, atMs: now } }
  if (here.isForTime && round === lastRound(step, position, plan)) {
    finish(step, position, block.id)
  }
  return null
}

/** The last round where, with the log as it is now, all are done; else null. */
function lastRound(step: Step, position: Position, plan: BlockPlan): number | null {
  const logged = step.run.blocks[position.blockIndex]?.logged ?? []
  return lowestUndone(logged) > plan.roundLimit ? (logged.at(-1)?.round ?? null) : null
}

function finish(step: Step, position: Position, block: string): void {
  settleRest(step, position.classMs)
  emit(step, {
    type: 'block-finished',
    classMs: position.classMs,
    block,
    ms: position.bodyElapsedMs,
  })
}

function undoRound(step: Step, position: Position): string | null {
  const here = roundsNow(step, position)
  if (typeof here === 'string') return here
  const round = here.logged.at(-1)?.round
  if (round === undefined) return 'There is no round to take back.'
  const { classMs } = position
  emit(step, { type: 'round-undone', classMs, block: here.block.id, round, by: 'member' })
  step.run = { ...step.run, lastLogged: null }
  return null
}

function finishBlock(step: Step, position: Position): string | null {
  const here = roundsNow(step, position)
  if (typeof here === 'string') return here
  const { block, plan, logged } = here
  if (!Number.isFinite(plan.roundLimit)) {
    return 'This block runs for its whole time. It can be skipped.'
  }
  const { classMs } = position
  const done = new Set(logged.map((one) => one.round))
  for (let round = 1; round <= plan.roundLimit; round += 1) {
    if (done.has(round)) continue
    emit(step, { type: 'round-done', classMs, block: block.id, round, by: 'afterwards' })
  }
  finish(step, position, block.id)
  return null
}

/** Index of a block with rounds that has begun, and its plan; or why it cannot be corrected. */
function begunRounds(
  step: Step,
  blockId: string,
  round: number,
  position: Position,
): { index: number; plan: BlockPlan } | string {
  const index = step.run.version.spec.blocks.findIndex((block) => block.id === blockId)
  const format = step.run.version.spec.blocks[index]?.format
  const plan = planOf(step.run, index)
  if (!plan || (format?.type !== 'rounds' && format?.type !== 'for-time')) {
    return 'That block has no rounds to count.'
  }
  const bodySegment = step.run.timeline.blocks[index]?.bodySegment ?? Infinity
  if (position.segmentIndex < bodySegment) return 'That block has not begun yet.'
  if (!Number.isInteger(round) || round < 1 || round > plan.roundLimit || round > 1_000_000) {
    return 'That block has no such round.'
  }
  return { index, plan }
}

function setRound(
  step: Step,
  command: Extract<Command, { type: 'set-round' }>,
  position: Position,
): string | null {
  const { block, round, done, by } = command
  const found = begunRounds(step, block, round, position)
  if (typeof found === 'string') return found
  if (position.phase === 'segment' && found.index === position.blockIndex && !position.halted) {
    return 'Log the round, or take it back, while the block runs. Corrections come in the next rest.'
  }
  const isDone = step.run.blocks[found.index]?.logged.some((one) => one.round === round) ?? false
  if (isDone === done) return NOTHING
  const { classMs } = position
  emit(step, { type: done ? 'round-done' : 'round-undone', classMs, block, round, by })
  return null
}

function noteReps(
  step: Step,
  command: Extract<Command, { type: 'note-reps' }>,
  position: Position,
): string | null {
  const { block, round, reps } = command
  const found = begunRounds(step, block, round, position)
  if (typeof found === 'string') return found
  if (step.run.blocks[found.index]?.logged.some((one) => one.round === round)) {
    return `Round ${round} is done already, so all its reps count.`
  }
  if (!Number.isInteger(reps) || reps < 0) return 'Give the reps as a whole number.'
  const planned = roundReps(found.plan, round)
  if (reps > planned) return `Round ${round} has ${planned} reps in all.`
  if (reps === planned) return `That is all of round ${round}: log the round instead.`
  emit(step, { type: 'reps-noted', classMs: position.classMs, block, round, reps })
  return null
}

function chooseOption(
  step: Step,
  command: Extract<Command, { type: 'choose-option' }>,
  position: Position,
): string | null {
  const { block, station, option, reason } = command
  const refused = unknownOption(step.run, block, station, option)
  if (refused) return refused
  const index = step.run.version.spec.blocks.findIndex((one) => one.id === block)
  if (step.run.blocks[index]?.options[station] === option) return 'That is your option already.'
  emit(step, {
    type: 'option-chosen',
    classMs: position.classMs,
    block,
    station,
    option,
    ...(reason ? { reason } : {}),
  })
  return null
}

function unknownOption(run: Run, blockId: string, station: number, option: string): string | null {
  const block = run.version.spec.blocks.find((one) => one.id === blockId)
  const found = block ? stationsOf(block)[station] : undefined
  if (!found) return 'That station is not in this class.'
  const movement = run.version.movements.find((one) => one.slug === found.movement)
  const isKnown =
    option === AS_PLANNED || optionsOf(found, movement).some((one) => one.option === option)
  return isKnown ? null : 'That option is not offered for this movement.'
}

function hasOneStation(run: Run, position: Position): boolean {
  const block = run.version.spec.blocks[position.blockIndex]
  return block !== undefined && stationsOf(block).length === 1
}

// ---------------------------------------------------------------------------------------------
// Reload

export interface Reloaded {
  run: Run
  /** To be stored: the pause of a long gap. */
  events: EventDraft[]
  /** How long the gap was where it is a pause, so that the member is asked where to go on; else null. */
  gapMs: number | null
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
  for (const event of inOrder(events)) {
    if (event.type === 'started' && !run.clock) {
      run = {
        ...run,
        clock: { atMs: lastMs, place: { segment: 0, classMs: 0, briefElapsedMs: 0 } },
      }
    }
    run = reduce(run.ended ? run : caughtUp(run, event), event)
  }
  if (!run.clock) return { run, events: [], gapMs: null }
  if (alive?.place && isAhead(alive.place, run.clock.place)) {
    const { restingSinceMs, ...place } = alive.place
    run = at(run, place)
    if (restingSinceMs !== undefined && !run.ended && run.halted !== 'stopped') {
      run = { ...run, resting: { segment: place.segment, sinceClassMs: restingSinceMs } }
    }
  }
  if (run.halted || run.ended || agoMs <= GAP_MS) return { run, events: [], gapMs: null }
  return afterGap(run, lastMs, now)
}

/**
 * A gap without a reload (sleep, a closed lid), noticed at `now` where the last sign of life was at
 * `lastAliveMs`: nothing up to `GAP_MS`, else a pause from that sign of life.
 */
export function afterGap(run: Run, lastAliveMs: number, now: number): Reloaded {
  const gapMs = wholeMs(now) - wholeMs(lastAliveMs)
  const position = positionAt(run, lastAliveMs)
  const runs = position.phase === 'brief' || position.phase === 'segment'
  if (gapMs <= GAP_MS || !runs || position.halted) return { run, events: [], gapMs: null }
  const paused = apply(run, { type: 'pause' }, lastAliveMs)
  return { run: paused.run, events: paused.events, gapMs }
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
