/**
 * What the player draws at a position, as plain values: which ground, which block and station, how
 * many reps, which three options. Pure; the components only set type.
 */
import type { Level, Movement, MovementOption } from '@/server/engine/spec/movement'
import { AS_PLANNED } from '@/server/engine/spec/names'
import { optionsOf } from '@/server/engine/spec/options'
import { repsInRound } from '@/server/engine/spec/reps'
import type { AnyStation, Block, Reps, Sides } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { Segment, SegmentKind, Side } from '@/server/engine/timeline/types'
import type { Position, Run } from '@/server/engine/timeline/run-types'
import type { BlockTally } from '@/server/engine/tally/types'
import type { StationKey } from '@/hooks/player/types'

export type Ground = 'hall' | 'birch'
export const SHORT_REST_MS = 15_000

const stationKey = (block: string, station: number): StationKey => `${block}/${station}`

export function stationsOf(block: Block): readonly AnyStation[] {
  return block.format.type === 'rest' ? [] : block.format.stations
}

function movementOf(version: PublishedVersion, slug: string): Movement | null {
  return version.movements.find((movement) => movement.slug === slug) ?? null
}

/** A station with the option that the member does it in. */
export interface StationView {
  key: StationKey
  block: string
  index: number
  station: AnyStation
  movement: Movement | null
  option: MovementOption | null
  options: readonly MovementOption[]
  /** The movement's name, which heads the screen whatever the option. */
  name: string
  reps: Reps | null
  sides: Sides | undefined
  note: string | null
}

export function stationView(
  version: PublishedVersion,
  block: Block,
  index: number,
  chosen: Record<StationKey, string>,
): StationView | null {
  const station = stationsOf(block)[index]
  if (!station) return null
  const movement = movementOf(version, station.movement)
  const options = movement ? optionsOf(station, movement) : []
  const key = stationKey(block.id, index)
  const wanted = chosen[key] ?? AS_PLANNED
  const option =
    options.find((each) => each.option === wanted) ??
    options.find((each) => each.level === 'as-planned') ??
    options[0] ??
    null
  return {
    key,
    block: block.id,
    index,
    station,
    movement,
    option,
    options,
    name: movement?.name ?? station.movement,
    reps: option?.reps ?? ('reps' in station ? station.reps : null),
    sides: option?.sides ?? station.sides,
    note: station.note ?? null,
  }
}

export function stationViews(
  version: PublishedVersion,
  block: Block,
  chosen: Record<StationKey, string>,
): StationView[] {
  return stationsOf(block).flatMap((_, index) => stationView(version, block, index, chosen) ?? [])
}

/** Reps that the member does of this station in this round; null where none are counted or left. */
export function repsNow(view: StationView, round: number): number | null {
  return view.reps === null ? null : repsInRound(view.reps, Math.max(1, round))
}

/** The figure of a station: the option's own where its shape differs. */
export function figureOf(view: StationView): string {
  return view.option?.figure ?? view.movement?.figure ?? view.station.movement
}

/**
 * One option per key. Of several easier (or harder) ones the one in use stands for its level, so
 * that the chosen option is always among the three.
 */
export function threeOptions(view: StationView): (MovementOption | null)[] {
  const forLevel = (level: Level) =>
    (view.option?.level === level ? view.option : null) ??
    view.options.find((option) => option.level === level) ??
    null
  return [forLevel('easier'), forLevel('as-planned'), forLevel('harder')]
}

/** Work told from rest: hall for work, birch for all else; short rests keep the hall. */
export function groundOf(
  position: Position,
  choices: { keepHallDark: boolean; repsDone: boolean },
): Ground {
  if (choices.keepHallDark) return 'hall'
  if (position.halted) return 'birch'
  const segment = position.segment
  if (position.phase !== 'segment' || !segment) return 'birch'
  if (segment.kind === 'brief') return 'birch'
  if (segment.kind === 'rest') return segmentMs(segment) < SHORT_REST_MS ? 'hall' : 'birch'
  if (segment.kind === 'work' && position.workedOff) return 'birch'
  // Reps done with less than a short rest left: the same rule, so that nothing flickers.
  if (segment.kind === 'work' && choices.repsDone) return 'birch'
  return 'hall'
}

export const segmentMs = (segment: Segment) => segment.endMs - segment.startMs

export interface NextUp {
  /** Of its segment. */
  index: number
  kind: 'work' | 'rest'
  block: Block
  blockIndex: number
  /** True where it belongs to another block than the present one. */
  otherBlock: boolean
  station: number | null
  side: Side | null
  round: number | null
}

/** The next work or rest segment, looking past briefs, count-ins and changes of side. */
export function nextUp(
  run: Run,
  position: Position,
  kinds: readonly SegmentKind[] = ['work', 'rest'],
): NextUp | null {
  const blocks = run.version.spec.blocks
  for (let index = position.segmentIndex + 1; index < run.timeline.segments.length; index += 1) {
    const segment = run.timeline.segments[index]
    if (!segment || !kinds.includes(segment.kind)) continue
    if (segment.kind !== 'work' && segment.kind !== 'rest') continue
    const blockIndex = blocks.findIndex((block) => block.id === segment.block)
    const block = blocks[blockIndex]
    if (!block) return null
    return {
      index,
      kind: segment.kind,
      block,
      blockIndex,
      otherBlock: blockIndex !== position.blockIndex,
      station: segment.station ?? null,
      side: segment.side ?? null,
      round: segment.round ?? null,
    }
  }
  return null
}

/** Is this block's score the member's own count? */
export function isCounted(block: Block): boolean {
  return (
    block.format.type === 'for-time' ||
    (block.format.type === 'rounds' && block.format.counted !== false)
  )
}

/** The last counted block that is behind the member: what a rest may ask about. */
export function blockToCorrect(
  version: PublishedVersion,
  blockIndex: number,
  tallies: readonly BlockTally[],
): { block: Block; tally: BlockTally } | null {
  for (
    let index = Math.min(blockIndex - 1, version.spec.blocks.length - 1);
    index >= 0;
    index -= 1
  ) {
    const block = version.spec.blocks[index]
    if (!block || !isCounted(block)) continue
    const tally = tallies.find((each) => each.block === block.id)
    if (!tally || tally.skipped) return null
    return { block, tally }
  }
  return null
}

/** Planned reps of a whole round, each option with its own; `each` counts both sides. */
export function repsOfRound(views: readonly StationView[], round: number): number {
  return views.reduce((sum, view) => {
    const reps = repsNow(view, round) ?? 0
    return sum + (view.sides === 'each' ? reps * 2 : reps)
  }, 0)
}

/** Widest text that a segment's clock will show, so that its figures never change size in it. */
export function clockEms(text: string): number {
  // Widths of the condensed figures in em: a digit 0.48, a colon 0.25.
  return [...text].reduce((sum, letter) => sum + (letter === ':' ? 0.25 : 0.48), 0.02)
}
