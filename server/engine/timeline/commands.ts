/** What each command does at a position, or why it does nothing. */
import { roundLimit, roundReps, type BlockPlan } from '../pace/block-plan'
import { AS_PLANNED } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { Block } from '../spec/schema'
import { HURT_PLACES, STOP_SIGNS } from '../tally/names'
import { withEdit } from './edits'
import { at, editedTimeline, reduce } from './facts'
import { leadOwes, ownPlace } from './lead-run'
import { lowestUndone, planOf } from './own-rounds'
import { advance, stationsOf, wholeMs } from './place'
import type { Command, Effect, EventDraft, Position, Run, RunBlock } from './run-types'

/** A second press within this time is one press. */
const DOUBLE_PRESS_MS = 1_500

// What the schema of events takes: a long text is cut rather than a whole event lost at the door.
const MOST_NOTE = 1_000
const MOST_REASON = 200
const MOST_WHERE = 60
const MOST_HURTS = 20

function noted(note: string | undefined): { note?: string } {
  return note ? { note: note.slice(0, MOST_NOTE) } : {}
}

/** A run in the middle of a command. */
export interface Step {
  run: Run
  events: EventDraft[]
  effects: Effect[]
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

/** Logs the rounds that a followed lead has completed, each at its own instant; true where there were any. */
export function logLeadRounds(step: Step, position: Position, now: number): boolean {
  if (step.run.ended) return false
  let isAny = false
  step.run.version.spec.blocks.forEach((block, index) => {
    if (index > position.blockIndex) return
    for (const { round, classMs } of leadOwes(step.run, index, position.classMs)) {
      isAny = true
      emit(step, { type: 'round-done', classMs, block: block.id, round, by: 'lead' })
      step.effects = [{ type: 'sound', sound: 'logged' }]
      step.run = { ...step.run, lastLogged: { block: block.id, round, atMs: now } }
      const isLast = lastRound(step, index) === round
      if (!isLast || block.format.type !== 'for-time') continue
      const bodyStartMs = step.run.timeline.blocks[index]?.bodyStartMs ?? 0
      finish(step, classMs, classMs - bodyStartMs, block.id)
    }
  })
  return isAny
}

const NOT_STARTED = 'The class has not started yet.'
const IS_OVER = 'The class is over.'
const IS_PAUSED = 'The class is paused. Go on first.'
const IS_STOPPED = 'The class is stopped.'
/** Nothing to do and nothing to say. */
export const NOTHING = ''

/** Changes `step`; gives the sentence of a refusal, `NOTHING` where there is nothing to do, or null. */
export function carryOut(
  step: Step,
  command: Command,
  position: Position,
  now: number,
): string | null {
  const { run } = step
  const { classMs, segment } = position
  const blockId = run.version.spec.blocks[position.blockIndex]?.id
  if (command.type === 'start') return start(step, command, position, now)
  if (position.phase === 'ready') return NOT_STARTED
  if (position.owed) settleRest(step, classMs)

  switch (command.type) {
    case 'log-lead-rounds':
      return step.events.length > 0 ? null : NOTHING
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
      // After class the place in it says nothing about where it began to hurt.
      const inClass = position.phase !== 'over'
      const station = segment?.station ?? (hasOneStation(run, position) ? 0 : undefined)
      emit(step, {
        type: 'hurt',
        classMs,
        ...(blockId === undefined || !inClass ? {} : { block: blockId }),
        ...(station === undefined || !inClass ? {} : { station }),
        where: command.where,
        ...noted(command.note),
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
        ...noted(command.note),
        ...(command.hurts
          ? {
              hurts: command.hurts
                .filter((hurt) => HURT_PLACES.some((place) => place === hurt.where))
                .slice(0, MOST_HURTS)
                .map((hurt) => ({ where: hurt.where, ...noted(hurt.note) })),
            }
          : {}),
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
        ...(command.where ? { where: command.where.slice(0, MOST_WHERE) } : {}),
        ...noted(command.note),
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
    case 'follow-lead': {
      const here = roundsNow(step, position)
      if (typeof here === 'string') return 'The lead counts rounds, and here are none to count.'
      if (position.workedOff) return 'All rounds of this block are done. Rest, or go on.'
      if (position.lead) return NOTHING
      const { format } = here.block
      const logs = command.logs && (format.type !== 'rounds' || format.counted !== false)
      emit(step, { type: 'lead-followed', classMs, block: here.block.id })
      const own = ownPlace(step.run, position.blockIndex, classMs, command.station)
      const block = step.run.blocks[position.blockIndex]
      if (block) {
        const led = { ...block, lead: { ...own, logs } }
        step.run = { ...step.run, blocks: step.run.blocks.with(position.blockIndex, led) }
      }
      return null
    }
    case 'leave-lead': {
      if (!position.lead || blockId === undefined) return NOTHING
      emit(step, { type: 'lead-left', classMs, block: blockId })
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
    ...(command.reason ? { reason: command.reason.slice(0, MOST_REASON) } : {}),
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
  if (here.isForTime && round === lastRound(step, position.blockIndex)) {
    finish(step, classMs, position.bodyElapsedMs, block.id)
  }
  return null
}

/** The last round where, with the log as it is now, all are done; else null. */
function lastRound({ run }: Step, blockIndex: number): number | null {
  const block = run.version.spec.blocks[blockIndex]
  const logged = run.blocks[blockIndex]?.logged ?? []
  const limit = (block && roundLimit(block)) ?? Infinity
  return lowestUndone(logged) > limit ? (logged.at(-1)?.round ?? null) : null
}

/** `ms`: into the body. */
function finish(step: Step, classMs: number, ms: number, block: string): void {
  settleRest(step, classMs)
  emit(step, { type: 'block-finished', classMs, block, ms })
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
  finish(step, classMs, position.bodyElapsedMs, block.id)
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
