/** What is wrong with a class, all of it at once, each with its path and what to do. */
import { z } from 'zod'
import { bodySeconds, countInSeconds } from '../timeline/compile'
import { movementSchema, type Movement } from './movement'
import { AS_PLANNED } from './names'
import { rungCount } from './reps'
import {
  anchorSchema,
  blockSchema,
  formatSchema,
  MOST_ROUNDS,
  MOST_STATIONS,
  MOST_TIMES,
  repsSchema,
  sessionSpecSchema,
  type Anchor,
  type Format,
  type Reps,
} from './schema'
import type { PublishedVersion } from './version'

export interface Problem {
  /** Such as `blocks[2].format.stations[0].reps.to`; empty for the whole document. */
  path: string
  message: string
}

type Key = string | number
type Path = readonly Key[]

/** The longest class: 3 hours of class time. */
const MOST_CLASS_SECONDS = 10_800

function pathText(path: Path): string {
  let text = ''
  for (const key of path) {
    if (typeof key === 'number') text += `[${key}]`
    else if (!/^[\w$-]+$/.test(key)) text += `[${JSON.stringify(key)}]`
    else text += text === '' ? key : `.${key}`
  }
  return text
}

class Found {
  readonly problems: Problem[] = []
  private readonly seen = new Set<string>()

  add(path: Path, message: string): void {
    const text = pathText(path)
    const key = `${text}\n${message}`
    if (this.seen.has(key)) return
    this.seen.add(key)
    this.problems.push({ path: text, message })
  }
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function valueAt(root: unknown, path: Path): unknown {
  let value = root
  for (const key of path) {
    if (Array.isArray(value) && typeof key === 'number') value = value[key]
    else if (isObject(value) && Object.hasOwn(value, key)) value = value[String(key)]
    else return undefined
  }
  return value
}

// ---------------------------------------------------------------------------------------------
// Shape

const UNION_HELP: Record<string, string> = {
  reps: 'Give a whole number from 1 to 500, a ladder { from, step } or a list { list }.',
  at: 'Say when: { from, s }, { round } or { station }.',
}

/** Which of a union's shapes was meant, by what is there. */
function branchMeant(key: Key | undefined, value: unknown): number | null {
  if (key === 'reps') {
    if (typeof value === 'number') return 0
    if (!isObject(value)) return null
    if ('list' in value) return 2
    return Object.keys(value).length > 0 ? 1 : null
  }
  if (key === 'at' && isObject(value)) {
    if ('from' in value || 's' in value) return 0
    if ('station' in value) return 2
    if ('round' in value) return 1
  }
  return null
}

function addIssue(found: Found, root: unknown, issue: z.core.$ZodIssue, base: Path): void {
  const path: Path = [
    ...base,
    ...issue.path.map((key) => (typeof key === 'symbol' ? String(key) : key)),
  ]
  const value = valueAt(root, path)
  if (issue.code === 'unrecognized_keys') {
    for (const key of issue.keys)
      found.add([...path, key], 'Nothing of this name belongs here. Remove it.')
    return
  }
  if (issue.code === 'invalid_union') {
    const key = path.at(-1)
    if (key === 'type') {
      found.add(path, 'Choose one of: rounds, for-time, intervals, every, holds, rest.')
      return
    }
    const meant = branchMeant(key, value)
    const issues = meant === null ? undefined : issue.errors[meant]
    if (issues && issues.length > 0) for (const one of issues) addIssue(found, root, one, path)
    else found.add(path, UNION_HELP[String(key)] ?? 'This has none of the shapes that it may have.')
    return
  }
  if (value === undefined && path.length > 0) {
    const help = issue.message.startsWith('Invalid') ? '' : ` ${issue.message}`
    found.add(path, `This is missing.${help}`)
    return
  }
  found.add(path, issue.message.startsWith('Invalid') ? wrongKind(issue) : issue.message)
}

function wrongKind(issue: z.core.$ZodIssue): string {
  if (issue.code === 'invalid_type' && issue.expected === 'object') return 'Give an object.'
  if (issue.code === 'invalid_type' && issue.expected === 'array') return 'Give a list.'
  return 'This has not the kind that belongs here.'
}

// ---------------------------------------------------------------------------------------------
// Rules over several fields

function checkReps(found: Found, reps: Reps, path: Path): void {
  if (typeof reps === 'number' || 'list' in reps) return
  const { from, step, to, then } = reps
  if (step === 0) {
    found.add(
      [...path, 'step'],
      'A ladder needs a step up or down; for the same reps every round give one number.',
    )
    return
  }
  if (to === undefined) {
    if (step < 0)
      found.add(
        [...path, 'to'],
        'This is missing. A ladder that goes down needs its last rung, 1 or more.',
      )
    if (then !== undefined)
      found.add(
        [...path, 'then'],
        'Without ‘to’ the ladder has no last rung, so nothing comes then. Add ‘to’ or remove ‘then’.',
      )
    return
  }
  if (step > 0 ? to < from : to > from) {
    found.add(
      [...path, 'to'],
      `A ladder from ${from} in steps of ${step} never comes to ${to}. Turn the step or the ends round.`,
    )
  }
  if (step > 0 && then === 'done') {
    found.add(
      [...path, 'then'],
      'A ladder that goes up holds or repeats. Choose one of these, or write its rungs as a list that is done.',
    )
  }
}

/** How many rounds a `done` ladder or list lasts; null where it goes on, or is no sound ladder. */
function rungsUntilDone(reps: Reps): number | null {
  if (typeof reps === 'number' || reps.then !== 'done') return null
  const found = new Found()
  checkReps(found, reps, [])
  return found.problems.length > 0 ? null : rungCount(reps)
}

function counted(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`
}

/** Every reps of a format's stations, their options' own among them, with its path under the format. */
function everyReps(format: unknown): { reps: unknown; path: Path; station: number }[] {
  if (!isObject(format) || !Array.isArray(format['stations'])) return []
  return format['stations'].flatMap((raw: unknown, station) => {
    if (!isObject(raw)) return []
    const path: Path = ['stations', station]
    const own = 'reps' in raw ? [{ reps: raw['reps'], path: [...path, 'reps'], station }] : []
    const ofOptions = optionReps(raw['options']).map(({ reps, place }) => ({
      reps,
      path: [...path, 'options', place, 'reps'],
      station,
    }))
    return [...own, ...ofOptions]
  })
}

function checkLadders(found: Found, format: unknown, path: Path): void {
  for (const one of everyReps(format)) {
    const parsed = repsSchema.safeParse(one.reps)
    if (parsed.success) checkReps(found, parsed.data, [...path, ...one.path])
  }
}

/** `done` that runs out where a set number of rounds is asked. */
function checkRungs(found: Found, { format, hasRounds }: ReadFormat, path: Path): void {
  if (!hasRounds || (format.type !== 'for-time' && format.type !== 'every')) return
  for (const one of everyReps(format)) {
    const parsed = repsSchema.safeParse(one.reps)
    const rungs = parsed.success ? rungsUntilDone(parsed.data) : null
    if (rungs === null) continue
    if (format.type === 'for-time' && format.rounds > rungs) {
      found.add(
        [...path, 'rounds'],
        `Station ${one.station} has ${counted(rungs, 'rung')} and is then done. Ask for ${counted(rungs, 'round')} at most, or let its reps hold or repeat.`,
      )
    }
    if (format.type === 'every') {
      const visits = Math.ceil((format.times - one.station) / format.stations.length)
      if (visits > rungs) {
        found.add(
          [...path, ...one.path],
          `This station comes ${counted(visits, 'time')} and has ${counted(rungs, 'rung')}. Let its reps hold or repeat, or give fewer times.`,
        )
      }
    }
  }
}

/** An option named twice in a list of options, whatever else is in it. */
function checkOptionNames(found: Found, options: unknown, path: Path): void {
  if (!Array.isArray(options)) return
  const seen = new Set<string>()
  options.forEach((use: unknown, place) => {
    const option = isObject(use) ? use['option'] : undefined
    if (typeof option !== 'string') return
    if (seen.has(option)) {
      found.add([...path, place, 'option'], `The option ${option} is named twice. Name it once.`)
    }
    seen.add(option)
  })
}

function checkOptions(found: Found, format: unknown, path: Path): void {
  if (!isObject(format) || !Array.isArray(format['stations'])) return
  format['stations'].forEach((station: unknown, index) => {
    const options = isObject(station) ? station['options'] : undefined
    checkOptionNames(found, options, [...path, 'stations', index, 'options'])
  })
}

function checkRest(found: Found, { format, seconds }: ReadFormat, path: Path): void {
  if (format.type !== 'rest') return
  const { atLeast, atMost } = format
  if (seconds === null) {
    if (atLeast !== undefined && atMost !== undefined && atLeast > atMost) {
      found.add(
        [...path, 'atLeast'],
        `The least time is longer than the most. Give ${atMost} or less.`,
      )
    }
    return
  }
  if (atLeast !== undefined && atLeast > seconds) {
    found.add(
      [...path, 'atLeast'],
      `The least time is longer than the rest itself. Give ${seconds} or less.`,
    )
  }
  if (atMost !== undefined && atMost < seconds) {
    found.add(
      [...path, 'atMost'],
      `The most time is shorter than the rest itself. Give ${seconds} or more.`,
    )
  }
}

/** Why the round or the station that a cue waits for cannot come: the part of the anchor that says so. */
function neverComes(
  format: Format,
  at: Exclude<Anchor, { from: string }>,
): { key: 'round' | 'station'; why: string }[] {
  const station = 'station' in at ? at.station : undefined
  if (format.type === 'rest') {
    const why = 'A rest has no rounds or stations. Anchor the cue from its start or end.'
    return [{ key: station === undefined ? 'round' : 'station', why }]
  }
  const count = format.stations.length
  const isThere = station === undefined || station < count
  const most = mostRounds(format, isThere ? (station ?? 0) : 0)
  const whys: { key: 'round' | 'station'; why: string }[] = []
  if (!isThere) {
    whys.push({
      key: 'station',
      why: `The block has ${counted(count, 'station')}, counted from 0: give ${count - 1} at most.`,
    })
  } else if (most === 0) {
    return [{ key: 'station', why: 'This station never comes in so few times.' }]
  }
  if ((at.round ?? 1) > most) {
    whys.push({ key: 'round', why: `That round never comes: the last one is ${most}.` })
  }
  return whys
}

function fewestRungs(stations: readonly { reps: Reps }[]): number {
  return Math.min(...stations.map((one) => rungsUntilDone(one.reps) ?? Infinity))
}

/** The last round in which a station comes. */
function mostRounds(format: Exclude<Format, { type: 'rest' }>, station: number): number {
  switch (format.type) {
    case 'rounds':
      return fewestRungs(format.stations)
    case 'for-time':
      return Math.min(format.rounds, fewestRungs(format.stations))
    case 'intervals':
      return format.rounds
    case 'holds':
      return 1
    case 'every':
      return Math.max(0, Math.ceil((format.times - station) / format.stations.length))
  }
}

function checkCues(found: Found, read: ReadFormat, cues: unknown, path: Path): void {
  if (!Array.isArray(cues)) return
  const { format } = read
  cues.forEach((cue: unknown, index) => {
    if (!isObject(cue)) return
    const anchor = anchorSchema.safeParse(cue['at'])
    if (anchor.success) checkAnchor(found, read, anchor.data, [...path, index, 'at'])
    const station = valueAt(cue, ['show', 'station'])
    const stations = format.type === 'rest' ? 0 : format.stations.length
    if (typeof station === 'number' && station >= stations && station < MOST_STATIONS) {
      found.add(
        [...path, index, 'show', 'station'],
        stations === 0
          ? 'A rest has no station to show. Remove ‘show’.'
          : `The block has ${counted(stations, 'station')}, counted from 0: give ${stations - 1} at most.`,
      )
    }
  })
}

function checkAnchor(found: Found, { format, seconds }: ReadFormat, at: Anchor, path: Path): void {
  if ('from' in at) {
    if (seconds !== null && at.s > seconds) {
      found.add([...path, 's'], `The block is ${seconds} s long. Give ${seconds} or less.`)
    }
    return
  }
  for (const { key, why } of neverComes(format, at)) found.add([...path, key], why)
}

function checkUnique(found: Found, items: unknown, path: Path, what: string): void {
  if (!Array.isArray(items)) return
  const seen = new Set<string>()
  items.forEach((item: unknown, index) => {
    const id = isObject(item) ? item['id'] : undefined
    if (typeof id !== 'string') return
    if (seen.has(id))
      found.add([...path, index, 'id'], `${what} has this id already. Give each its own.`)
    seen.add(id)
  })
}

/** In place of a station whose shape is wrong, so that the rules can look at those beside it. */
function standIn(type: unknown, station: unknown): unknown {
  if (type === 'intervals') return { movement: 'unknown', work: 1, rest: 0 }
  if (type === 'holds') return { movement: 'unknown', seconds: 1 }
  const reps = isObject(station) ? repsSchema.safeParse(station['reps']) : undefined
  return { movement: 'unknown', reps: reps?.success ? reps.data : 1 }
}

/** A format as far as it can be read. */
interface ReadFormat {
  format: Format
  /** Of the body; null where what is wrong leaves it open. */
  seconds: number | null
  /** False where `rounds` or `times` is wrong, so that the most that the shape allows stands there. */
  hasRounds: boolean
}

/** In place of a number that is wrong, so that the rules can look at what is beside it. */
const STAND_IN_NUMBERS: Readonly<Record<string, number>> = {
  seconds: 1,
  cap: 1,
  rounds: MOST_ROUNDS,
  times: MOST_TIMES,
}

/** What a body's length comes from, beside its stations; but a time cap is as long whatever its rounds. */
const LENGTH_KEYS: ReadonlySet<string> = new Set(['seconds', 'cap', 'rounds', 'roundRest', 'times'])

/**
 * Without what does not belong there, and with a stand-in for each number and station that is wrong;
 * null where not even its type can be told, or it has no stations.
 */
function readFormat(raw: unknown): ReadFormat | null {
  const parsed = formatSchema.safeParse(raw)
  if (parsed.success) {
    return { format: parsed.data, seconds: bodySeconds(parsed.data), hasRounds: true }
  }
  if (!isObject(raw)) return null
  const mended: Record<string, unknown> = { ...raw }
  const stations: unknown[] = Array.isArray(raw['stations']) ? [...raw['stations']] : []
  let hasSeconds = true
  let hasRounds = true
  for (const issue of parsed.error.issues) {
    const [key, index] = issue.path
    if (key === undefined) {
      if (issue.code === 'unrecognized_keys') for (const one of issue.keys) delete mended[one]
    } else if (key === 'stations') {
      if (typeof index !== 'number') return null
      stations[index] = standIn(raw['type'], stations[index])
      if (raw['type'] === 'intervals' || raw['type'] === 'holds') hasSeconds = false
    } else {
      const name = String(key)
      delete mended[name]
      const number = STAND_IN_NUMBERS[name]
      if (number !== undefined) mended[name] = number
      if (name === 'rounds' || name === 'times') hasRounds = false
      const isCapped = name === 'rounds' && raw['type'] === 'for-time'
      if (LENGTH_KEYS.has(name) && !isCapped) hasSeconds = false
    }
  }
  if ('stations' in mended) mended['stations'] = stations
  const again = formatSchema.safeParse(mended)
  if (!again.success) return null
  return { format: again.data, seconds: hasSeconds ? bodySeconds(again.data) : null, hasRounds }
}

/** What a block's count-in depends on, its brief apart. */
const countInSchema = z.object({ kind: blockSchema.shape.kind, countIn: blockSchema.shape.countIn })

function readCountInSeconds(raw: Record<string, unknown>, isAfterRest: boolean): number {
  const head = countInSchema.safeParse(raw)
  if (!head.success) return 0
  const brief = raw['brief'] === undefined ? {} : { brief: '' }
  return countInSeconds({ ...head.data, ...brief }, isAfterRest)
}

function checkRules(found: Found, spec: unknown): void {
  const blocks = isObject(spec) && Array.isArray(spec['blocks']) ? spec['blocks'] : []
  checkUnique(found, blocks, ['blocks'], 'Another block')
  let seconds = 0
  let isAfterRest = false
  blocks.forEach((raw: unknown, index) => {
    if (!isObject(raw)) return
    const path: Path = ['blocks', index]
    checkLadders(found, raw['format'], [...path, 'format'])
    checkOptions(found, raw['format'], [...path, 'format'])
    checkUnique(found, raw['cues'], [...path, 'cues'], 'Another cue of this block')
    const read = readFormat(raw['format'])
    if (read) {
      checkRungs(found, read, [...path, 'format'])
      checkRest(found, read, [...path, 'format'])
      checkCues(found, read, raw['cues'], [...path, 'cues'])
      seconds += read.seconds ?? 0
    }
    seconds += readCountInSeconds(raw, isAfterRest)
    isAfterRest = raw['kind'] === 'rest' || read?.format.type === 'rest'
  })
  if (seconds > MOST_CLASS_SECONDS) {
    const minutes = Math.ceil(seconds / 60)
    found.add(
      ['blocks'],
      `The class is ${minutes} minutes of class time. Keep it to 180 (3 hours).`,
    )
  }
}

// ---------------------------------------------------------------------------------------------
// The doors

/**
 * Everything that is wrong with a session spec, in the order of shape first and rules after it; empty
 * where it is sound. Takes anything and never throws. Whether movements are in a library is not asked.
 */
export function check(input: unknown): Problem[] {
  const found = new Found()
  if (!isObject(input)) {
    found.add([], 'A class is an object with spec, title and blocks.')
    return found.problems
  }
  const parsed = sessionSpecSchema.safeParse(input)
  if (!parsed.success) for (const issue of parsed.error.issues) addIssue(found, input, issue, [])
  checkRules(found, input)
  return found.problems
}

/**
 * A bare spec or a published version `{ spec, movements }`, where movements are a list or an object by
 * slug. Gives the version (without movements for a bare spec), or every problem: of the spec with the
 * paths of a bare one, of movements under `movements`.
 */
export function parseSpecOrVersion(
  input: unknown,
): { version: PublishedVersion; problems?: never } | { problems: Problem[]; version?: never } {
  const isVersion =
    isObject(input) && (isObject(input['spec']) || ('movements' in input && !('blocks' in input)))
  const spec = isVersion ? input['spec'] : input
  const problems = check(spec)
  const movements: Movement[] = []
  if (isVersion) {
    const read = readMovements(input['movements'])
    movements.push(...read.movements)
    problems.push(...read.problems)
  }
  if (problems.length > 0) return { problems }
  return { version: { spec: sessionSpecSchema.parse(spec), movements } }
}

/** Movements with what a forecast needs; the words of coaching may be missing in a file made by hand. */
function readMovements(raw: unknown): { movements: Movement[]; problems: Problem[] } {
  const found = new Found()
  const movements: Movement[] = []
  if (raw === undefined || raw === null) return { movements, problems: [] }
  if (typeof raw !== 'object') {
    found.add(['movements'], 'Give a list of movements, or an object by their slugs.')
    return { movements, problems: found.problems }
  }
  const slugs = new Set<string>()
  for (const [key, value] of Array.isArray(raw) ? raw.entries() : Object.entries(raw)) {
    const path: Path = ['movements', key]
    if (!isObject(value)) {
      found.add(path, 'Give an object.')
      continue
    }
    const slug = value['slug'] ?? (typeof key === 'string' ? key : undefined)
    const options = filledOptions(value['options'])
    const filled = { ...BLANK, name: nameFrom(slug), ...value, slug, options }
    const parsed = movementSchema.safeParse(filled)
    if (parsed.success) movements.push(parsed.data)
    else {
      const root = { movements: { [key]: filled } }
      for (const issue of parsed.error.issues) addIssue(found, root, issue, path)
    }
    checkOptionNames(found, value['options'], [...path, 'options'])
    for (const one of optionReps(value['options'])) {
      const reps = repsSchema.safeParse(one.reps)
      if (reps.success) checkReps(found, reps.data, [...path, 'options', one.place, 'reps'])
    }
    if (typeof slug !== 'string') continue
    if (slugs.has(slug))
      found.add([...path, 'slug'], `The movement ${slug} is here twice. Give it once.`)
    slugs.add(slug)
  }
  return { movements, problems: found.problems }
}

function optionReps(options: unknown): { reps: unknown; place: number }[] {
  if (!Array.isArray(options)) return []
  return options.flatMap((option: unknown, place) =>
    isObject(option) && 'reps' in option ? [{ reps: option['reps'], place }] : [],
  )
}

/** A name where a file made by hand gives none. */
function nameFrom(slug: unknown): string {
  return typeof slug === 'string' && slug !== '' ? slug.slice(0, 60) : '?'
}

const BLANK = {
  pattern: 'mobility',
  position: 'standing',
  impact: 'none',
  joints: [],
  kit: [],
  start: '',
  steps: [],
  cues: [],
  faults: [],
  stopWhen: '',
} as const

function filledOptions(raw: unknown): unknown {
  const planned = {
    option: AS_PLANNED,
    name: 'As planned',
    level: 'as-planned',
    reasons: [],
    description: '',
  }
  if (raw === undefined) return [planned]
  if (!Array.isArray(raw)) return raw
  const options = raw.map((option: unknown) => {
    if (!isObject(option)) return option
    const slug = option['option'] ?? option['slug']
    const level = slug === AS_PLANNED ? 'as-planned' : 'easier'
    return { ...planned, level, name: nameFrom(slug), ...option, option: slug }
  })
  const hasPlanned = options.some((option) => isObject(option) && option['level'] === 'as-planned')
  return hasPlanned ? options : [...options, planned]
}
