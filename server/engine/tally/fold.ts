/** Events into a tally: pure, the same for any order of arrival and any number of duplicates. */
import { isRedFlag } from '../fit/stop-signs'
import { blockPlan, roundLimit, roundReps, type BlockPlan } from '../pace/block-plan'
import { AS_PLANNED } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { Block } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import { segmentsOf } from '../timeline/compile'
import { blockSpans, edit, editedSegments, type Edits } from '../timeline/edits'
import type { BlockSpan } from '../timeline/run-types'
import type { Segment } from '../timeline/types'
import type { ClassEvent, CountedBy, EventOf, StopSign } from './events'
import { inOrder } from './order'
import type { AttemptState, AttemptTally, BlockTally, StationOption } from './types'

const MOST_ROUNDS = 1_000_000

interface FoldOptions {
  /** Reckon every round as planned, whatever options were in force. */
  asPlanned?: boolean
}

interface FoldedRound {
  classMs: number
  by: CountedBy
  reps: number
}

interface FoldedStation {
  known: Set<string>
  /** Options in the order in which they came into force, the one before class first. */
  changes: { option: string; from: StationOption['from']; classMs: number }[]
}

interface FoldedBlock {
  block: Block
  stations: FoldedStation[]
  /** How many rounds can come; null where the block has none. */
  roundLimit: number | null
  /** With the options in force; made anew at need after one was chosen. */
  plan: BlockPlan | null
  done: Map<number, FoldedRound>
  notes: Map<number, number>
  finishMs: number | null
  /** Rounds taken back since the finish: while any is, there was no finish. */
  undoneSinceFinish: Set<number>
  skipped: BlockTally['skipped']
  restedSegments: Set<number>
  restTakenMs: number
  restLengthenedMs: number
  restCutMs: number
  loads: Map<number, number>
}

interface Folding {
  version: PublishedVersion
  options: FoldOptions
  base: readonly Segment[]
  edits: Edits
  blocks: FoldedBlock[]
  byId: Map<string, FoldedBlock>
  tally: Pick<AttemptTally, 'counting' | 'classMs' | 'hurts' | 'stop' | 'rating'>
  state: AttemptState
  /** Stretches of class time that the clock jumped over while the member was away. */
  jumps: { fromMs: number; toMs: number }[]
  pausedMs: number | null
}

/**
 * What a member has done, from the events of one attempt. Events of unknown type, and rounds, blocks,
 * stations and options that cannot come in this version, change nothing; it never throws.
 */
export function fold(
  version: PublishedVersion,
  events: readonly ClassEvent[],
  options: FoldOptions = {},
): AttemptTally {
  const blocks = version.spec.blocks.map((block) => emptyBlock(version, block))
  const folding: Folding = {
    version,
    options,
    base: segmentsOf(version.spec),
    edits: [],
    blocks,
    byId: new Map(blocks.map((one) => [one.block.id, one])),
    tally: { counting: null, classMs: 0, hurts: [], stop: null, rating: null },
    state: 'not-started',
    jumps: [],
    pausedMs: null,
  }
  for (const event of inOrder(events)) foldEvent(folding, event)

  const segments = editedSegments(folding.base, folding.edits)
  const spans = blockSpans(version.spec, segments)
  const reachedMs = Math.min(folding.tally.classMs, segments.at(-1)?.endMs ?? 0)
  return {
    state: folding.state,
    ...folding.tally,
    blocks: blocks.map((block, index) =>
      blockTally(folding, block, segments, spans[index], reachedMs),
    ),
  }
}

function emptyBlock(version: PublishedVersion, block: Block): FoldedBlock {
  const stations = block.format.type === 'rest' ? [] : block.format.stations
  return {
    block,
    stations: stations.map((station) => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      return {
        known: new Set([
          AS_PLANNED,
          ...optionsOf(station, movement).map((option) => option.option),
        ]),
        changes: [{ option: AS_PLANNED, from: 'coach', classMs: 0 }],
      }
    }),
    roundLimit: roundLimit(block),
    plan: null,
    done: new Map(),
    notes: new Map(),
    finishMs: null,
    undoneSinceFinish: new Set(),
    skipped: null,
    restedSegments: new Set(),
    restTakenMs: 0,
    restLengthenedMs: 0,
    restCutMs: 0,
    loads: new Map(),
  }
}

function usableMs(value: number): number {
  return Number.isFinite(value) && value > 0 ? value : 0
}

function canCome(block: FoldedBlock, round: number): boolean {
  if (block.roundLimit === null || !Number.isInteger(round) || round < 1) return false
  return round <= Math.min(block.roundLimit, MOST_ROUNDS)
}

/** Planned reps of a round with the options in force. */
function repsOf({ version, options }: Folding, block: FoldedBlock, round: number): number {
  block.plan ??= blockPlan(
    version,
    block.block,
    options.asPlanned ? [] : block.stations.map((one) => one.changes.at(-1)?.option),
  )
  return block.plan ? roundReps(block.plan, round) : 0
}

function foldEvent(folding: Folding, event: ClassEvent): void {
  const { tally } = folding
  const classMs = usableMs(event.classMs)
  const block =
    'block' in event && event.block !== undefined ? folding.byId.get(event.block) : undefined
  if (folding.state === 'not-started') folding.state = 'in-class'
  tally.classMs = Math.max(tally.classMs, classMs)
  switch (event.type) {
    case 'started':
      foldStart(folding, event)
      return
    case 'round-done':
      if (!block || !canCome(block, event.round)) return
      block.undoneSinceFinish.delete(event.round)
      if (block.done.has(event.round)) return
      block.done.set(event.round, {
        classMs,
        by: event.by,
        reps: repsOf(folding, block, event.round),
      })
      return
    case 'round-undone':
      if (!block || !canCome(block, event.round)) return
      block.done.delete(event.round)
      if (block.finishMs !== null) block.undoneSinceFinish.add(event.round)
      return
    case 'reps-noted':
      if (!block || !canCome(block, event.round)) return
      if (Number.isFinite(event.reps) && event.reps >= 0) block.notes.set(event.round, event.reps)
      return
    case 'block-finished':
      foldFinish(folding, block, event)
      return
    case 'block-skipped':
      if (!block) return
      if (edit(folding.version.spec, folding.base, folding.edits, event)) {
        block.skipped = { reason: event.reason ?? null }
      }
      return
    case 'option-chosen':
      if (block) chooseOption(block, event.station, event.option, 'chosen', classMs)
      return
    case 'load-noted':
      if (block?.stations[event.station] && Number.isFinite(event.kilograms)) {
        block.loads.set(event.station, event.kilograms)
      }
      return
    case 'rest-taken': {
      const segment = folding.base[event.segment]
      if (!block || segment?.kind !== 'work' || segment.block !== event.block) return
      const ms = usableMs(event.ms)
      block.restTakenMs += ms
      if (ms > 0) block.restedSegments.add(event.segment)
      return
    }
    case 'rest-lengthened':
    case 'rest-cut': {
      const { base, edits, version } = folding
      if (!block || !edit(version.spec, base, edits, event)) return
      if (base[event.segment]?.kind !== 'rest') return
      if (event.type === 'rest-lengthened') block.restLengthenedMs += event.ms
      else block.restCutMs += event.ms
      return
    }
    case 'hurt':
      tally.hurts.push({
        where: event.where,
        block: event.block ?? null,
        station: event.station ?? null,
        note: event.note ?? null,
        classMs,
      })
      return
    case 'rated':
      tally.rating = {
        rpe: event.rpe,
        note: event.note ?? null,
        hurts: (event.hurts ?? []).map((hurt) => ({ where: hurt.where, note: hurt.note ?? null })),
      }
      return
    case 'paused':
    case 'resumed':
    case 'stopped':
    case 'finished':
      foldState(folding, event, classMs)
      return
    default:
      return
  }
}

function foldStart(folding: Folding, event: EventOf<'started'>): void {
  if (folding.tally.counting !== null) return
  folding.tally.counting = event.counting
  if (!Array.isArray(event.options)) return
  for (const chosen of event.options) {
    const block = folding.byId.get(chosen.block)
    if (block) chooseOption(block, chosen.station, chosen.option, chosen.from, 0)
  }
}

function chooseOption(
  block: FoldedBlock,
  stationIndex: number,
  option: string,
  from: StationOption['from'],
  classMs: number,
): void {
  const station = block.stations[stationIndex]
  if (!station?.known.has(option)) return
  station.changes.push({ option, from, classMs })
  block.plan = null
}

function foldFinish(
  folding: Folding,
  block: FoldedBlock | undefined,
  event: EventOf<'block-finished'>,
): void {
  if (!block || block.finishMs !== null || !Number.isFinite(block.roundLimit ?? Infinity)) return
  const { format } = block.block
  const seconds =
    format.type === 'for-time' ? format.cap : format.type === 'rounds' ? format.seconds : 0
  if (!(event.ms >= 0 && event.ms <= seconds * 1_000)) return
  block.finishMs = event.ms
  edit(folding.version.spec, folding.base, folding.edits, event)
}

/**
 * A stop outweighs a finish, so that the board keeps showing it; going on lifts it, save after a red
 * flag. A finished class is neither paused nor gone on with.
 */
function foldState(
  folding: Folding,
  event: EventOf<'paused'> | EventOf<'resumed'> | EventOf<'stopped'> | EventOf<'finished'>,
  classMs: number,
): void {
  const { tally } = folding
  if (event.type === 'stopped') {
    // Within one stop a later event adds to what was said; after going on a stop is a new one.
    const before = folding.state === 'stopped' ? tally.stop : null
    const sign: StopSign | null = event.sign ?? before?.sign ?? null
    tally.stop = {
      sign,
      where: event.where ?? before?.where ?? null,
      note: event.note ?? before?.note ?? null,
      redFlag: (tally.stop?.redFlag ?? false) || isRedFlag(sign),
      classMs: before?.classMs ?? classMs,
    }
    folding.state = 'stopped'
    return
  }
  if (event.type === 'finished') {
    if (folding.state !== 'stopped') folding.state = 'finished'
    return
  }
  if (event.type === 'paused') {
    if (folding.state !== 'in-class') return
    folding.state = 'paused'
    folding.pausedMs = classMs
    return
  }
  if (folding.pausedMs !== null && classMs > folding.pausedMs) {
    folding.jumps.push({ fromMs: folding.pausedMs, toMs: classMs })
  }
  folding.pausedMs = null
  const mayGoOn = folding.state === 'stopped' ? !tally.stop?.redFlag : folding.state === 'paused'
  if (mayGoOn) folding.state = 'in-class'
}

function blockTally(
  folding: Folding,
  folded: FoldedBlock,
  segments: readonly Segment[],
  span: BlockSpan | undefined,
  reachedMs: number,
): BlockTally {
  const { block, done } = folded
  const logged = [...done]
    .sort(([a], [b]) => a - b)
    .map(([round, { classMs, by }]) => ({ round, classMs, by }))
  const reps = notedReps(folded)
  let totalReps = reps
  for (const round of done.values()) totalReps += round.reps
  const isVoid = [...folded.undoneSinceFinish].some((round) => !done.has(round))
  const finishMs = isVoid ? null : folded.finishMs
  return {
    block: block.id,
    format: block.format.type,
    rounds: done.size,
    reps,
    totalReps,
    logged,
    finishMs,
    pieces: pieces(folding, folded, segments, span, reachedMs),
    skipped: folded.skipped,
    restTakenMs: folded.restTakenMs,
    restLengthenedMs: folded.restLengthenedMs,
    restCutMs: folded.restCutMs,
    options: folded.stations.map((station, index) => stationOption(station, index, span)),
    loads: [...folded.loads]
      .sort(([a], [b]) => a - b)
      .map(([station, kilograms]) => ({ station, kilograms })),
    countedAfterwards: logged.some((round) => round.by === 'afterwards'),
    over:
      folding.state !== 'not-started' &&
      (folded.skipped !== null ||
        folded.finishMs !== null ||
        (span !== undefined && reachedMs >= span.bodyEndMs)),
  }
}

/** The last note for the lowest noted round that is not done. */
function notedReps(folded: FoldedBlock): number {
  let lowest = Infinity
  let reps = 0
  for (const [round, noted] of folded.notes) {
    if (round >= lowest || folded.done.has(round)) continue
    lowest = round
    reps = noted
  }
  return reps
}

function pieces(
  folding: Folding,
  folded: FoldedBlock,
  segments: readonly Segment[],
  span: BlockSpan | undefined,
  reachedMs: number,
): BlockTally['pieces'] {
  const { type } = folded.block.format
  if (!span || type === 'rounds' || type === 'for-time' || type === 'rest') return null
  const count = { done: 0, partDone: 0, of: 0 }
  for (let index = span.bodySegment; index <= span.lastSegment; index += 1) {
    const segment = segments[index]
    if (segment?.kind !== 'work') continue
    count.of += 1
    const wasLeft = (folding.edits[index]?.leftAtMs ?? null) !== null
    if (wasLeft || segment.endMs > reachedMs || wasJumped(folding, segment)) continue
    if (folded.restedSegments.has(index)) count.partDone += 1
    else count.done += 1
  }
  return count
}

/** A piece during which the clock jumped ahead did not run out under the member's hands. */
function wasJumped(folding: Folding, segment: Segment): boolean {
  return folding.jumps.some((jump) => jump.fromMs < segment.endMs && jump.toMs > segment.startMs)
}

function stationOption(
  station: FoldedStation,
  index: number,
  span: BlockSpan | undefined,
): StationOption {
  const bodyStartMs = span?.bodyStartMs ?? 0
  const used: string[] = []
  for (const change of station.changes) {
    if (change.classMs <= bodyStartMs) used.length = 0
    if (!used.includes(change.option)) used.push(change.option)
  }
  const last = station.changes.at(-1)
  return { station: index, option: last?.option ?? AS_PLANNED, from: last?.from ?? 'coach', used }
}
