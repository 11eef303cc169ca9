/** A block in words, for pages that list a class. */
import { optionsOf } from '../engine/spec/options'
import type { Anchor, AnyStation, Block, Reps } from '../engine/spec/schema'
import type { PublishedVersion } from '../engine/spec/version'
import { clockText } from '../engine/tally/score'
import { plural } from './format'
import type { ForecastDto } from './paces'

/** '4, 6, 8 …', '12, 9, 6, 3', '10'. */
export function repsText(reps: Reps): string {
  if (typeof reps === 'number') return String(reps)
  if ('list' in reps) return reps.list.join(', ') + (reps.then === 'done' ? '' : ' …')
  const shown: number[] = []
  for (let rep = reps.from; shown.length < 4; rep += reps.step) {
    const isPast = reps.to !== undefined && (reps.step > 0 ? rep > reps.to : rep < reps.to)
    if (isPast) break
    shown.push(rep)
    if (reps.step === 0) break
  }
  const last = shown.at(-1)
  const isWhole =
    reps.to !== undefined &&
    last !== undefined &&
    (reps.step > 0 ? last + reps.step > reps.to : last + reps.step < reps.to)
  return shown.join(', ') + (isWhole && reps.then === 'done' ? '' : ' …')
}

/** The number that a work block has on the lane, from 1; null for every other kind. */
export function workNumber(blocks: readonly Block[], block: Block): number | null {
  if (block.kind !== 'work') return null
  return blocks.filter((one) => one.kind === 'work').indexOf(block) + 1
}

/** '6:00, as many rounds as possible'. */
export function formatText(block: Block): string {
  const { format } = block
  switch (format.type) {
    case 'rounds':
      return `${clockText(format.seconds * 1_000)}, as many rounds as possible`
    case 'for-time':
      return `${plural(format.rounds, 'round')} for time, at most ${clockText(format.cap * 1_000)}`
    case 'intervals':
      return format.rounds === 1 ? 'Once through' : `${plural(format.rounds, 'round')} by the clock`
    case 'every':
      return `Every ${clockText(format.seconds * 1_000)}, ${plural(format.times, 'time')}`
    case 'holds':
      return 'Holds'
    case 'rest':
      return clockText(format.seconds * 1_000)
  }
}

/** A forecast as a score is written: '7 + 4', or '6:12' where all rounds are done. */
export function forecastText({ rounds, reps, finishMs }: ForecastDto): string {
  return finishMs === null ? `${rounds} + ${reps}` : clockText(finishMs)
}

/** What a forecast rests on, in words. */
export function forecastBasisText({ basis }: ForecastDto): string {
  if (basis === null) return 'from the planned tempo'
  const from = `from ${plural(basis.attempts, 'attempt')} here`
  if (basis.medianErrorReps === null) return from
  const reps = Math.round(basis.medianErrorReps)
  return `${from}, usually within ${plural(Math.max(1, reps), 'rep')}`
}

/** When a cue falls due, for a coach: '0:45 in', '1:30 before the end', 'round 3', 'round 2, station 1'. */
export function anchorText(block: Block, at: Anchor): string {
  if ('from' in at) {
    const clock = clockText(at.s * 1_000)
    return at.from === 'start' ? `${clock} in` : `${clock} before the end`
  }
  const round = `round ${at.round ?? 1}`
  if (!('station' in at)) return round
  const stations = block.format.type === 'rest' ? 0 : block.format.stations.length
  return stations > 1 ? `${round}, station ${at.station + 1}` : round
}

/** What a station asks for: '4, 6, 8 … reps, each side', '40 s work, 20 s rest'. */
export function stationText(station: AnyStation): string {
  const sides =
    station.sides === 'each'
      ? ', each side'
      : station.sides === 'alternate'
        ? ', sides in turn'
        : ''
  if ('reps' in station)
    return `${repsText(station.reps)} ${station.reps === 1 ? 'rep' : 'reps'}${sides}`
  if ('work' in station) {
    return `${station.work} s work${sides}${station.rest > 0 ? `, ${station.rest} s rest` : ''}`
  }
  return `${station.seconds} s${sides}`
}

/** The movement's name and the names of its options at a station. */
export function stationNames(
  version: PublishedVersion,
  station: AnyStation,
): { name: string; easier: string[]; harder: string[] } {
  const movement = version.movements.find((one) => one.slug === station.movement)
  const options = optionsOf(station, movement)
  return {
    name: movement?.name ?? station.movement,
    easier: options.filter((one) => one.level === 'easier').map((one) => one.name),
    harder: options.filter((one) => one.level === 'harder').map((one) => one.name),
  }
}
