/** What a class asks of a body. Estimates, for a coach to weigh; no measure of anybody's effort. */
import { stationPlan } from '../pace/block-plan'
import { forecast } from '../pace/forecast'
import { TIRING } from '../pace/walk'
import type { Joint, Movement } from '../spec/movement'
import { FLOOR_POSITIONS, PATTERNS } from '../spec/names'
import { repsInRound } from '../spec/reps'
import type { AnyStation, Block } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'

export type Pattern = (typeof PATTERNS)[number]

export interface PatternLoad {
  pattern: Pattern
  /** Both sides counted. */
  reps: number
  /** Of them by time: seconds of work ÷ seconds a rep. */
  estimatedReps: number
  /** Held still, both sides counted. */
  holdSeconds: number
}

export interface FloorWays {
  block: string
  /** Ways between standing (or sitting) and the floor in one round, its way back to the start among them. */
  perRound: number
  /** Seconds a round that position and kit imply for its changes; house figures, no source. */
  impliedSeconds: number
  /** Seconds a round that are planned for them. */
  plannedSeconds: number
}

export interface LoadedInARow {
  /** `grip`: something is held in the hand. */
  what: Joint | 'grip'
  /** Work blocks that follow one another, rests between them aside. */
  blocks: string[]
}

export interface ClassLoad {
  /** In the order of the trade's list; patterns without any are left out. */
  patterns: PatternLoad[]
  pushReps: number
  pullReps: number
  /** Push ÷ pull; null where one of them is nothing. */
  pushToPull: number | null
  floorWays: FloorWays[]
  inARow: LoadedInARow[]
  /** Landings: one a rep of every movement that jumps, on both feet or on one. */
  jumpContacts: number
}

/** To get down to the floor or up from it; a figure of the house, as `advise` has it. */
const FLOOR_WAY_SECONDS = 6
/** To pick up kit, or to put it down. */
const KIT_SECONDS = 2

const HELD_KIT: readonly string[] = ['dumbbell', 'kettlebell', 'band']

function isOnFloor(movement: Movement): boolean {
  return FLOOR_POSITIONS.includes(movement.position)
}

function holdsSomething(movement: Movement): boolean {
  return movement.kit.some((item) => HELD_KIT.includes(item))
}

interface StationWork {
  movement: Movement
  reps: number
  isEstimated: boolean
  holdSeconds: number
}

/** What is done at each station of a block over its whole length, as planned at the expected pace. */
function workOf(version: PublishedVersion, block: Block): StationWork[] {
  const { format } = block
  if (format.type === 'rest') return []
  const movementOf = (station: AnyStation) =>
    version.movements.find((one) => one.slug === station.movement)
  const [expected] =
    format.type === 'rounds' || format.type === 'for-time'
      ? forecast(
          { ...version, spec: { ...version.spec, blocks: [block] } },
          { tiring: TIRING.expected },
        )
      : []
  const stations: readonly AnyStation[] = format.stations
  return stations.flatMap((station, index): StationWork[] => {
    const movement = movementOf(station)
    if (!movement) return []
    const sides = station.sides === 'each' ? 2 : 1
    const done = (reps: number, isEstimated: boolean, holdSeconds = 0) => [
      { movement, reps, isEstimated, holdSeconds },
    ]
    if (format.type === 'rounds' || format.type === 'for-time') {
      return done(expected?.perStation[index] ?? 0, false)
    }
    if (format.type === 'every' && 'reps' in station) {
      let reps = 0
      for (let interval = index; interval < format.times; interval += stations.length) {
        const round = Math.floor(interval / stations.length) + 1
        reps += sides * (repsInRound(station.reps, round) ?? 0)
      }
      return done(reps, false)
    }
    if (format.type === 'intervals' && 'work' in station) {
      const { secondsPerRep } = stationPlan(version, { movement: station.movement, reps: 1 })
      return done(Math.round((format.rounds * sides * station.work) / secondsPerRep), true)
    }
    return 'seconds' in station ? done(0, false, sides * station.seconds) : []
  })
}

function floorWaysOf(version: PublishedVersion, block: Block): FloorWays | null {
  const { format } = block
  if (format.type === 'rest' || format.stations.length < 2) return null
  const isOnce =
    format.type === 'holds' ||
    (format.type === 'every' && format.times <= format.stations.length) ||
    (format.type !== 'every' && format.type !== 'rounds' && format.rounds === 1)
  const stations: readonly AnyStation[] = format.stations
  let perRound = 0
  let impliedSeconds = 0
  let plannedSeconds = 0
  stations.forEach((station, index) => {
    const isLast = index === stations.length - 1
    if (isLast && isOnce) return
    const next = stations[isLast ? 0 : index + 1]
    const from = version.movements.find((one) => one.slug === station.movement)
    const to = version.movements.find((one) => one.slug === next?.movement)
    if (!from || !to) return
    if (isOnFloor(from) !== isOnFloor(to)) {
      perRound += 1
      impliedSeconds += FLOOR_WAY_SECONDS
    }
    if (holdsSomething(from) !== holdsSomething(to)) impliedSeconds += KIT_SECONDS
    plannedSeconds +=
      'reps' in station
        ? stationPlan(version, station).changeSeconds
        : 'rest' in station
          ? (station.rest ?? 0)
          : 0
  })
  return perRound === 0 ? null : { block: block.id, perRound, impliedSeconds, plannedSeconds }
}

function inARowOf(version: PublishedVersion): LoadedInARow[] {
  const work = version.spec.blocks.filter(
    (block) => (block.kind === 'work' || block.kind === 'finisher') && block.format.type !== 'rest',
  )
  const loaded = work.map((block) => {
    const stations: readonly AnyStation[] =
      block.format.type === 'rest' ? [] : block.format.stations
    const movements = stations.flatMap(
      (station) => version.movements.find((one) => one.slug === station.movement) ?? [],
    )
    const what = new Map<LoadedInARow['what'], number>()
    const add = (one: LoadedInARow['what']) => what.set(one, (what.get(one) ?? 0) + 1)
    for (const movement of movements) {
      new Set(movement.joints).forEach(add)
      if (holdsSomething(movement)) add('grip')
    }
    // As `advise` has it: a block loads what at least half of its stations load.
    return new Set(
      [...what].flatMap(([one, count]) => (2 * count >= movements.length ? [one] : [])),
    )
  })
  const all = new Set(loaded.flatMap((one) => [...one]))
  return [...all].flatMap((what): LoadedInARow[] => {
    const runs: LoadedInARow[] = []
    let run: string[] = []
    const close = () => {
      if (run.length >= 2) runs.push({ what, blocks: run })
      run = []
    }
    work.forEach((block, index) => {
      if (loaded[index]?.has(what)) run.push(block.id)
      else close()
    })
    close()
    return runs
  })
}

/**
 * What `version` asks for, every option as planned: reps by pattern, push against pull, ways to the floor
 * and back, joints and the grip in blocks that follow one another, landings. Rounds are taken at the
 * expected pace. Movements that the version does not hold are passed over.
 */
export function classLoad(version: PublishedVersion): ClassLoad {
  const work = version.spec.blocks.flatMap((block) => workOf(version, block))
  const patterns = PATTERNS.flatMap((pattern): PatternLoad[] => {
    const own = work.filter((one) => one.movement.pattern === pattern)
    const reps = own.reduce((sum, one) => sum + one.reps, 0)
    const estimatedReps = own.reduce((sum, one) => sum + (one.isEstimated ? one.reps : 0), 0)
    const holdSeconds = own.reduce((sum, one) => sum + one.holdSeconds, 0)
    return reps + holdSeconds > 0 ? [{ pattern, reps, estimatedReps, holdSeconds }] : []
  })
  return {
    ...sums(patterns),
    floorWays: version.spec.blocks.flatMap((block) => floorWaysOf(version, block) ?? []),
    inARow: inARowOf(version),
    jumpContacts: work.reduce(
      (sum, one) => sum + (one.movement.impact === 'jump' ? one.reps : 0),
      0,
    ),
  }
}

function sums(
  patterns: PatternLoad[],
): Pick<ClassLoad, 'patterns' | 'pushReps' | 'pullReps' | 'pushToPull'> {
  const repsOf = (...wanted: Pattern[]) =>
    patterns.reduce((sum, one) => sum + (wanted.includes(one.pattern) ? one.reps : 0), 0)
  const pushReps = repsOf('horizontal-push', 'vertical-push')
  const pullReps = repsOf('horizontal-pull', 'vertical-pull')
  const pushToPull = pushReps > 0 && pullReps > 0 ? pushReps / pullReps : null
  return { patterns, pushReps, pullReps, pushToPull }
}

/** Reps by pattern, push and pull, and landings of several classes together, such as those of four weeks. */
export function sumLoads(
  loads: readonly ClassLoad[],
): Pick<ClassLoad, 'patterns' | 'pushReps' | 'pullReps' | 'pushToPull' | 'jumpContacts'> {
  const patterns = PATTERNS.flatMap((pattern): PatternLoad[] => {
    const own = loads.flatMap((load) => load.patterns.filter((one) => one.pattern === pattern))
    return own.length === 0
      ? []
      : [
          {
            pattern,
            reps: own.reduce((sum, one) => sum + one.reps, 0),
            estimatedReps: own.reduce((sum, one) => sum + one.estimatedReps, 0),
            holdSeconds: own.reduce((sum, one) => sum + one.holdSeconds, 0),
          },
        ]
  })
  return {
    ...sums(patterns),
    jumpContacts: loads.reduce((sum, load) => sum + load.jumpContacts, 0),
  }
}
