/** What a member has done, folded from events. */
import type { FormatType } from '../spec/schema'
import type { CountedBy, Counting, HurtPlace, StopSign } from './events'

export interface LoggedRound {
  round: number
  /** Class time at which it was logged. */
  classMs: number
  by: CountedBy
}

export interface StationOption {
  station: number
  /** In force at the end (or now). */
  option: string
  from: 'fitted' | 'chosen' | 'coach'
  /** Every option that was in force at some time in the block, in order. */
  used: string[]
}

export interface BlockTally {
  block: string
  format: FormatType
  /** How many different rounds are done (`rounds`, `for-time`). */
  rounds: number
  /** Reps noted of the lowest unfinished round that has a note. */
  reps: number
  /** Planned reps of the rounds done plus the noted ones; an `each` station counts both sides. */
  totalReps: number
  /** The rounds done, in order of round. */
  logged: LoggedRound[]
  /**
   * Milliseconds into the body at which a `for-time` block, or a `done` ladder, was worked off; null
   * where one of its rounds was taken back later.
   */
  finishMs: number | null
  /**
   * Timed pieces (`intervals`, `every`, `holds`; each side is one): `done` ran out unskipped, `partDone`
   * ran out with a rest as needed inside and are not among the done.
   */
  pieces: { done: number; partDone: number; of: number } | null
  skipped: { reason: string | null } | null
  /** Rest beyond plan: as needed inside work, and by which rests (not count-ins or switches) were lengthened. */
  restTakenMs: number
  restLengthenedMs: number
  restCutMs: number
  options: StationOption[]
  loads: { station: number; kilograms: number }[]
  /** True where any round that counts was logged `by: afterwards`. */
  countedAfterwards: boolean
  /** True once the run has passed this block's end (or it was finished or skipped). */
  over: boolean
}

export type AttemptState = 'not-started' | 'in-class' | 'paused' | 'stopped' | 'finished'

export interface Hurt {
  where: HurtPlace
  block: string | null
  station: number | null
  note: string | null
  classMs: number
}

export interface AttemptTally {
  state: AttemptState
  counting: Counting | null
  /** Highest class time that any event carries. */
  classMs: number
  blocks: BlockTally[]
  hurts: Hurt[]
  stop: {
    sign: StopSign | null
    where: string | null
    note: string | null
    redFlag: boolean
    classMs: number
  } | null
  rating: {
    rpe: number
    note: string | null
    hurts: { where: HurtPlace; note: string | null }[]
  } | null
}
