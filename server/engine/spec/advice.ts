/** What a coach should be told about a sound class. Hints, never a gate. */
import { stationPlan } from '../pace/block-plan'
import { bodySeconds, briefMs, compile, countInSeconds, isRestBlock } from '../timeline/compile'
import { isMembersOwnPace } from '../timeline/marks'
import { speak, utterancesOf } from '../timeline/speech'
import type { Segment } from '../timeline/types'
import type { Joint, Movement } from './movement'
import type { AnyStation, Block, Format } from './schema'
import type { PublishedVersion } from './version'

export interface Advice {
  kind: 'speech' | 'load' | 'room' | 'warm-up'
  /** As a problem's: such as `blocks[1].cues[0]`. */
  path: string
  message: string
}

/** Blocks in a row that load one joint before it is said. */
const MANY_BLOCKS = 3
/** Seconds to get up from the floor with a dumbbell put down; a rule of the house, no measured figure. */
const GETTING_UP_SECONDS = 6

function stationsOf(format: Format): readonly AnyStation[] {
  return format.type === 'rest' ? [] : format.stations
}

function isWork(block: Block): boolean {
  return block.kind === 'work' || block.kind === 'finisher'
}

/**
 * What a coach should be told about `version`: work without a warm-up before it; a spoken cue that finds
 * no time to be said or is cut short; a joint that three blocks in a row load; too little time to get
 * from the floor to standing. In this order, each kind in the order of the class. Empty where there is nothing to say. Takes
 * a class that `check` finds sound; a movement that the version does not hold is passed over.
 */
export function advise(version: PublishedVersion): Advice[] {
  const movements = new Map(version.movements.map((one) => [one.slug, one]))
  return [
    ...adviseWarmUp(version),
    ...adviseSpeech(version),
    ...adviseLoad(version, movements),
    ...adviseRoom(version, movements),
  ]
}

function adviseWarmUp({ spec }: PublishedVersion): Advice[] {
  const firstWork = spec.blocks.findIndex(isWork)
  if (firstWork < 0 || spec.blocks.slice(0, firstWork).some((one) => one.kind === 'warm-up')) {
    return []
  }
  return [
    {
      kind: 'warm-up',
      path: `blocks[${firstWork}]`,
      message: 'The work begins without a warm-up. Put a warm-up block before it.',
    },
  ]
}

function adviseSpeech(version: PublishedVersion): Advice[] {
  return speak(utterancesOf(version, compile(version))).flatMap((one): Advice[] => {
    if (!one.cue || (one.isSaid && !one.isCut)) return []
    const { block: blockId, id } = one.cue
    const block = version.spec.blocks.findIndex((candidate) => candidate.id === blockId)
    const cue = version.spec.blocks[block]?.cues?.findIndex((candidate) => candidate.id === id)
    const message = one.isSaid
      ? 'A safety cue cuts this one short. Move it, or make it shorter.'
      : 'Something else is being said until 5 seconds after this cue is due, so it is only shown. Move it, or shorten what comes before.'
    return [{ kind: 'speech', path: `blocks[${block}].cues[${cue ?? 0}]`, message }]
  })
}

/** Joints that at least half of a block's stations load, by the library. */
function loadedJoints(block: Block, movements: ReadonlyMap<string, Movement>): Set<Joint> {
  const stations = stationsOf(block.format)
  const counts = new Map<Joint, number>()
  for (const station of stations) {
    for (const joint of movements.get(station.movement)?.joints ?? []) {
      counts.set(joint, (counts.get(joint) ?? 0) + 1)
    }
  }
  return new Set(
    [...counts].flatMap(([joint, count]) => (count * 2 >= stations.length ? [joint] : [])),
  )
}

/** Each run of blocks is told once, at the block that makes it three. A rest does not end a run. */
function adviseLoad(
  { spec }: PublishedVersion,
  movements: ReadonlyMap<string, Movement>,
): Advice[] {
  let running = new Map<Joint, number>()
  return spec.blocks.flatMap((block, index): Advice[] => {
    if (block.format.type === 'rest') return []
    const loaded = isWork(block) ? loadedJoints(block, movements) : new Set<Joint>()
    running = new Map([...loaded].map((joint) => [joint, (running.get(joint) ?? 0) + 1]))
    return [...running].flatMap(([joint, count]): Advice[] =>
      count === MANY_BLOCKS
        ? [
            {
              kind: 'load',
              path: `blocks[${index}]`,
              message: `This is the third block in a row that loads the ${joint.replaceAll('-', ' ')}. Put something else between, or change a movement.`,
            },
          ]
        : [],
    )
  })
}

function needsGettingUp(from: Movement | undefined, to: Movement | undefined): boolean {
  // Seated may be on a chair, from which nobody has to get up off the floor.
  const isOnFloor = from && from.position !== 'standing' && from.position !== 'seated'
  return isOnFloor === true && to?.position === 'standing'
}

function adviseRoom(version: PublishedVersion, movements: ReadonlyMap<string, Movement>): Advice[] {
  const timeline = compile(version)
  const { blocks } = version.spec
  return blocks.flatMap((block, index) => [
    ...adviseRoomBefore(blocks, index, movements),
    ...adviseRoomInside(version, block, timeline.segments, movements).map((station): Advice => ({
      kind: 'room',
      path: `blocks[${index}].format.stations[${station}]`,
      message: `What follows is done standing, and there are less than ${GETTING_UP_SECONDS} seconds to get up from the floor. Give more time after this station.`,
    })),
  ])
}

/** From the end of the block that was worked before; rests, briefs and the count-in are time to get up. */
function adviseRoomBefore(
  blocks: readonly Block[],
  index: number,
  movements: ReadonlyMap<string, Movement>,
): Advice[] {
  const block = blocks[index]
  const first = block && stationsOf(block.format)[0]
  const before = blocks.slice(0, index).findLastIndex((one) => one.format.type !== 'rest')
  const worked = blocks[before]
  if (!first || !worked) return []
  const between = blocks.slice(before + 1, index)
  const isAfterRest = isRestBlock(blocks[index - 1] ?? worked)
  const seconds =
    between.reduce((sum, one) => sum + briefMs(one) / 1_000 + bodySeconds(one.format), 0) +
    briefMs(block) / 1_000 +
    countInSeconds(block, isAfterRest)
  // In rounds of their own members end wherever they are; else at the last station.
  const stations = stationsOf(worked.format)
  const ends = isMembersOwnPace(worked) ? stations : stations.slice(-1)
  const to = movements.get(first.movement)
  const isShort =
    seconds < GETTING_UP_SECONDS &&
    ends.some((station) => needsGettingUp(movements.get(station.movement), to))
  if (!isShort) return []
  return [
    {
      kind: 'room',
      path: `blocks[${index}]`,
      message: `This block begins standing, less than ${GETTING_UP_SECONDS} seconds after work on the floor. Put a rest, a brief or a longer count-in before it.`,
    },
  ]
}

/** Stations after which there is too little time to get up for the next one of the block. */
function adviseRoomInside(
  version: PublishedVersion,
  { id, format }: Block,
  segments: readonly Segment[],
  movements: ReadonlyMap<string, Movement>,
): number[] {
  if (format.type === 'rest') return []
  const movementOf = (station: number | undefined) =>
    movements.get(format.stations[station ?? 0]?.movement ?? '')
  const short = new Set<number>()
  if (format.type === 'rounds' || format.type === 'for-time') {
    format.stations.forEach((station, index) => {
      const isLast = index === format.stations.length - 1
      if (isLast && format.type === 'for-time' && format.rounds === 1) return
      const { changeSeconds } = stationPlan(version, station)
      const following = isLast ? 0 : index + 1
      const isShort = changeSeconds < GETTING_UP_SECONDS
      if (isShort && needsGettingUp(movementOf(index), movementOf(following))) short.add(index)
    })
    return [...short]
  }
  const work = segments.filter((one) => one.block === id && one.kind === 'work')
  work.forEach((segment, index) => {
    const { round = 1, station: from = 0 } = segment
    const following = work[index + 1]
    if (!following || !needsGettingUp(movementOf(from), movementOf(following.station))) return
    let seconds = (following.startMs - segment.endMs) / 1_000
    const station = format.type === 'every' ? format.stations[from] : undefined
    if (format.type === 'every' && station) {
      // What is left of the interval is rest.
      const { repsIn, secondsPerRep } = stationPlan(version, station)
      seconds = format.seconds - repsIn(round) * secondsPerRep
    }
    if (seconds < GETTING_UP_SECONDS) short.add(from)
  })
  return [...short].sort((a, b) => a - b)
}
