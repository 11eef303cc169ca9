/** A figure in motion: key positions spread over the planned tempo and joined smoothly. */
import type { FigureSlug } from './slugs'
import { isFigureSlug } from './slugs'
import { FIGURES } from './figures'
import {
  BODY_NUMBERS,
  jointsOf,
  legOf,
  resolveKey,
  SIDE_NUMBERS,
  type PoseModes,
  type PoseNumbers,
  type ResolvedKey,
  type SideName,
} from './pose'
import type { FigureData, FigureTiming, Joints, TempoPart } from './types'

export interface Motion {
  slug: FigureSlug
  /** Length of one cycle; `reps` reps long. */
  cycleMs: number
  reps: number
  /** Joints at a moment; any number, the cycle repeats. */
  at(ms: number): Joints
  /** Starts of the key positions within the cycle. */
  keyStartsMs: number[]
  /** The moment that shows the movement best when it stands still. */
  stillMs: number
}

interface TimedKey {
  key: number
  startSeconds: number
}

const TEMPO_PARTS: readonly TempoPart[] = ['down', 'bottom', 'up', 'top']

/**
 * Seconds of every way and pause of the cycle. A tempo's four figures replace the drawn seconds of
 * the ways they name, in proportion; its pauses are held at the keys marked `end`. Without a tempo,
 * `secondsPerRep` stretches the drawn cycle.
 */
export function timeKeys(
  figure: FigureData,
  timing: FigureTiming = {},
): { keys: TimedKey[]; cycleSeconds: number } {
  const reps = figure.reps ?? 1
  const { tempo, secondsPerRep } = timing
  const total = tempo ? tempo.reduce((sum, part) => sum + part, 0) : 0
  const seconds = figure.keys.map((key) => key.seconds)
  const holds = figure.keys.map(() => 0)
  if (tempo && total > 0 && figure.keys.some((key) => key.part)) {
    TEMPO_PARTS.forEach((part, which) => {
      const wanted = (tempo[which] ?? 0) * reps
      const ways = figure.keys.flatMap((key, index) => (key.part === part ? [index] : []))
      const drawn = ways.reduce((sum, index) => sum + (figure.keys[index]?.seconds ?? 0), 0)
      if (drawn > 0) {
        for (const index of ways) {
          seconds[index] = ((figure.keys[index]?.seconds ?? 0) * wanted) / drawn
        }
        return
      }
      const ends = figure.keys.flatMap((key, index) => (key.end === part ? [index] : []))
      for (const index of ends) holds[index] = wanted / ends.length
    })
    const sum = [...seconds, ...holds].reduce((all, each) => all + each, 0)
    stretch(seconds, holds, (total * reps) / sum)
  } else if (secondsPerRep || total > 0) {
    const sum = seconds.reduce((all, each) => all + each, 0)
    stretch(seconds, holds, ((total > 0 ? total : (secondsPerRep ?? 0)) * reps) / sum)
  }
  const keys: TimedKey[] = []
  let startSeconds = 0
  figure.keys.forEach((_, index) => {
    keys.push({ key: index, startSeconds })
    const hold = holds[index] ?? 0
    if (hold > 0) {
      startSeconds += hold
      keys.push({ key: index, startSeconds })
    }
    startSeconds += seconds[index] ?? 0
  })
  return { keys, cycleSeconds: startSeconds }
}

function stretch(seconds: number[], holds: number[], by: number): void {
  if (!Number.isFinite(by) || by <= 0) return
  for (let index = 0; index < seconds.length; index += 1) {
    seconds[index] = (seconds[index] ?? 0) * by
    holds[index] = (holds[index] ?? 0) * by
  }
}

const flatten = ({ body, near, far }: PoseNumbers): number[] => [
  ...BODY_NUMBERS.map((name) => body[name]),
  ...SIDE_NUMBERS.map((name) => near[name]),
  ...SIDE_NUMBERS.map((name) => far[name]),
]

function samePlant(figure: FigureData, from: number, to: number, side: SideName): boolean {
  const a = figure.keys[from]
  const b = figure.keys[to]
  if (!a || !b) return false
  const first = legOf(a, side).plant
  const second = legOf(b, side).plant
  if (!first || !second) return false
  if ('sole' in first && 'sole' in second) return samePoint(first.sole, second.sole)
  if ('toes' in first && 'toes' in second) return samePoint(first.toes, second.toes)
  return 'knee' in first && 'knee' in second && samePoint(first.knee, second.knee)
}
const samePoint = (a: readonly (number | undefined)[], b: readonly (number | undefined)[]) =>
  a[0] === b[0] && a[1] === b[1] && a[2] === b[2]

/** How the way from one key to the next is found: what is planted at either end is solved between them. */
function modesBetween(
  figure: FigureData,
  from: ResolvedKey,
  to: ResolvedKey,
  a: number,
  b: number,
): PoseModes {
  const carried =
    from.modes.root !== 'at' &&
    from.modes.root === to.modes.root &&
    samePlant(figure, a, b, from.modes.root)
      ? from.modes.root
      : 'at'
  const side = (name: SideName): PoseModes['near'] => {
    const start = from.modes[name]
    const end = to.modes[name]
    const plants = [a, b].map((index) => {
      const key = figure.keys[index]
      return key ? legOf(key, name).plant : undefined
    })
    const planted = plants.some((plant) => plant && !('knee' in plant))
    const byToes = plants.every((plant) => plant && 'toes' in plant)
    const leg = carried === name ? start.leg : planted ? (byToes ? 'toes' : 'ankle') : 'angles'
    return {
      leg,
      arm: start.arm === 'hand' || end.arm === 'hand' ? 'hand' : 'angles',
      openHand: start.openHand,
    }
  }
  return { root: carried, near: side('near'), far: side('far') }
}

/**
 * A monotone cubic through the keys (Fritsch and Carlson 1980): smooth where a movement passes
 * through a key, at rest where it turns, and never beyond what the keys say.
 */
export function monotoneSlopes(times: number[], values: number[], cycle: number): number[] {
  const count = values.length
  const step = (index: number) => {
    const next = (index + 1) % count
    const length = (times[next] ?? 0) - (times[index] ?? 0) + (next <= index ? cycle : 0)
    return length > 1e-9 ? length : 1e-9
  }
  const rise = (index: number) =>
    ((values[(index + 1) % count] ?? 0) - (values[index] ?? 0)) / step(index)
  return values.map((_, index) => {
    const before = (index - 1 + count) % count
    const left = rise(before)
    const right = rise(index)
    if (left * right <= 0) return 0
    const leftStep = step(before)
    const rightStep = step(index)
    const first = 2 * rightStep + leftStep
    const second = rightStep + 2 * leftStep
    return (first + second) / (first / left + second / right)
  })
}

function compile(slug: FigureSlug, figure: FigureData, timing: FigureTiming): Motion {
  const resolved = figure.keys.map(resolveKey)
  const { keys, cycleSeconds } = timeKeys(figure, timing)
  const cycle = Math.max(cycleSeconds, 0.1)
  const times = keys.map((key) => key.startSeconds)
  const table = keys.map((timed) => {
    const key = resolved[timed.key]
    return key ? flatten(key.numbers) : []
  })
  const width = table[0]?.length ?? 0
  const slopes: number[][] = []
  for (let column = 0; column < width; column += 1) {
    const values = table.map((row) => row[column] ?? 0)
    slopes.push(monotoneSlopes(times, values, cycle))
  }
  const modes = keys.map((timed, index) => {
    const next = keys[(index + 1) % keys.length] ?? timed
    const from = resolved[timed.key]
    const to = resolved[next.key]
    return from && to ? modesBetween(figure, from, to, timed.key, next.key) : null
  })
  const scratch = structuredCopy(resolved[0])
  const at = (ms: number): Joints => {
    const seconds = positiveRemainder(ms / 1000, cycle)
    let index = keys.length - 1
    while (index > 0 && (times[index] ?? 0) > seconds) index -= 1
    const next = (index + 1) % keys.length
    const start = times[index] ?? 0
    const end = next === 0 ? cycle : (times[next] ?? cycle)
    const length = Math.max(end - start, 1e-9)
    const part = Math.min(1, (seconds - start) / length)
    writeBetween(scratch, table[index] ?? [], table[next] ?? [], slopes, index, next, part, length)
    const mode = modes[index]
    return jointsOf(scratch, mode ?? fallbackModes)
  }
  const startOf = (index: number): number =>
    keys.find((timed) => timed.key === index)?.startSeconds ?? cycle
  const still = figure.still ?? Math.floor(figure.keys.length / 2)
  const stillKey = Math.floor(still)
  const stillTime =
    startOf(stillKey) + (startOf(stillKey + 1) - startOf(stillKey)) * (still - stillKey)
  return {
    slug,
    cycleMs: cycle * 1000,
    reps: figure.reps ?? 1,
    at,
    keyStartsMs: figure.keys.map((_, index) => startOf(index) * 1000),
    stillMs: stillTime * 1000,
  }
}

const fallbackModes: PoseModes = {
  root: 'at',
  near: { leg: 'angles', arm: 'angles', openHand: false },
  far: { leg: 'angles', arm: 'angles', openHand: false },
}

function structuredCopy(key: ResolvedKey | undefined): PoseNumbers {
  const numbers = key?.numbers ?? resolveKey({ body: { at: [0, 0.5], lean: 0 } }).numbers
  return { body: { ...numbers.body }, near: { ...numbers.near }, far: { ...numbers.far } }
}

const positiveRemainder = (value: number, by: number): number => ((value % by) + by) % by

function writeBetween(
  into: PoseNumbers,
  from: number[],
  to: number[],
  slopes: number[][],
  index: number,
  next: number,
  part: number,
  length: number,
): void {
  const square = part * part
  const cube = square * part
  const startWeight = 2 * cube - 3 * square + 1
  const startSlope = (cube - 2 * square + part) * length
  const endWeight = 3 * square - 2 * cube
  const endSlope = (cube - square) * length
  let column = 0
  const value = (): number => {
    const slope = slopes[column]
    const here =
      startWeight * (from[column] ?? 0) +
      startSlope * (slope?.[index] ?? 0) +
      endWeight * (to[column] ?? 0) +
      endSlope * (slope?.[next] ?? 0)
    column += 1
    return here
  }
  for (const name of BODY_NUMBERS) into.body[name] = value()
  for (const name of SIDE_NUMBERS) into.near[name] = value()
  for (const name of SIDE_NUMBERS) into.far[name] = value()
}

const motions = new Map<string, Motion>()

/**
 * The motion of a figure at a planned pace. An unknown slug stands still.
 * `timing.tempo` is seconds of eccentric, bottom, concentric, top; over `secondsPerRep`.
 */
export function motionOf(slug: string, timing: FigureTiming = {}): Motion {
  const known: FigureSlug = isFigureSlug(slug) ? slug : 'standing'
  const name = `${known}|${timing.tempo?.join('-') ?? ''}|${timing.secondsPerRep ?? ''}`
  const kept = motions.get(name)
  if (kept) return kept
  const motion = compile(known, FIGURES[known], timing)
  motions.set(name, motion)
  return motion
}

/** Joints of a figure `ms` into its movement. */
export function poseAt(slug: string, ms: number, timing: FigureTiming = {}): Joints {
  return motionOf(slug, timing).at(ms)
}

/** The data of a figure: its view, kit and description. An unknown slug is `standing`. */
export function figureOf(slug: string): FigureData {
  return FIGURES[isFigureSlug(slug) ? slug : 'standing']
}
