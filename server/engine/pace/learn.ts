/** What recorded results teach about pace: seconds a rep of each movement option, and how members tire. */
import { AS_PLANNED } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { Station } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent } from '../tally/events'
import { inOrder } from '../tally/order'
import { segmentsOf } from '../timeline/compile'
import { blockSpans, edit, editedSegments, type Edits } from '../timeline/edits'
import { roundLimit, stationPlan } from './block-plan'
import { TIRING } from './walk'

/**
 * Fewer attempts than this teach nothing. Of eight the second lowest and the second highest enclose the
 * true median in 1 − 2·(1 + 8)/2⁸ = 93 of 100 cases whatever the distribution (David & Nagaraja, Order
 * Statistics, 3rd ed. 2003, 7.1), so that one odd attempt on each side is borne; three of eight that are
 * wrong without bound still cannot carry the median away.
 */
export const LEAST_ATTEMPTS = 8

/** What a station asked for in a round, or in several together. */
export interface ObservedStation {
  movement: string
  /** A slug; `as-planned` for the coach's own. */
  option: string
  /** Both sides counted where they are done in turn. */
  reps: number
  /** Of the station at the time, before anything was learnt. */
  plannedSecondsPerRep: number
}

interface ObservedWork {
  stations: ObservedStation[]
  /** Planned seconds of all changes inside. */
  changeSeconds: number
}

export interface ObservedRound extends ObservedWork {
  /** Seconds into the body at which the round before was logged; 0 of round 1. */
  startSeconds: number
  durationSeconds: number
}

export interface ObservedBlock {
  block: string
  /** The segment's length, or the cap: what tiring is reckoned over. */
  blockSeconds: number
  rounds: ObservedRound[]
  /**
   * All rounds up to the last logged one together, which a forecast is held against; rests as needed lie
   * inside, for a forecast knows nothing of them. Null where not every one of them can be trusted.
   */
  total: (ObservedWork & { endSeconds: number }) | null
}

export interface ObservedAttempt {
  /** Of the attempt; orders those that began at one instant. */
  id: string
  /** Milliseconds since 1970: forecasts are held only against attempts later than those they rest on. */
  startedAtMs: number
  blocks: ObservedBlock[]
}

/** The key of an option in what was learnt, as `PaceDefaults.learnt` is asked. */
export function paceKey(movement: string, option: string): string {
  return `${movement}/${option}`
}

/** A stretch of class time in milliseconds. */
interface Stretch {
  fromMs: number
  toMs: number
}

interface LoggedFact {
  classMs: number
  isMembers: boolean
  /** Options in force when it was logged, by station. */
  options: readonly string[]
}

interface BlockFacts {
  stations: Station[]
  roundLimit: number
  known: Set<string>[]
  options: readonly string[]
  optionChangesMs: number[]
  done: Map<number, LoggedFact>
  /** Rounds that were taken back at some time: when they were really done is no longer known. */
  corrected: Set<number>
  rests: Stretch[]
}

/**
 * What one attempt shows of its `rounds` and `for-time` blocks, from its events in any order; blocks that
 * show nothing are left out. A round is observed where it and the one before it (the start of the body
 * for round 1) were logged `by: member` during the block. Left out are rounds with a rest as needed or a
 * jump of the clock inside, rounds ever taken back, logged in a pause or afterwards, and those that follow one, rounds
 * in which an option was changed, and whole blocks with a station that has a tempo of its own: there the
 * coach asked for a pace, and how the rest of such a round was divided cannot be told.
 */
export function observedBlocks(
  version: PublishedVersion,
  events: readonly ClassEvent[],
): ObservedBlock[] {
  const { spec } = version
  const base = segmentsOf(spec)
  const edits: Edits = []
  const facts = new Map<string, BlockFacts>()
  for (const block of spec.blocks) {
    const limit = roundLimit(block)
    const { format } = block
    if (limit === null || (format.type !== 'rounds' && format.type !== 'for-time')) continue
    if (!format.stations.some(hasOwnTempo)) {
      facts.set(block.id, emptyFacts(version, format.stations, limit))
    }
  }
  if (facts.size === 0) return []

  const jumps: Stretch[] = []
  let pausedMs: number | null = null
  for (const event of inOrder(events)) {
    switch (event.type) {
      case 'rest-lengthened':
      case 'rest-cut':
      case 'block-skipped':
      case 'block-finished':
        edit(spec, base, edits, event)
        break
      case 'paused':
      case 'stopped':
        pausedMs ??= event.classMs
        break
      case 'resumed':
        if (pausedMs !== null && event.classMs > pausedMs) {
          jumps.push({ fromMs: pausedMs, toMs: event.classMs })
        }
        pausedMs = null
        break
      case 'started':
        for (const chosen of Array.isArray(event.options) ? event.options : []) {
          chooseOption(facts.get(chosen.block), chosen.station, chosen.option, 0)
        }
        break
      case 'option-chosen':
        chooseOption(facts.get(event.block), event.station, event.option, event.classMs)
        break
      case 'round-done':
      case 'round-undone':
        noteRound(facts.get(event.block), event, pausedMs !== null)
        break
      case 'rest-taken':
        facts
          .get(event.block)
          ?.rests.push({ fromMs: event.classMs - event.ms, toMs: event.classMs })
        break
      default:
        break
    }
  }

  const spans = blockSpans(spec, editedSegments(base, edits))
  return spec.blocks.flatMap((block, index) => {
    const fact = facts.get(block.id)
    const span = spans[index]
    const { format } = block
    if (!fact || !span || (format.type !== 'rounds' && format.type !== 'for-time')) return []
    const blockSeconds = format.type === 'for-time' ? format.cap : format.seconds
    const body = { fromMs: span.bodyStartMs, toMs: span.bodyEndMs }
    const observed = observeBlock(version, fact, body, jumps)
    if (observed.rounds.length === 0 && !observed.total) return []
    return [{ block: block.id, blockSeconds, ...observed }]
  })
}

/** Four figures of 0 ask for nothing. */
function hasOwnTempo(station: Station): boolean {
  return station.tempo?.some((figure) => figure > 0) ?? false
}

function emptyFacts(version: PublishedVersion, stations: Station[], limit: number): BlockFacts {
  return {
    stations,
    roundLimit: limit,
    known: stations.map((station) => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      return new Set([AS_PLANNED, ...optionsOf(station, movement).map((one) => one.option)])
    }),
    options: stations.map(() => AS_PLANNED),
    optionChangesMs: [],
    done: new Map(),
    corrected: new Set(),
    rests: [],
  }
}

function chooseOption(
  fact: BlockFacts | undefined,
  station: number,
  option: string,
  classMs: number,
): void {
  if (!fact?.known[station]?.has(option) || fact.options[station] === option) return
  fact.options = fact.options.with(station, option)
  fact.optionChangesMs.push(classMs)
}

function noteRound(
  fact: BlockFacts | undefined,
  event: Extract<ClassEvent, { type: 'round-done' | 'round-undone' }>,
  isPaused: boolean,
): void {
  const { round } = event
  if (!fact || !Number.isInteger(round) || round < 1 || round > fact.roundLimit) return
  if (event.type === 'round-undone') {
    fact.done.delete(round)
    fact.corrected.add(round)
  } else if (!fact.done.has(round)) {
    const isMembers = event.by === 'member'
    fact.done.set(round, { classMs: event.classMs, isMembers, options: fact.options })
    // The class stands: this is the record put right, not a press at the end of a round.
    if (isPaused) fact.corrected.add(round)
  }
}

function observeBlock(
  version: PublishedVersion,
  fact: BlockFacts,
  body: Stretch,
  jumps: readonly Stretch[],
): Pick<ObservedBlock, 'rounds' | 'total'> {
  const rounds: ObservedRound[] = []
  const all: ObservedWork[] = []
  const last = Math.max(0, ...fact.done.keys())
  /** The end of the round before; null where it cannot be trusted. */
  let startMs: number | null = body.fromMs
  for (const [round, logged] of [...fact.done].sort(([a], [b]) => a - b)) {
    if (!fact.done.has(round - 1) && round > 1) startMs = null
    const endMs = logged.classMs
    const isTrusted: boolean =
      logged.isMembers &&
      !fact.corrected.has(round) &&
      endMs > Math.max(body.fromMs, startMs ?? body.fromMs) &&
      endMs <= body.toMs
    const work = workOf(version, fact, round, logged.options)
    if (isTrusted && startMs !== null && !isMixed(fact, startMs, endMs)) {
      all.push(work)
      const isPlain = ![...fact.rests, ...jumps].some(
        (one) => one.fromMs < endMs && one.toMs > (startMs ?? endMs),
      )
      if (isPlain && work.stations.length > 0) {
        rounds.push({
          startSeconds: (startMs - body.fromMs) / 1_000,
          durationSeconds: (endMs - startMs) / 1_000,
          ...work,
        })
      }
    }
    startMs = isTrusted ? endMs : null
  }
  const endMs = fact.done.get(last)?.classMs ?? body.fromMs
  const wasAway = jumps.some((one) => one.fromMs < endMs && one.toMs > body.fromMs)
  const isWhole = last > 0 && all.length === last && !wasAway
  return {
    rounds,
    total: isWhole ? { endSeconds: (endMs - body.fromMs) / 1_000, ...together(all) } : null,
  }
}

/** True where an option was changed inside a round. */
function isMixed(fact: BlockFacts, startMs: number, endMs: number): boolean {
  return fact.optionChangesMs.some((atMs) => atMs > startMs && atMs <= endMs)
}

/**
 * What a round asked for, from the last rep of the one before to its own: the way back to the first
 * station belongs to the round that it leads to, so round 1 has one change less.
 */
function workOf(
  version: PublishedVersion,
  fact: BlockFacts,
  round: number,
  options: readonly string[],
): ObservedWork {
  const stations: ObservedStation[] = []
  let changeSeconds = 0
  fact.stations.forEach((station, index) => {
    const option = options[index] ?? AS_PLANNED
    const plan = stationPlan(version, station, option)
    const isLast = index === fact.stations.length - 1
    if (fact.stations.length > 1 && !(isLast && round === 1)) changeSeconds += plan.changeSeconds
    const reps = plan.repsIn(round)
    if (reps <= 0) return
    const { movement } = station
    stations.push({ movement, option, reps, plannedSecondsPerRep: plan.secondsPerRep })
  })
  return { stations, changeSeconds }
}

function together(all: readonly ObservedWork[]): ObservedWork {
  const stations = new Map<string, ObservedStation>()
  let changeSeconds = 0
  for (const work of all) {
    changeSeconds += work.changeSeconds
    for (const station of work.stations) {
      const key = `${paceKey(station.movement, station.option)} ${String(station.plannedSecondsPerRep)}`
      const before = stations.get(key)
      stations.set(key, { ...station, reps: (before?.reps ?? 0) + station.reps })
    }
  }
  return { stations: [...stations.values()], changeSeconds }
}

export interface LearntPace {
  secondsPerRep: number
  /** How many attempts it rests on; `LEAST_ATTEMPTS` or more. */
  attempts: number
  /**
   * How far forecasts were off, in reps a block: the median over `forecasts` attempts that were forecast
   * from earlier ones alone. Null before there is such an attempt.
   */
  medianAbsoluteErrorReps: number | null
  forecasts: number
}

export interface LearntPaces {
  /** By `paceKey`; only options with enough attempts. */
  paces: Map<string, LearntPace>
  /** f of the forecast, 0 to 2; null with too few attempts. */
  tiring: { factor: number; attempts: number } | null
}

/** Of what a station could be asked; a figure that ends on a bound says nothing. Seconds a rep. */
const FASTEST = 0.1
const SLOWEST = 600
const MOST_TIRING = 2
/** Bounds of what one attempt may say about f, before the median of all. */
const LEAST_SEEN = -2
const MOST_SEEN = 4
/** Rounds closer together than this share of the block hardly tell tiring from a late press. */
const LEAST_APART = 0.15
/** An attempt with fewer pairs of rounds says nothing about tiring. */
const LEAST_PAIRS = 3
const MOST_PASSES = 50
/**
 * How much of a member's own speed in an attempt is allowed for, as a power. With all of it a class whose
 * options come in no other could never be corrected; with three quarters of it an attempt tells mostly how
 * its options compare, and members who are fast or slow trouble the figures a quarter as much.
 */
const OWN_SPEED = 0.75
const LEAST_RATIO = 1e-6
/**
 * The power to which a correction is taken. What one pass leaves of an error is 1 − STRIDE × a share
 * between 1 − OWN_SPEED (all members slower alike) and 1 (one option alone): at most ⅝ of it.
 */
const STRIDE = 1.5
/** Of every figure, from one pass to the next. */
const SETTLED = 0.001
const PASSES_BETWEEN = 4
/** Slices of the attempts, in order of time; each but the first is forecast from those before it. */
const SLICES = 5

/** Attempts laid out flat, for the many passes over them. All times in seconds. */
interface Sample {
  options: Map<string, number>
  /** By option. */
  planned: Float64Array
  /** By round. */
  durations: Float64Array
  /** Middle of the round as a share of the block. */
  middles: Float64Array
  changes: Float64Array
  /** By entry: what a round asked of one option. Those of a round lie side by side. */
  entryRound: Int32Array
  entryOption: Int32Array
  entryReps: Float64Array
  /** The entries of one option in one attempt, by attempt; every pass leaves each in order of what it found. */
  groups: Int32Array[]
  /** By option, its groups; likewise. */
  groupsOf: Int32Array[]
  /** By attempt: its blocks, as the first round and the one after the last. */
  blocks: { from: number; to: number }[][]
  /** By attempt, how many rounds, entries and groups there are up to its end. */
  ends: { rounds: number; entries: number; groups: number }[]
}

interface Fit {
  sample: Sample
  /** Seconds a rep, by option. */
  seconds: Float64Array
  tiring: number
  tiringAttempts: number
}

/**
 * Seconds a rep of each option, and f, from what was observed at one gym, in any order.
 *
 * Medians all through, which bear up to half of wrong data before they can be carried away (Hampel 1971,
 * Ann. Math. Statist. 42:1887; Huber & Ronchetti, Robust Statistics, 2nd ed. 2009, 1.4). f is, in each
 * attempt, the one with which Kendall's tau between where a round lies in its block and its observed ÷
 * predicted time is 0: the median over all pairs of rounds of one block, as Sen's slope is found (Theil
 * 1950; Sen 1968, JASA 63:1379; bears 29 of 100 wrong rounds in one attempt), in a form that does not ask
 * how fast the member is; then the median over the attempts. Seconds a rep begin as planned. In each pass every option is multiplied by how many times
 * its reps took as long as predicted: the median over its rounds in an attempt, then over its attempts,
 * each weighted by the option's share of the round's time, so that an attempt counts once however many
 * rounds it logged. Where no option moves any more, overestimates and underestimates balance for each, as
 * in a fit of least absolute deviations. Options that only ever come together share their correction.
 */
export function learnPaces(attempts: readonly ObservedAttempt[]): LearntPaces {
  const ordered = attempts
    .map(withUsable)
    .filter((one) => one.blocks.length > 0)
    .sort(compare)
  const sample = sampleOf(ordered)
  const fit = fitted(sample)
  const errors = forecastErrors(ordered, sample)
  const paces = new Map<string, LearntPace>()
  for (const key of [...sample.options.keys()].sort()) {
    const learnt = learntOf(fit, key)
    if (learnt === null) continue
    const off = errors.get(key) ?? []
    paces.set(key, {
      secondsPerRep: learnt.seconds,
      attempts: learnt.attempts,
      medianAbsoluteErrorReps: off.length > 0 ? median(off) : null,
      forecasts: off.length,
    })
  }
  const { tiring: factor, tiringAttempts } = fit
  const isTaught = tiringAttempts >= LEAST_ATTEMPTS
  return { paces, tiring: isTaught ? { factor, attempts: tiringAttempts } : null }
}

/** Seconds a rep by `paceKey`, as `PaceDefaults.learnt` takes them. */
export function learntSeconds({ paces }: Pick<LearntPaces, 'paces'>): Map<string, number> {
  return new Map([...paces].map(([key, { secondsPerRep }]) => [key, secondsPerRep]))
}

function learntOf(fit: Fit, key: string): { seconds: number; attempts: number } | null {
  const option = fit.sample.options.get(key)
  if (option === undefined) return null
  const seconds = fit.seconds[option] ?? 0
  const attempts = fit.sample.groupsOf[option]?.length ?? 0
  return attempts >= LEAST_ATTEMPTS && seconds > FASTEST && seconds < SLOWEST
    ? { seconds, attempts }
    : null
}

/** Seconds, or reps: above what floating point loses, below a year of anything. */
function isMeasure(value: number): boolean {
  return value >= 1e-3 && value <= 1e7
}

function isUsableWork({ stations, changeSeconds }: ObservedWork): boolean {
  return (
    (changeSeconds === 0 || isMeasure(changeSeconds)) &&
    stations.length > 0 &&
    stations.every((one) => isMeasure(one.reps) && isMeasure(one.plannedSecondsPerRep))
  )
}

/** Without what no figure could be reckoned from. */
function withUsable(attempt: ObservedAttempt): ObservedAttempt {
  const blocks = attempt.blocks
    .filter((block) => isMeasure(block.blockSeconds))
    .map((block) => ({
      ...block,
      rounds: block.rounds.filter(
        (round) =>
          isMeasure(round.durationSeconds) &&
          (round.startSeconds === 0 || isMeasure(round.startSeconds)) &&
          isUsableWork(round),
      ),
      total:
        block.total && isMeasure(block.total.endSeconds) && isUsableWork(block.total)
          ? block.total
          : null,
    }))
    .filter((block) => block.rounds.length > 0 || block.total)
  return { ...attempt, blocks }
}

function compare(a: ObservedAttempt, b: ObservedAttempt): number {
  const [aMs, bMs] = [a.startedAtMs, b.startedAtMs].map((ms) => (Number.isFinite(ms) ? ms : 0))
  if (aMs !== bMs) return (aMs ?? 0) - (bMs ?? 0)
  if (a.id !== b.id) return a.id < b.id ? -1 : 1
  return 0
}

function sampleOf(attempts: readonly ObservedAttempt[]): Sample {
  const options = new Map<string, number>()
  const planned: number[][] = []
  const durations: number[] = []
  const middles: number[] = []
  const changes: number[] = []
  const entryRound: number[] = []
  const entryOption: number[] = []
  const entryReps: number[] = []
  const groups: number[][] = []
  const groupsOf: number[][] = []
  const ends: Sample['ends'] = []
  const blocks = attempts.map((attempt) => {
    const own = new Map<number, number[]>()
    const spans = attempt.blocks.map(({ rounds, blockSeconds }) => {
      const from = durations.length
      for (const round of rounds) {
        for (const station of round.stations) {
          const key = paceKey(station.movement, station.option)
          const option = options.get(key) ?? options.size
          options.set(key, option)
          ;(planned[option] ??= []).push(station.plannedSecondsPerRep)
          const group = own.get(option)
          if (group) group.push(entryRound.length)
          else own.set(option, [entryRound.length])
          entryRound.push(durations.length)
          entryOption.push(option)
          entryReps.push(station.reps)
        }
        durations.push(round.durationSeconds)
        middles.push((round.startSeconds + round.durationSeconds / 2) / blockSeconds)
        changes.push(round.changeSeconds)
      }
      return { from, to: durations.length }
    })
    for (const [option, group] of own) {
      ;(groupsOf[option] ??= []).push(groups.length)
      groups.push(group)
    }
    ends.push({ rounds: durations.length, entries: entryRound.length, groups: groups.length })
    return spans
  })
  return {
    options,
    planned: Float64Array.from(planned, median),
    durations: Float64Array.from(durations),
    middles: Float64Array.from(middles),
    changes: Float64Array.from(changes),
    entryRound: Int32Array.from(entryRound),
    entryOption: Int32Array.from(entryOption),
    entryReps: Float64Array.from(entryReps),
    groups: groups.map((group) => Int32Array.from(group)),
    groupsOf: groupsOf.map((own) => Int32Array.from(own)),
    blocks,
    ends,
  }
}

/** The first `count` attempts. */
function earliest(sample: Sample, count: number): Sample {
  const end = sample.ends[count - 1] ?? { rounds: 0, entries: 0, groups: 0 }
  return {
    ...sample,
    durations: sample.durations.subarray(0, end.rounds),
    middles: sample.middles.subarray(0, end.rounds),
    changes: sample.changes.subarray(0, end.rounds),
    entryRound: sample.entryRound.subarray(0, end.entries),
    entryOption: sample.entryOption.subarray(0, end.entries),
    entryReps: sample.entryReps.subarray(0, end.entries),
    groups: sample.groups.slice(0, end.groups),
    groupsOf: sample.groupsOf.map((own) => own.filter((group) => group < end.groups)),
    blocks: sample.blocks.slice(0, count),
    ends: sample.ends.slice(0, count),
  }
}

function fitted(sample: Sample): Fit {
  const seconds = sample.planned.slice()
  const fit: Fit = { sample, seconds, tiring: TIRING.expected, tiringAttempts: 0 }
  for (let passes = 0; passes < MOST_PASSES; passes += PASSES_BETWEEN) {
    let moved = learnTiring(fit)
    for (let pass = 0; pass < PASSES_BETWEEN; pass += 1) {
      const corrected = correctSeconds(fit)
      if (pass === 0) moved = Math.max(moved, corrected)
      if (corrected < SETTLED) break
    }
    if (moved < SETTLED) break
  }
  return fit
}

/** Seconds that the reps of each round take with the present figures, untired, without its changes. */
function repSeconds({ sample, seconds }: Fit): Float64Array {
  const { entryRound, entryOption, entryReps } = sample
  const planned = new Float64Array(sample.durations.length)
  for (let entry = 0; entry < entryRound.length; entry += 1) {
    const round = entryRound[entry] ?? 0
    planned[round] =
      (planned[round] ?? 0) + (entryReps[entry] ?? 0) * (seconds[entryOption[entry] ?? 0] ?? 0)
  }
  return planned
}

/** Sets f to what the attempts show; gives by how much it moved. Too few attempts leave it as expected. */
function learnTiring(fit: Fit): number {
  const { durations, middles, changes, blocks } = fit.sample
  const ratios = repSeconds(fit)
  ratios.forEach((planned, index) => {
    ratios[index] = (durations[index] ?? 0) / (planned + (changes[index] ?? 0))
  })
  const pairs = new Float64Array(Math.max(0, ...blocks.map(pairCount)))
  const seen: number[] = []
  for (const spans of blocks) {
    let count = 0
    for (const { from, to } of spans) {
      for (let first = from; first < to; first += 1) {
        const early = ratios[first] ?? 0
        const earlyAt = middles[first] ?? 0
        for (let second = first + 1; second < to; second += 1) {
          const late = ratios[second] ?? 0
          const lateAt = middles[second] ?? 0
          if (!(lateAt - earlyAt >= LEAST_APART)) continue
          // The f with which late ÷ (1 + f·lateAt) = early ÷ (1 + f·earlyAt); none is large enough below 0.
          const apart = early * lateAt - late * earlyAt
          pairs[count] = apart > 0 ? (late - early) / apart : MOST_SEEN
          count += 1
        }
      }
    }
    if (count < LEAST_PAIRS) continue
    const found = medianInPlace(pairs.subarray(0, count))
    seen.push(Math.max(LEAST_SEEN, Math.min(found, MOST_SEEN)))
  }
  fit.tiringAttempts = seen.length
  if (seen.length < LEAST_ATTEMPTS) return 0
  const before = fit.tiring
  fit.tiring = Math.max(0, Math.min(median(seen), MOST_TIRING))
  return Math.abs(fit.tiring - before)
}

function pairCount(spans: readonly { from: number; to: number }[]): number {
  return spans.reduce((sum, { from, to }) => sum + ((to - from) * (to - from - 1)) / 2, 0)
}

/** One pass over all options at once; gives the largest share by which one moved. */
function correctSeconds(fit: Fit): number {
  const { sample, seconds } = fit
  const { durations, middles, changes, entryRound, entryOption, entryReps } = sample
  const planned = repSeconds(fit)
  const ratios = new Float64Array(durations.length)
  for (let round = 0; round < ratios.length; round += 1) {
    const rested = (durations[round] ?? 0) / (1 + fit.tiring * (middles[round] ?? 0))
    ratios[round] = rested / ((planned[round] ?? 0) + (changes[round] ?? 0))
  }
  for (const spans of sample.blocks) {
    const from = spans[0]?.from ?? 0
    const to = spans.at(-1)?.to ?? from
    if (to === from) continue
    const speed = Math.max(median(ratios.subarray(from, to)), LEAST_RATIO)
    const allowance = speed ** -OWN_SPEED
    for (let round = from; round < to; round += 1) ratios[round] = (ratios[round] ?? 0) * allowance
  }
  const factors = new Float64Array(entryRound.length)
  const shares = new Float64Array(entryRound.length)
  for (let entry = 0; entry < factors.length; entry += 1) {
    const round = entryRound[entry] ?? 0
    const reps = planned[round] ?? 0
    const change = changes[round] ?? 0
    factors[entry] = ((ratios[round] ?? 0) * (reps + change) - change) / reps
    const own = (entryReps[entry] ?? 0) * (seconds[entryOption[entry] ?? 0] ?? 0)
    shares[entry] = own / (reps + change)
  }
  const groupFactors = new Float64Array(sample.groups.length)
  const groupShares = new Float64Array(sample.groups.length)
  sample.groups.forEach((group, index) => {
    groupFactors[index] = weightedMedian(group, factors, shares)
    let sum = 0
    for (const entry of group) sum += shares[entry] ?? 0
    groupShares[index] = sum / group.length
  })
  let moved = 0
  sample.groupsOf.forEach((own, option) => {
    const before = seconds[option] ?? 0
    // At most twice or half in one pass, so that one step cannot overshoot.
    const found = Math.max(0.1, weightedMedian(own, groupFactors, groupShares))
    const factor = Math.max(0.5, Math.min(found ** STRIDE, 2))
    const after = Math.max(FASTEST, Math.min(before * factor, SLOWEST))
    moved = Math.max(moved, Math.abs(after / before - 1))
    seconds[option] = after
  })
  return moved
}

/** Of at least one value. */
function median(values: ArrayLike<number>): number {
  return medianInPlace(new Float64Array(values))
}

function medianInPlace(values: Float64Array): number {
  const middle = values.length >> 1
  const upper = select(values, middle)
  if (values.length % 2 === 1) return upper
  let lower = -Infinity
  for (let index = 0; index < middle; index += 1) lower = Math.max(lower, values[index] ?? 0)
  return (lower + upper) / 2
}

/**
 * The value of rank `rank` (from 0), with none above it before and none below it after; in linear time, as
 * a rule (Hoare 1961, Algorithm 65: Find).
 */
function select(values: Float64Array, rank: number): number {
  let from = 0
  let to = values.length - 1
  while (from < to) {
    const pivot = values[(from + to) >> 1] ?? 0
    let low = from
    let high = to
    while (low <= high) {
      while ((values[low] ?? 0) < pivot) low += 1
      while ((values[high] ?? 0) > pivot) high -= 1
      if (low > high) break
      const swapped = values[low] ?? 0
      values[low] = values[high] ?? 0
      values[high] = swapped
      low += 1
      high -= 1
    }
    if (rank <= high) to = high
    else if (rank >= low) from = low
    else break
  }
  return values[rank] ?? 0
}

/**
 * Of the values that `order` names, the one with half of the weight on either side; between two where
 * they share it exactly. Leaves `order` sorted by them, which makes the next pass quick.
 */
function weightedMedian(order: Int32Array, values: Float64Array, weights: Float64Array): number {
  sortBy(order, values)
  let half = 0
  for (const index of order) half += (weights[index] ?? 0) / 2
  const tolerance = half * 1e-9
  let below = 0
  for (let rank = 0; rank < order.length; rank += 1) {
    const index = order[rank] ?? 0
    below += weights[index] ?? 0
    if (below < half - tolerance) continue
    const value = values[index] ?? 1
    const next = order[rank + 1]
    if (below > half + tolerance || next === undefined) return value
    return (value + (values[next] ?? value)) / 2
  }
  return 1
}

/** Insertion sort, linear in what is nearly in order; what is far from it is sorted as usual. */
function sortBy(order: Int32Array, values: Float64Array): void {
  let movesLeft = order.length * 16
  for (let rank = 1; rank < order.length; rank += 1) {
    const index = order[rank] ?? 0
    const value = values[index] ?? 0
    let to = rank
    while (to > 0 && (values[order[to - 1] ?? 0] ?? 0) > value) {
      order[to] = order[to - 1] ?? 0
      to -= 1
    }
    order[to] = index
    movesLeft -= rank - to
    if (movesLeft < 0) {
      order.sort((a, b) => (values[a] ?? 0) - (values[b] ?? 0))
      return
    }
  }
}

/**
 * By option, how far the forecast of each attempt was off, in reps (the median of its blocks with that
 * option). The attempts are cut into `SLICES` in order of time, and each slice is forecast from those
 * before it, as it would have been then: what is measured was not fitted (Dawid 1984, JRSS A 147:278).
 * Only options that had been learnt by then count. A block is held against its forecast at the instant
 * of its last logged round, where the reps done are known exactly; reps are reckoned at the mean rate of
 * those rounds.
 */
function forecastErrors(
  ordered: readonly ObservedAttempt[],
  sample: Sample,
): Map<string, number[]> {
  const errors = new Map<string, number[]>()
  for (let slice = 1; slice < SLICES; slice += 1) {
    const from = Math.floor((ordered.length * slice) / SLICES)
    const to = Math.floor((ordered.length * (slice + 1)) / SLICES)
    if (from < LEAST_ATTEMPTS || to === from) continue
    const fit = fitted(earliest(sample, from))
    for (const attempt of ordered.slice(from, to)) {
      for (const [key, off] of attemptErrors(fit, attempt)) {
        const before = errors.get(key)
        if (before) before.push(median(off))
        else errors.set(key, [median(off)])
      }
    }
  }
  return errors
}

function attemptErrors(fit: Fit, attempt: ObservedAttempt): Map<string, number[]> {
  const errors = new Map<string, number[]>()
  for (const { total, blockSeconds } of attempt.blocks) {
    if (!total) continue
    const learnt = new Set<string>()
    let workSeconds = total.changeSeconds
    let reps = 0
    for (const station of total.stations) {
      const key = paceKey(station.movement, station.option)
      const found = learntOf(fit, key)
      if (found) learnt.add(key)
      workSeconds += station.reps * (found?.seconds ?? station.plannedSecondsPerRep)
      reps += station.reps
    }
    const forecastReps = (reps * untired(total.endSeconds, blockSeconds, fit.tiring)) / workSeconds
    for (const key of learnt) {
      errors.set(key, [...(errors.get(key) ?? []), Math.abs(forecastReps - reps)])
    }
  }
  return errors
}

/**
 * Seconds of planned time that are worked off in the first `seconds` of a block: the forecast's rule, time
 * × (1 + f·t/T), for reps of no length (dw = dt ÷ (1 + f·t/T), integrated).
 */
function untired(seconds: number, blockSeconds: number, tiring: number): number {
  if (tiring < 1e-9) return seconds
  return (blockSeconds / tiring) * Math.log1p((tiring * seconds) / blockSeconds)
}
