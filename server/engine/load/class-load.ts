/** What a class asks of a body. Estimates, for a coach to weigh; no measure of anybody's effort. */
import { fit, HELD_KIT, type FittedTo } from '../fit/fit'
import { blockPlan, roundLimit, stationPlan, type StationPlan } from '../pace/block-plan'
import { forecast, type ForecastInput } from '../pace/forecast'
import { FROM_THE_START, TIRING, walk } from '../pace/walk'
import type { Joint, Movement, MovementOption } from '../spec/movement'
import { AS_PLANNED, FLOOR_POSITIONS, PATTERNS } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { AnyStation, Block, Format, Station } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { AttemptTally, BlockTally } from '../tally/types'

export type Pattern = (typeof PATTERNS)[number]

/** As the forecast takes it; without it every option as planned, at the expected pace. */
export type LoadInput = Partial<ForecastInput>

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
  /** Seconds a round that are planned for them; in `every` the least that the intervals leave. */
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
  /** Blocks that have any. */
  floorWays: FloorWays[]
  /**
   * Of the whole class, from station to station as it is gone through at the expected pace, from one
   * block to the next as well; seconds as in `FloorWays`. Rests, and how one begins, are left aside.
   */
  changesInClass: { floorWays: number; impliedSeconds: number }
  inARow: LoadedInARow[]
  /** Landings: one a rep of every movement that jumps, on both feet or on one. */
  jumpContacts: number
}

/** To get down to the floor or up from it; a figure of the house, as `advise` has it. */
const FLOOR_WAY_SECONDS = 6
/** To pick up kit, or to put it down; a figure of the house. */
const KIT_SECONDS = 2

function stationsOf(format: Format): readonly AnyStation[] {
  return format.type === 'rest' ? [] : format.stations
}

/** A station of the class with what is done there. */
interface Placed {
  movement: Movement
  option: MovementOption | undefined
}

function optionAt(input: LoadInput, block: Block, index: number): string | undefined {
  const key = `${block.id}/${index}`
  return input.options && Object.hasOwn(input.options, key) ? input.options[key] : undefined
}

function placedAt(
  version: PublishedVersion,
  block: Block,
  index: number,
  input: LoadInput,
): Placed | null {
  const station = stationsOf(block.format)[index]
  const movement = version.movements.find((one) => one.slug === station?.movement)
  if (!station || !movement) return null
  const slug = optionAt(input, block, index) ?? AS_PLANNED
  return { movement, option: optionsOf(station, movement).find((one) => one.option === slug) }
}

/** An option that answers a note of the floor or of jumping leaves it out. */
const isOnFloor = ({ movement, option }: Placed): boolean =>
  FLOOR_POSITIONS.includes(movement.position) && !option?.reasons.includes('cannot-get-down')
const isJumping = ({ movement, option }: Placed): boolean =>
  movement.impact === 'jump' && !option?.reasons.includes('no-jumping')

function heldIn(movement: Movement): string[] {
  return movement.kit.filter((item) => HELD_KIT.includes(item))
}

/** Whether `one` holds a piece that `other` does not. */
function holdsMore(one: Movement, other: Movement): boolean {
  const left = heldIn(other)
  return heldIn(one).some((item) => {
    const at = left.indexOf(item)
    if (at >= 0) left.splice(at, 1)
    return at < 0
  })
}

const isFloorWay = (from: Placed, to: Placed): boolean => isOnFloor(from) !== isOnFloor(to)

/** Getting down or up, putting down what is not held any more, picking up what is new: one after another. */
function impliedSeconds(from: Placed, to: Placed): number {
  return (
    (isFloorWay(from, to) ? FLOOR_WAY_SECONDS : 0) +
    (holdsMore(from.movement, to.movement) ? KIT_SECONDS : 0) +
    (holdsMore(to.movement, from.movement) ? KIT_SECONDS : 0)
  )
}

/** The plan of any station; timed ones are planned rep by rep. */
function planOf(
  version: PublishedVersion,
  station: AnyStation,
  option: string | undefined,
  input: LoadInput,
): StationPlan {
  const counted: Station =
    'reps' in station
      ? station
      : {
          movement: station.movement,
          reps: 1,
          ...(station.options === undefined ? {} : { options: station.options }),
        }
  return stationPlan(version, counted, option, input)
}

/** Reps of station `index` over all intervals of an `every` block. */
function repsOfEvery(
  format: Extract<Format, { type: 'every' }>,
  index: number,
  plan: StationPlan,
): number {
  let reps = 0
  for (let interval = index; interval < format.times; interval += format.stations.length) {
    reps += plan.repsIn(Math.floor(interval / format.stations.length) + 1)
  }
  return reps
}

/** Seconds of work ÷ seconds a rep, to the nearest rep, both sides counted. */
function repsOfTime(
  format: Extract<Format, { type: 'intervals' }>,
  station: Extract<Format, { type: 'intervals' }>['stations'][number],
  plan: StationPlan,
): number {
  const sides = station.sides === 'each' ? 2 : 1
  return Math.round((format.rounds * sides * station.work) / plan.secondsPerRep)
}

interface StationWork extends Placed {
  reps: number
  isEstimated: boolean
  holdSeconds: number
}

/** What is done at each station of a block over its whole length. */
function workOf(version: PublishedVersion, block: Block, input: LoadInput): StationWork[] {
  const { format } = block
  const [expected] = forecast(
    { ...version, spec: { ...version.spec, blocks: [block] } },
    { tiring: TIRING.expected, ...input },
  )
  return stationsOf(format).flatMap((station, index): StationWork[] => {
    const placed = placedAt(version, block, index, input)
    if (!placed) return []
    const plan = planOf(version, station, optionAt(input, block, index), input)
    const done = (reps: number, isEstimated = false, holdSeconds = 0) => [
      { ...placed, reps, isEstimated, holdSeconds },
    ]
    if (format.type === 'every') return done(repsOfEvery(format, index, plan))
    if (format.type === 'intervals' && 'work' in station) {
      return done(repsOfTime(format, station, plan), true)
    }
    if ('seconds' in station) {
      return done(0, false, (station.sides === 'each' ? 2 : 1) * station.seconds)
    }
    return done(expected?.perStation[index] ?? 0)
  })
}

/** Stations (from 0) of a block in the order in which they are gone through, round by round. */
function pathOf(version: PublishedVersion, block: Block, input: LoadInput): number[] {
  const { format } = block
  const count = stationsOf(format).length
  if (format.type === 'every') {
    return Array.from({ length: format.times }, (_, interval) => interval % count)
  }
  if (format.type === 'intervals') {
    return Array.from({ length: format.rounds * count }, (_, piece) => piece % count)
  }
  const options = stationsOf(format).map((_, index) => optionAt(input, block, index))
  const plan = blockPlan(version, block, options, input)
  if (!plan) return Array.from({ length: count }, (_, index) => index)
  const path: number[] = []
  walk(plan, input.tiring ?? TIRING.expected, FROM_THE_START, {
    station: (_round, station) => path.push(station),
  })
  return path
}

function changesInClass(version: PublishedVersion, input: LoadInput): ClassLoad['changesInClass'] {
  const path = version.spec.blocks.flatMap((block) =>
    pathOf(version, block, input).flatMap((index): Placed[] => {
      const placed = placedAt(version, block, index, input)
      return placed ? [placed] : []
    }),
  )
  const sum = { floorWays: 0, impliedSeconds: 0 }
  path.forEach((to, index) => {
    const from = path[index - 1]
    if (!from) return
    if (isFloorWay(from, to)) sum.floorWays += 1
    sum.impliedSeconds += impliedSeconds(from, to)
  })
  return sum
}

/** Whether its stations are gone through once, so that nobody goes back to the first. */
function isOnce(block: Block): boolean {
  const { format } = block
  if (format.type === 'every') return format.times <= format.stations.length
  if (format.type === 'intervals') return format.rounds === 1
  return format.type === 'holds' || roundLimit(block) === 1
}

/** Seconds planned between station `index` and the one after it. */
function plannedChange(
  version: PublishedVersion,
  { format }: Block,
  index: number,
  plan: StationPlan,
): number {
  const station = stationsOf(format)[index]
  const isLast = index === stationsOf(format).length - 1
  if (format.type === 'every') {
    // What is left of the interval is rest; a ladder leaves less in one round than in another.
    let least = format.seconds
    for (let at = index; at < format.times - 1; at += format.stations.length) {
      const round = Math.floor(at / format.stations.length) + 1
      least = Math.min(least, format.seconds - plan.repsIn(round) * plan.secondsPerRep)
    }
    return Math.max(0, Math.round(least * 10) / 10)
  }
  if (format.type === 'intervals' && isLast && format.roundRest) return format.roundRest
  if (station && !('reps' in station)) return station.rest ?? 0
  return plan.changeSeconds
}

function floorWaysOf(version: PublishedVersion, block: Block, input: LoadInput): FloorWays | null {
  const stations =
    block.format.type === 'every'
      ? block.format.stations.slice(0, block.format.times)
      : stationsOf(block.format)
  const ways: FloorWays = { block: block.id, perRound: 0, impliedSeconds: 0, plannedSeconds: 0 }
  stations.forEach((station, index) => {
    const isLast = index === stations.length - 1
    if (isLast && isOnce(block)) return
    const from = placedAt(version, block, index, input)
    const to = placedAt(version, block, isLast ? 0 : index + 1, input)
    if (!from || !to) return
    if (isFloorWay(from, to)) ways.perRound += 1
    ways.impliedSeconds += impliedSeconds(from, to)
    const plan = planOf(version, station, optionAt(input, block, index), input)
    ways.plannedSeconds += plannedChange(version, block, index, plan)
  })
  return ways.perRound === 0 ? null : ways
}

/** What at least half of a block's stations load, as `advise` has it; nothing where it is no work. */
function loadedBy(version: PublishedVersion, block: Block): Set<LoadedInARow['what']> {
  if (block.kind !== 'work' && block.kind !== 'finisher') return new Set()
  const movements = stationsOf(block.format).flatMap(
    (station) => version.movements.find((one) => one.slug === station.movement) ?? [],
  )
  const counts = new Map<LoadedInARow['what'], number>()
  const add = (what: LoadedInARow['what']) => counts.set(what, (counts.get(what) ?? 0) + 1)
  for (const movement of movements) {
    new Set(movement.joints).forEach(add)
    if (heldIn(movement).length > 0) add('grip')
  }
  return new Set(
    [...counts].flatMap(([what, count]) => (2 * count >= movements.length ? [what] : [])),
  )
}

function inARowOf(version: PublishedVersion): LoadedInARow[] {
  // A rest between does not end a row; a block of another kind does, as in `advise`.
  const blocks = version.spec.blocks.filter((block) => block.format.type !== 'rest')
  const loaded = blocks.map((block) => loadedBy(version, block))
  const all = new Set(loaded.flatMap((one) => [...one]))
  return [...all].flatMap((what): LoadedInARow[] => {
    const runs: LoadedInARow[] = []
    let run: string[] = []
    const close = () => {
      if (run.length >= 2) runs.push({ what, blocks: run })
      run = []
    }
    blocks.forEach((block, index) => {
      if (loaded[index]?.has(what)) run.push(block.id)
      else close()
    })
    close()
    return runs
  })
}

/**
 * What `version` asks for: reps by pattern, push against pull, ways to the floor and back, joints and the
 * grip in blocks that follow one another, landings. Every option is as planned and rounds are taken at
 * the expected pace, unless `input` says otherwise. Joints are those of the movement, whatever the
 * option. Movements that the version does not hold are passed over.
 */
export function classLoad(version: PublishedVersion, input: LoadInput = {}): ClassLoad {
  const work = version.spec.blocks.flatMap((block) => workOf(version, block, input))
  const patterns = PATTERNS.flatMap((pattern): PatternLoad[] => {
    const own = work.filter((one) => one.movement.pattern === pattern)
    const reps = own.reduce((sum, one) => sum + one.reps, 0)
    const estimatedReps = own.reduce((sum, one) => sum + (one.isEstimated ? one.reps : 0), 0)
    const holdSeconds = own.reduce((sum, one) => sum + one.holdSeconds, 0)
    return reps + holdSeconds > 0 ? [{ pattern, reps, estimatedReps, holdSeconds }] : []
  })
  return {
    ...sums(patterns),
    floorWays: version.spec.blocks.flatMap((block) => floorWaysOf(version, block, input) ?? []),
    changesInClass: changesInClass(version, input),
    inARow: inARowOf(version),
    jumpContacts: work.reduce((sum, one) => sum + (isJumping(one) ? one.reps : 0), 0),
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

export interface Tonnage {
  /** Kilograms × reps over all stations of which a load was noted. */
  kilograms: number
  /**
   * True where reps had to be guessed: timed work, an `every` block of which pieces are missing, an
   * option that was changed inside the block.
   */
  isEstimated: boolean
}

/**
 * What was moved, by the loads that a member noted: the last load of a station × its reps, both sides
 * counted. Null where no load was noted. Reps of an unfinished round go to its stations in their order;
 * of `every` and timed work a piece that is part done counts half. A hold moves nothing.
 */
export function tonnage(tally: AttemptTally, version: PublishedVersion): Tonnage | null {
  const moved = tally.blocks.flatMap((done): Tonnage[] => {
    const block = version.spec.blocks.find((one) => one.id === done.block)
    return done.loads.flatMap(({ station, kilograms }): Tonnage[] => {
      if (!block || !stationsOf(block.format)[station]) return []
      const { reps, isEstimated } = repsDone(version, block, done, station)
      return [{ kilograms: kilograms * reps, isEstimated: isEstimated && reps > 0 }]
    })
  })
  if (moved.length === 0) return null
  return {
    kilograms: moved.reduce((sum, one) => sum + one.kilograms, 0),
    isEstimated: moved.some((one) => one.isEstimated),
  }
}

function repsDone(
  version: PublishedVersion,
  block: Block,
  done: BlockTally,
  index: number,
): { reps: number; isEstimated: boolean } {
  const { format } = block
  const optionOf = (station: number) => done.options.find((one) => one.station === station)
  const plans = stationsOf(format).map((station, at) =>
    planOf(version, station, optionOf(at)?.option, {}),
  )
  const plan = plans[index]
  const station = stationsOf(format)[index]
  if (!plan || !station) return { reps: 0, isEstimated: false }
  const isChanged = (optionOf(index)?.used.length ?? 0) > 1
  if (format.type === 'rounds' || format.type === 'for-time') {
    const reps = done.logged.reduce((sum, { round }) => sum + plan.repsIn(round), 0)
    return { reps: reps + repsNoted(plans, done, index), isEstimated: isChanged }
  }
  const { pieces } = done
  if (!pieces || pieces.of === 0) return { reps: 0, isEstimated: false }
  const share = (pieces.done + pieces.partDone / 2) / pieces.of
  if (format.type === 'every') {
    const reps = Math.round(repsOfEvery(format, index, plan) * share)
    return { reps, isEstimated: isChanged || pieces.done < pieces.of }
  }
  if (format.type === 'intervals' && 'work' in station) {
    return { reps: Math.round(repsOfTime(format, station, plan) * share), isEstimated: true }
  }
  return { reps: 0, isEstimated: false }
}

/** Of the noted reps of the lowest round that is not done, those of station `index`. */
function repsNoted(plans: readonly StationPlan[], done: BlockTally, index: number): number {
  const logged = new Set(done.logged.map((one) => one.round))
  let round = 1
  while (logged.has(round)) round += 1
  const before = plans.slice(0, index).reduce((sum, plan) => sum + plan.repsIn(round), 0)
  return Math.max(0, Math.min(done.reps - before, plans[index]?.repsIn(round) ?? 0))
}

/** How many members a station starts on another option than planned. */
export interface StationSwap {
  block: string
  station: number
  members: number
  of: number
}

/** Of every station, in the order of the class: how many of `members` it is fitted to otherwise than planned. */
export function swaps(version: PublishedVersion, members: readonly FittedTo[]): StationSwap[] {
  const fitted = members.map((member) => fit(version, member))
  const places = version.spec.blocks.flatMap((block) =>
    stationsOf(block.format).map((_, station) => ({ block: block.id, station })),
  )
  // `fit` gives one answer a station, in this order.
  return places.map((place, at) => ({
    ...place,
    members: fitted.filter((stations) => (stations[at]?.option ?? AS_PLANNED) !== AS_PLANNED)
      .length,
    of: members.length,
  }))
}
