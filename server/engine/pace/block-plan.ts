/** What one round of a block asks for: reps, their time and the changes, by station. */
import type { Movement, MovementOption } from '../spec/movement'
import { AS_PLANNED } from '../spec/names'
import { optionsOf } from '../spec/options'
import { repsInRound, rungCount } from '../spec/reps'
import type { Block, Reps, Sides, Station, Tempo } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'

const DEFAULT_SECONDS_PER_REP = 3
const DEFAULT_CHANGE_SECONDS = 4
/** The least that a tempo with one decimal can say: keeps a forecast of any class finite. */
const LEAST_SECONDS_PER_REP = 0.1

export interface PaceDefaults {
  /** Where neither station nor movement has a tempo. Seconds a rep. */
  tempoSeconds?: number | undefined
  changeSeconds?: number | undefined
  /** Seconds a rep by `movement/option`, as a gym's results have taught; not over a station's own tempo. */
  learnt?: ReadonlyMap<string, number> | undefined
}

export interface StationPlan {
  movement: string
  /** Reps of round `round` (from 1), both sides counted where they are done in turn. */
  repsIn(round: number): number
  sides: Sides
  secondsPerRep: number
  /** To get from here to the next station. */
  changeSeconds: number
}

export interface BlockPlan {
  block: string
  /** The segment's length, or the cap. */
  seconds: number
  /** `for-time`: its rounds; a `done` ladder: its rungs; else Infinity. */
  roundLimit: number
  stations: StationPlan[]
}

/**
 * The plan of a `rounds` or `for-time` block with an option in force at each station (a slug; absent:
 * as planned). Null for every other format.
 */
export function blockPlan(
  version: PublishedVersion,
  block: Block,
  options: readonly (string | undefined)[] = [],
  defaults: PaceDefaults = {},
): BlockPlan | null {
  const { format } = block
  if (format.type !== 'rounds' && format.type !== 'for-time') return null
  const stations = format.stations.map((station, index) =>
    stationPlan(version, station, options[index], defaults),
  )
  const seconds = format.type === 'for-time' ? format.cap : format.seconds
  return { block: block.id, seconds, roundLimit: roundLimit(block) ?? Infinity, stations }
}

/**
 * How many rounds can come: those of `for-time`; in `rounds` the fewest rungs of the planned ladders
 * that end with `done`, else Infinity. Null for every other format.
 */
export function roundLimit({ format }: Pick<Block, 'format'>): number | null {
  if (format.type === 'for-time') return format.rounds
  if (format.type !== 'rounds') return null
  return Math.min(...format.stations.map((station) => endsAfter(station.reps)))
}

function endsAfter(reps: Reps): number {
  if (typeof reps === 'number' || reps.then !== 'done') return Infinity
  return rungCount(reps) ?? Infinity
}

/** One station of a block with reps, with an option in force (a slug; absent: as planned). */
export function stationPlan(
  version: PublishedVersion,
  station: Station,
  optionSlug?: string,
  defaults: PaceDefaults = {},
): StationPlan {
  const movement = version.movements.find((one) => one.slug === station.movement)
  const slug = optionSlug ?? AS_PLANNED
  const option = optionsOf(station, movement).find((one) => one.option === slug)
  // What is planned is the station's own word; the library's 'as planned' adds only its time.
  const own = slug === AS_PLANNED ? undefined : option
  const reps = own?.reps ?? station.reps
  const sides: Sides = own?.sides ?? station.sides ?? 'together'
  const factor = sides === 'each' ? 2 : 1
  return {
    movement: station.movement,
    repsIn: (round) => factor * (repsInRound(reps, round) ?? 0),
    sides,
    secondsPerRep: secondsPerRep(station, slug, option, movement, defaults),
    changeSeconds:
      station.change ??
      option?.change ??
      movement?.change ??
      defaults.changeSeconds ??
      DEFAULT_CHANGE_SECONDS,
  }
}

function tempoSeconds(tempo: Tempo | undefined): number | undefined {
  // Four figures of 0 say nothing about the time of a rep, so the next source is asked.
  const seconds = tempo ? tempo.reduce((sum, figure) => sum + figure, 0) : 0
  return seconds > 0 ? Math.round(seconds * 10) / 10 : undefined
}

function secondsPerRep(
  station: Station,
  slug: string,
  option: MovementOption | undefined,
  movement: Movement | undefined,
  defaults: PaceDefaults,
): number {
  const seconds =
    tempoSeconds(station.tempo) ??
    defaults.learnt?.get(`${station.movement}/${slug}`) ??
    tempoSeconds(option?.tempo) ??
    option?.secondsPerRep ??
    tempoSeconds(movement?.tempo) ??
    movement?.secondsPerRep ??
    defaults.tempoSeconds ??
    DEFAULT_SECONDS_PER_REP
  return Math.max(LEAST_SECONDS_PER_REP, seconds)
}

/** Reps of round `round` (from 1), over all stations. */
export function roundReps(plan: BlockPlan, round: number): number {
  return plan.stations.reduce((sum, station) => sum + station.repsIn(round), 0)
}
