/** The gym's movement library as its coaches see and write it. */
import { z } from 'zod'
import { movementOptionSchema, movementSchema } from '../engine/spec/movement'
import { AS_PLANNED } from '../engine/spec/names'
import { parseSpecOrVersion } from '../engine/spec/problems'
import { KIT_ITEMS, muscleText, REPS_HELP } from './library-words'
import { storable } from './text'

const MOST_LINES = 20
const MOST_OPTIONS = 30
const MOST_KIT = 20

const few = (what: string, most: number) => ({ error: `Give ${most} ${what} at most.` })

/** A movement as the form sends it: without a slug, and with none yet for an option that is new. */
const fieldsSchema = movementSchema.omit({ slug: true }).extend({
  kit: movementSchema.shape.kit.max(MOST_KIT, few('pieces of kit', MOST_KIT)),
  steps: movementSchema.shape.steps.max(MOST_LINES, few('steps', MOST_LINES)),
  cues: movementSchema.shape.cues.max(MOST_LINES, few('cues', MOST_LINES)),
  faults: movementSchema.shape.faults.max(MOST_LINES, few('faults', MOST_LINES)),
  options: z
    .array(
      movementOptionSchema.extend({
        option: z.union([z.literal(''), movementOptionSchema.shape.option]),
      }),
    )
    .max(MOST_OPTIONS, few('options', MOST_OPTIONS)),
})
export type MovementFields = z.infer<typeof fieldsSchema>

const namesSchema = z.object({
  /** Null: a new movement. */
  slug: z.string().max(60).nullable(),
  basedOn: z.string().max(100).nullable(),
  /** Puts this in place of what was changed meanwhile. */
  over: z.boolean(),
})
export type MovementChange = z.infer<typeof namesSchema> & { fields: MovementFields }

export const movementNameInput = z.object({ slug: z.string().min(1).max(60) })
export const backToBuiltInInput = movementNameInput.extend({ basedOn: z.string().min(1).max(100) })

// ---------------------------------------------------------------------------------------------
// Reps of an option as they are typed

const THEN = /,\s*then\s+(hold|repeat|done)\s*$/i

/** The reps that a text stands for; whatever cannot be read comes back as something that no schema takes. */
function readReps(typed: string): unknown {
  const text = typed.trim()
  if (/^\d+$/.test(text)) return Number(text)
  const then = THEN.exec(text)?.[1]?.toLowerCase()
  const more = then === undefined ? {} : { then }
  const body = text.replace(THEN, '').trim()
  const ladder = /^from\s+(\d+)\s+by\s+([+-]?\d+)(?:\s+to\s+(\d+))?$/i.exec(body)
  if (ladder) {
    const [, from, step, to] = ladder
    return {
      from: Number(from),
      step: Number(step),
      ...(to === undefined ? {} : { to: Number(to) }),
      ...more,
    }
  }
  if (/^\d+(\s*,\s*\d+)*\s*,?$/.test(body)) {
    return {
      list: body
        .split(',')
        .map((one) => one.trim())
        .filter(Boolean)
        .map(Number),
      ...more,
    }
  }
  return null
}

// ---------------------------------------------------------------------------------------------
// The form

const textOf = (form: FormData, name: string): string => {
  const value = form.get(name)
  return typeof value === 'string' ? storable(value).trim() : ''
}
const linesOf = (form: FormData, name: string): string[] =>
  textOf(form, name)
    .split(/\r?\n/)
    .map((line) => line.trim())
    .filter(Boolean)
const listOf = (form: FormData, name: string): string[] =>
  form.getAll(name).filter((value): value is string => typeof value === 'string')
/** 2.5 of '2.5' or '2,5'; NaN of what is no number. */
const numberOf = (text: string): number => Number(text.replace(',', '.'))
const given = <K extends string>(key: K, value: unknown): Partial<Record<K, unknown>> =>
  value === undefined ? {} : ({ [key]: value } as Record<K, unknown>)

function timingOf(form: FormData, prefix: string): object {
  const tempo = [0, 1, 2, 3].map((index) => textOf(form, `${prefix}tempo.${index}`))
  const pace = textOf(form, `${prefix}secondsPerRep`)
  const change = textOf(form, `${prefix}change`)
  const sides = textOf(form, `${prefix}sides`)
  const figure = textOf(form, `${prefix}figure`)
  return {
    ...(tempo.every((one) => one === '')
      ? {}
      : { tempo: tempo.map((one) => (one === '' ? Number.NaN : numberOf(one))) }),
    ...given('secondsPerRep', pace === '' ? undefined : numberOf(pace)),
    ...given('change', change === '' ? undefined : numberOf(change)),
    ...given('sides', sides === '' ? undefined : sides),
    ...given('figure', figure === '' ? undefined : figure),
  }
}

/** The keys of a repeated part (`options.k3.name`), in the form's order. */
function keysOf(form: FormData, part: string): string[] {
  const keys = [...form.keys()].flatMap((name) => {
    const [head, key, rest] = name.split('.', 3)
    return head === part && key && rest ? [key] : []
  })
  return [...new Set(keys)]
}

/** What the form holds, in the shape of a movement, and which of its keys a place of a list stands for. */
function read(form: FormData): { raw: Record<string, unknown>; keys: Record<string, string[]> } {
  const optionKeys = keysOf(form, 'options')
  const plannedAt = optionKeys.findIndex(
    (key) => textOf(form, `options.${key}.option`) === AS_PLANNED,
  )
  const faultKeys = keysOf(form, 'faults').filter(
    (key) =>
      textOf(form, `faults.${key}.fault`) !== '' || textOf(form, `faults.${key}.correction`) !== '',
  )
  const [primary, secondary] = [listOf(form, 'primary'), listOf(form, 'secondary')]
  const kit = KIT_ITEMS.flatMap((item) => {
    const count = Number(textOf(form, `kit.${item}`))
    return Array.from(
      { length: Number.isInteger(count) ? Math.min(count, MOST_KIT + 1) : 0 },
      () => item,
    )
  })
  const raw = {
    name: textOf(form, 'name'),
    pattern: textOf(form, 'pattern'),
    position: textOf(form, 'position'),
    impact: textOf(form, 'impact'),
    joints: listOf(form, 'joints'),
    ...(primary.length + secondary.length > 0 ? { muscles: { primary, secondary } } : {}),
    kit: [...kit, ...linesOf(form, 'otherKit').map((line) => line.toLocaleLowerCase('en'))],
    ...timingOf(form, ''),
    start: textOf(form, 'start'),
    steps: linesOf(form, 'steps'),
    cues: linesOf(form, 'cues'),
    faults: faultKeys.map((key) => ({
      fault: textOf(form, `faults.${key}.fault`),
      correction: textOf(form, `faults.${key}.correction`),
    })),
    stopWhen: textOf(form, 'stopWhen'),
    options: optionKeys.map((key, index) => {
      const prefix = `options.${key}.`
      const reps = textOf(form, `${prefix}reps`)
      return {
        option: textOf(form, `${prefix}option`),
        name: textOf(form, `${prefix}name`),
        level: index === plannedAt ? 'as-planned' : index < plannedAt ? 'easier' : 'harder',
        reasons: index === plannedAt ? [] : listOf(form, `${prefix}reasons`),
        description: textOf(form, `${prefix}description`),
        ...timingOf(form, prefix),
        ...given('reps', reps === '' ? undefined : readReps(reps)),
      }
    }),
  }
  return { raw, keys: { options: optionKeys, faults: faultKeys } }
}

/** Where each line of a text came from does not matter to a reader: which line it is does. */
const LINES: Record<string, string> = { steps: 'Step', cues: 'Cue' }

/** The field that an issue's path stands for, and how its message reads there. */
function placed(
  path: readonly (string | number)[],
  message: string,
  keys: Record<string, string[]>,
): [name: string, message: string] {
  const [head, place, ...rest] = path
  if (head === 'kit') return ['otherKit', message]
  if (head === 'muscles') return [String(place), message]
  if (head === 'tempo') return ['tempo.0', TEMPO_HELP]
  if (typeof head === 'string' && typeof place === 'number') {
    if (head in LINES) return [head, `${LINES[head]} ${place + 1}: ${message}`]
    const key = keys[head]?.[place]
    if (key !== undefined && rest.length > 0) {
      const field = String(rest[0])
      if (field === 'tempo') return [`${head}.${key}.tempo.0`, TEMPO_HELP]
      return [
        `${head}.${key}.${field}`,
        field === 'reps' && rest.length === 1 ? REPS_HELP : message,
      ]
    }
    return [head, message]
  }
  return [String(head), message]
}

const TEMPO_HELP = 'Give all four figures, seconds from 0 to 60, or none.'

function* ownRules(
  fields: MovementFields,
): Generator<[path: (string | number)[], message: string]> {
  const names = new Set<string>()
  if (fields.options.filter((one) => one.level === 'as-planned').length !== 1) {
    yield [['options'], 'One option is the planned one.']
  }
  for (const [index, option] of fields.options.entries()) {
    const name = option.name.toLocaleLowerCase('en')
    if (names.has(name)) yield [['options', index, 'name'], 'Another option has this name.']
    names.add(name)
    if (option.level !== 'as-planned' && option.reasons.length === 0) {
      yield [['options', index, 'reasons'], 'Say which reason it answers.']
    }
    if (option.level === 'easier' && option.reasons.includes('wants-more')) {
      yield [['options', index, 'reasons'], 'An easier option is not for somebody who wants more.']
    }
  }
  const twice = fields.muscles?.secondary.find((one) => fields.muscles?.primary.includes(one))
  if (twice) {
    yield [
      ['muscles', 'secondary'],
      `${muscleText(twice)} is among those that work most already. Take it out of one.`,
    ]
  }
  for (const [index, { fault }] of fields.faults.entries()) {
    if (fault === '') yield [['faults', index, 'fault'], 'Say which fault this corrects.']
  }
  // Ladders that never come to their end are told as a class's own are.
  const { problems = [] } = parseSpecOrVersion({
    spec: {},
    movements: [
      {
        ...fields,
        slug: 'x',
        options: fields.options.map((one, index) => ({ ...one, option: `o${index}` })),
      },
    ],
  })
  for (const { path, message } of problems) {
    const place = /^movements\[0\]\.options\[(\d+)\]\.reps/.exec(path)?.[1]
    if (place !== undefined) yield [['options', Number(place), 'reps', 'ladder'], message]
  }
}

/**
 * A movement as its form sent it. Options before the planned one are easier, those after it harder. What is
 * wrong comes by the names of the form's fields, in their order.
 */
export function readMovementForm(
  form: FormData,
): { change: MovementChange; fields?: never } | { change?: never; fields: Record<string, string> } {
  const { raw, keys } = read(form)
  const parsed = fieldsSchema.safeParse(raw)
  const issues: [(string | number)[], string][] = parsed.success
    ? [...ownRules(parsed.data)]
    : parsed.error.issues.map((issue) => [
        issue.path.map((key) => (typeof key === 'symbol' ? String(key) : key)),
        NEEDED[issue.path.join('.')] ?? issue.message,
      ])
  if (parsed.success && issues.length === 0) {
    const names = namesSchema.safeParse({
      slug: textOf(form, 'slug') || null,
      basedOn: textOf(form, 'basedOn') || null,
      over: form.get('over') !== null,
    })
    if (names.success) return { change: { ...names.data, fields: parsed.data } }
    return { fields: { name: 'This form is broken. Load the page anew.' } }
  }
  const fields: Record<string, string> = {}
  for (const [path, message] of issues) {
    const [name, text] = placed(path, message, keys)
    fields[name] ??= text
  }
  return { fields }
}

/** Where a choice is missing, the list of all choices would not help. */
const NEEDED: Record<string, string> = {
  pattern: 'Choose the pattern.',
  position: 'Choose the position.',
  impact: 'Choose the impact.',
}

/** A slug of the trade's kind from a name: 'Élan squat (slow)' → 'elan-squat-slow'; `taken` ones get a number. */
export function freeSlug(name: string, taken: ReadonlySet<string>, plain: string): string {
  const base =
    name
      .normalize('NFKD')
      .replace(/\p{M}/gu, '')
      .toLowerCase()
      .replace(/[^a-z0-9]+/g, '-')
      .replace(/^-+|-+$/g, '')
      .slice(0, 55)
      .replace(/-+$/, '') || plain
  if (!taken.has(base)) return base
  let number = 2
  while (taken.has(`${base}-${number}`)) number += 1
  return `${base}-${number}`
}
