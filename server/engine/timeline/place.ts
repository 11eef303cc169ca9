/** Where a member is in a class: the place at an instant, and what it means. */
import { roundLimit } from '../pace/block-plan'
import type { Block } from '../spec/schema'
import { briefMs } from './compile'
import { leadNow, leadOwes } from './lead-run'
import { lowestUndone } from './own-rounds'
import type { Place, Position, Run } from './run-types'
import type { Segment } from './types'

/** How far a rest may be lengthened where the coach gave no `atMost`. */
const MOST_ADDED_TO_REST_MS = 300_000

export function stationsOf(block: Block) {
  return block.format.type === 'rest' ? [] : block.format.stations
}

export function wholeMs(value: number): number {
  return Number.isFinite(value) ? Math.floor(value) : 0
}

export function briefLengthMs(run: Run, segment: Segment): number {
  const block = run.version.spec.blocks.find((one) => one.id === segment.block)
  return block ? briefMs(block) : 0
}

/** `place` after the class has run for `ms` more. A brief that waits for the member is never passed. */
export function advance(run: Run, place: Place, ms: number): Place {
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

export function placeAt(run: Run, now: number): Place | null {
  if (!run.clock) return null
  const standsStill = run.halted !== null || run.ended
  return standsStill
    ? run.clock.place
    : advance(run, run.clock.place, wholeMs(now) - run.clock.atMs)
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

export function describe(run: Run, place: Place | null): Position {
  const { segments, blocks } = run.timeline
  const segment = place ? (segments[place.segment] ?? null) : null
  const isOver = place !== null && (run.ended || segment === null)
  const blockIndex = !place
    ? -1
    : segment
      ? run.version.spec.blocks.findIndex((block) => block.id === segment.block)
      : run.version.spec.blocks.length - 1
  const span = blocks[blockIndex]
  const block = run.version.spec.blocks[blockIndex]
  const limit = block ? roundLimit(block) : null
  const undone = lowestUndone(run.blocks[blockIndex]?.logged ?? [])
  const workedOff = limit !== null && undone > limit
  const classMs = place?.classMs ?? 0
  const inBrief = segment?.kind === 'brief'
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
    round: limit === null ? null : Math.min(undone, limit),
    workedOff,
    restingMs: isOwnSegment && run.resting ? classMs - run.resting.sinceClassMs : null,
    rest: null,
    lead: null,
    place: place && keptPlace(run, place, blockIndex),
    owed: null,
  }
  if (!place) return base
  if (run.resting && place.segment > run.resting.segment) base.owed = { type: 'end-rest-as-needed' }
  else if (owesRounds(run, blockIndex, classMs)) base.owed = { type: 'log-lead-rounds' }
  else if (segment === null && !run.ended) base.owed = { type: 'end-class' }
  if (!segment || isOver) return base
  if (inBrief) {
    base.elapsedMs = place.briefElapsedMs
    base.briefLeftMs = run.settings.waitAtBriefs
      ? null
      : Math.max(0, briefLengthMs(run, segment) - place.briefElapsedMs)
    base.leftMs = base.briefLeftMs ?? 0
    return base
  }
  if (segment.kind === 'work') {
    const now = leadNow(run, blockIndex, classMs)
    const logs = run.blocks[blockIndex]?.lead?.logs ?? false
    base.lead = now && { ...now, logs, isWaiting: base.restingMs !== null }
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

/** The place with what only the run knows of it, so that a reload goes on from the same. */
function keptPlace(run: Run, place: Place, blockIndex: number): Place {
  const lead = run.blocks[blockIndex]?.lead
  return {
    ...place,
    ...(run.resting ? { restingSinceMs: run.resting.sinceClassMs } : {}),
    ...(lead ? { lead } : {}),
  }
}

function owesRounds(run: Run, blockIndex: number, classMs: number): boolean {
  if (run.ended) return false
  for (let index = 0; index <= blockIndex; index += 1) {
    if (leadOwes(run, index, classMs).length > 0) return true
  }
  return false
}
