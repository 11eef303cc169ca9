/** The lead in a run: which schedule it keeps, where it is, and which rounds it owes the log. */
import { leadAt, leadSchedule, type LeadNow, type LeadSchedule } from '../pace/lead'
import { expectedStation, type PaceStart } from '../pace/walk'
import { lowestUndone, planOf } from './own-rounds'
import type { LeadAnchor, Run, RunBlock } from './run-types'

/** What sums of fractions leave behind. */
const ROUNDING_MS = 0.01

/** A block in a run keeps its schedule until anything of it changes: it is asked for twenty times a second. */
const schedules = new WeakMap<RunBlock, LeadSchedule | null>()

function scheduleOf(run: Run, blockIndex: number): LeadSchedule | null {
  const block = run.blocks[blockIndex]
  if (!block?.lead) return null
  let schedule = schedules.get(block)
  if (schedule === undefined) {
    const plan = planOf(run, blockIndex)
    schedule = plan ? leadSchedule(plan, block.lead, waitsIn(run, blockIndex)) : null
    schedules.set(block, schedule)
  }
  return schedule
}

function waitsIn(run: Run, blockIndex: number) {
  const bodyStartMs = run.timeline.blocks[blockIndex]?.bodyStartMs ?? 0
  return (run.blocks[blockIndex]?.rests ?? []).map((rest) => ({
    fromMs: rest.fromClassMs - bodyStartMs,
    toMs: rest.toClassMs - bodyStartMs,
  }))
}

/** Class time as the lead counts it: it stands still while the member rests as needed. */
function leadMs(run: Run, blockIndex: number, classMs: number): number {
  const span = run.timeline.blocks[blockIndex]
  const { resting } = run
  const isHere =
    resting !== null &&
    span !== undefined &&
    resting.segment >= span.firstSegment &&
    resting.segment <= span.lastSegment
  const heldMs = isHere ? Math.min(classMs, resting.sinceClassMs) : classMs
  return Math.min(heldMs, span?.bodyEndMs ?? heldMs) - (span?.bodyStartMs ?? 0)
}

/** What the lead of a block does at `classMs` (milliseconds of class time); null where it is not followed. */
export function leadNow(run: Run, blockIndex: number, classMs: number): LeadNow | null {
  const schedule = scheduleOf(run, blockIndex)
  if (!schedule) return null
  return leadAt(schedule, leadMs(run, blockIndex, classMs), waitsIn(run, blockIndex))
}

/** Rounds that a lead which logs has completed by `classMs` and that are not logged yet, with their instants. */
export function leadOwes(
  run: Run,
  blockIndex: number,
  classMs: number,
): { round: number; classMs: number }[] {
  const block = run.blocks[blockIndex]
  if (!block?.lead?.logs) return []
  const untilMs = leadMs(run, blockIndex, classMs)
  const bodyStartMs = run.timeline.blocks[blockIndex]?.bodyStartMs ?? 0
  const owed: { round: number; classMs: number }[] = []
  for (const { round, endMs } of scheduleOf(run, blockIndex)?.rounds ?? []) {
    if (endMs > untilMs + ROUNDING_MS) break
    if (block.logged.some((one) => one.round === round)) continue
    owed.push({ round, classMs: bodyStartMs + Math.ceil(endMs - ROUNDING_MS) })
  }
  return owed
}

/**
 * Class time at which the lead begins a round, or a station of it; null where it is not followed, was
 * joined after that place, or does not get there.
 */
export function leadStartMs(
  run: Run,
  blockIndex: number,
  round: number,
  station: number,
): number | null {
  const lead = run.blocks[blockIndex]?.lead
  const bodyStartMs = run.timeline.blocks[blockIndex]?.bodyStartMs ?? 0
  if (!lead || round < lead.round || (round === lead.round && station < lead.station)) return null
  const step = scheduleOf(run, blockIndex)?.steps.find(
    (one) => one.kind === 'rep' && one.round === round && one.station >= station,
  )
  return step && step.station === station ? bodyStartMs + Math.round(step.startMs) : null
}

/** The member's own place at `classMs`: their round, and the station that they name or the pace has reached. */
export function ownPlace(
  run: Run,
  blockIndex: number,
  classMs: number,
  station?: number,
): PaceStart {
  const block = run.blocks[blockIndex]
  const bodyStartMs = run.timeline.blocks[blockIndex]?.bodyStartMs ?? 0
  const round = lowestUndone(block?.logged ?? [])
  const bodyMs = Math.max(0, classMs - bodyStartMs)
  const plan = planOf(run, blockIndex)
  const startMs = (block?.logged ?? [])
    .filter((one) => one.round < round)
    .reduce((latest, one) => Math.max(latest, one.classMs - bodyStartMs), 0)
  const reached = plan ? expectedStation(plan, round, startMs, bodyMs) : 0
  const most = (plan?.stations.length ?? 1) - 1
  return {
    round,
    station: Math.min(most, station ?? reached),
    reps: 0,
    isChanging: false,
    atSeconds: bodyMs / 1_000,
  }
}

/** The lead's own place at `classMs`, to go on from with another plan: its present step begins where it did. */
export function leadPlace(run: Run, blockIndex: number, classMs: number): LeadAnchor | null {
  const lead = run.blocks[blockIndex]?.lead ?? null
  const schedule = scheduleOf(run, blockIndex)
  if (!lead || !schedule) return lead
  const untilMs = leadMs(run, blockIndex, classMs)
  const index = schedule.steps.findIndex((one) => one.endMs > untilMs)
  const step = schedule.steps[index]
  if (!step) return lead
  let reps = 0
  for (let before = index - 1; before >= 0; before -= 1) {
    const one = schedule.steps[before]
    if (one?.kind !== 'rep' || one.round !== step.round || one.station !== step.station) break
    reps += 1
  }
  const isFirst = step.round === lead.round && step.station === lead.station
  return {
    round: step.round,
    station: step.station,
    reps: step.kind === 'change' ? 0 : reps + (isFirst ? lead.reps : 0),
    isChanging: step.kind === 'change',
    atSeconds: step.startMs / 1_000,
    logs: lead.logs,
  }
}
