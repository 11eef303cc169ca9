/** The lead: the schedule of reps that a block is planned at, for a member who wants to be counted for. */
import type { Sides } from '../spec/schema'
import type { Side } from '../timeline/types'
import type { BlockPlan } from './block-plan'
import { TIRING, walk, type EndOf, type PaceStart } from './walk'

/** Rest as needed inside the work, which the lead waited out. Milliseconds into the body. */
export interface LeadWait {
  fromMs: number
  toMs: number
}

/** One rep, or one change on the way to a station; times are milliseconds into the body, waits included. */
export interface LeadStep {
  kind: 'rep' | 'change'
  round: number
  /** From 0; of a change, the one that it leads to. */
  station: number
  /** From 1, of the present side where the sides are done in turn; 0 of a change. */
  rep: number
  /** Reps that `rep` counts up to; 0 of a change. */
  of: number
  /** The side that works; null where both do, and in a change. */
  side: Side | null
  startMs: number
  endMs: number
}

export interface LeadSchedule {
  steps: LeadStep[]
  /** Rounds that the lead completes, with the instant of their last rep. */
  rounds: { round: number; endMs: number }[]
}

/**
 * The schedule of (round, station, rep, side) from a place in a block to its end, tiring as the
 * expected forecast does (session-spec.md, The lead). A rep or change that a wait lies in takes that
 * much longer. `waits` in order, not overlapping. The last step may end after the block does.
 */
export function leadSchedule(
  plan: BlockPlan,
  from: PaceStart,
  waits: readonly LeadWait[] = [],
): LeadSchedule {
  const steps: LeadStep[] = []
  const rounds: LeadSchedule['rounds'] = []
  walk(
    plan,
    TIRING.expected,
    from,
    {
      step({ kind, round, station, rep, startSeconds, endSeconds }) {
        const at = plan.stations[station]
        steps.push({
          kind,
          round,
          station,
          ...(kind === 'rep' && at
            ? counted(at.sides, rep, at.repsIn(round))
            : { rep: 0, of: 0, side: null }),
          startMs: startSeconds * 1_000,
          endMs: endSeconds * 1_000,
        })
      },
      round: (round, endSeconds) => rounds.push({ round, endMs: endSeconds * 1_000 }),
    },
    waits.length === 0 ? undefined : waitingOut(waits),
  )
  return { steps, rounds }
}

/** Which side does rep `rep` of `all`, and how it is counted: by side where they are done in turn. */
function counted(sides: Sides, rep: number, all: number): Pick<LeadStep, 'rep' | 'of' | 'side'> {
  if (sides === 'together') return { rep, of: all, side: null }
  if (sides === 'alternate') return { rep, of: all, side: rep % 2 === 1 ? 'left' : 'right' }
  const each = all / 2
  return rep <= each
    ? { rep, of: each, side: 'left' }
    : { rep: rep - each, of: each, side: 'right' }
}

function waitingOut(waits: readonly LeadWait[]): EndOf {
  return (atSeconds, seconds) => {
    let end = atSeconds + seconds
    for (const wait of waits) {
      const from = wait.fromMs / 1_000
      const to = wait.toMs / 1_000
      if (to > atSeconds && from < end) end += to - Math.max(from, atSeconds)
    }
    return end
  }
}

/** What the lead does at an instant. */
export interface LeadNow {
  round: number
  station: number
  /** `done`: all rounds that can come are done, or the block is over. */
  state: 'rep' | 'change' | 'done'
  rep: number
  of: number
  side: Side | null
  /** Into the present rep or change without the waits, and its own length, in milliseconds. */
  elapsedMs: number
  lengthMs: number
}

/**
 * The step of `schedule` that is going on at `bodyMs` (milliseconds into the body) and how far it is.
 * Null for a schedule without any step.
 */
export function leadAt(
  { steps }: LeadSchedule,
  bodyMs: number,
  waits: readonly LeadWait[] = [],
): LeadNow | null {
  let low = 0
  let high = steps.length
  while (low < high) {
    const middle = (low + high) >> 1
    if ((steps[middle]?.endMs ?? 0) <= bodyMs) low = middle + 1
    else high = middle
  }
  const step = steps[low] ?? steps.at(-1)
  if (!step) return null
  const { round, station, rep, of, side, kind } = step
  const isDone = low >= steps.length
  const waited = (untilMs: number) =>
    waits.reduce((sum, wait) => {
      const fromMs = Math.max(wait.fromMs, step.startMs)
      const toMs = Math.min(wait.toMs, untilMs)
      return sum + Math.max(0, toMs - fromMs)
    }, 0)
  return {
    round,
    station,
    state: isDone ? 'done' : kind,
    rep,
    of,
    side,
    elapsedMs: Math.round(
      Math.max(0, Math.min(bodyMs, step.endMs) - step.startMs - waited(bodyMs)),
    ),
    lengthMs: Math.round(step.endMs - step.startMs - waited(step.endMs)),
  }
}
