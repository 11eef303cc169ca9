/**
 * The shape of a stored class (spec version 1). Shapes and limits only; rules that span several
 * fields (ladders, anchors, class length) live in `problems.ts`.
 */
import { z } from 'zod'

const whole = (min: number, max: number) => {
  const error = `Give a whole number from ${grouped(min)} to ${grouped(max)}.`
  return z.number({ error }).int({ error }).min(min, { error }).max(max, { error })
}

function grouped(value: number): string {
  return String(value).replace(/\B(?=(\d{3})+$)/g, ',')
}

/** Text by its characters as people count them, not by UTF-16 units. */
export const text = (min: number, max: number) => {
  const error = `Give text of ${min === 0 ? 'at most' : `${min} to`} ${max} characters.`
  return z.string({ error }).refine(
    (value) => {
      const length = [...value].length
      return length >= min && length <= max
    },
    { error },
  )
}

/** Seconds that may have one decimal: tempo figures and change cost. */
const tenths = (min: number, max: number) => {
  const error = `Give seconds from ${min} to ${max}, with one decimal at most.`
  return z
    .number({ error })
    .min(min, { error })
    .max(max, { error })
    .refine((value) => Math.abs(value * 10 - Math.round(value * 10)) < 1e-9, { error })
}

export const oneOf = <const T extends readonly [string, ...string[]]>(values: T) =>
  z.enum(values, { error: `Choose one of: ${values.join(', ')}.` })
const list = <T extends z.ZodType>(item: T, min: number, max: number, what: string) => {
  const error = `Give ${min === 0 ? 'at most' : `${min} to`} ${max} ${what}.`
  return z.array(item, { error }).min(min, { error }).max(max, { error })
}

export const BLOCK_KINDS = ['warm-up', 'work', 'finisher', 'mobility', 'rest', 'cool-down'] as const
export const CUE_KINDS = ['form', 'breath', 'pace', 'safety', 'option', 'kit', 'next'] as const
export const SIDES = ['together', 'alternate', 'each'] as const

const ID_ERROR = 'Give an id of 1 to 40 small letters, digits and hyphens.'
const SLUG_ERROR = 'Give a name of 1 to 60 small letters, digits and hyphens.'

export const idSchema = z
  .string({ error: ID_ERROR })
  .regex(/^[a-z0-9-]{1,40}$/, { error: ID_ERROR })
export const slugSchema = z
  .string({ error: SLUG_ERROR })
  .regex(/^[a-z0-9-]{1,60}$/, { error: SLUG_ERROR })
export const sidesSchema = oneOf(SIDES)

/** Seconds eccentric, bottom, concentric, top: the trade's four figures. */
export const tempoSchema = z.tuple([tenths(0, 60), tenths(0, 60), tenths(0, 60), tenths(0, 60)], {
  error: 'Give four figures: seconds eccentric, bottom, concentric, top.',
})
export const changeSchema = tenths(0, 600)

const repCount = whole(1, 500)
export const ladderSchema = z.strictObject({
  from: repCount,
  step: whole(-500, 500),
  to: repCount.optional(),
  then: oneOf(['hold', 'repeat', 'done']).optional(),
})
export const repListSchema = z.strictObject({
  list: list(repCount, 1, 40, 'entries'),
  then: oneOf(['hold', 'repeat', 'done']).optional(),
})
export const repsSchema = z.union([repCount, ladderSchema, repListSchema])

const optionUseSchema = z.strictObject({
  option: slugSchema,
  reps: repsSchema.optional(),
  sides: sidesSchema.optional(),
})

const noteSchema = text(1, 80).optional()
const optionUsesSchema = list(optionUseSchema, 0, 30, 'options').optional()

export const stationSchema = z.strictObject({
  movement: slugSchema,
  reps: repsSchema,
  sides: sidesSchema.optional(),
  tempo: tempoSchema.optional(),
  change: changeSchema.optional(),
  note: noteSchema,
  options: optionUsesSchema,
})
export const intervalStationSchema = z.strictObject({
  movement: slugSchema,
  work: whole(1, 10_800),
  rest: whole(0, 3_600),
  sides: sidesSchema.optional(),
  switch: whole(0, 3_600).optional(),
  note: noteSchema,
  options: optionUsesSchema,
})
export const holdStationSchema = z.strictObject({
  movement: slugSchema,
  seconds: whole(1, 10_800),
  sides: sidesSchema.optional(),
  switch: whole(0, 3_600).optional(),
  rest: whole(0, 3_600).optional(),
  note: noteSchema,
  options: optionUsesSchema,
})

/** The most that a block can have. */
export const MOST_STATIONS = 12
export const MOST_ROUNDS = 100
export const MOST_TIMES = 180
const stations = <T extends z.ZodType>(station: T) => list(station, 1, MOST_STATIONS, 'stations')

export const formatSchema = z.discriminatedUnion('type', [
  z.strictObject({
    type: z.literal('rounds'),
    seconds: whole(1, 10_800),
    counted: z.boolean({ error: 'Give true or false.' }).optional(),
    stations: stations(stationSchema),
  }),
  z.strictObject({
    type: z.literal('for-time'),
    rounds: whole(1, MOST_ROUNDS),
    cap: whole(1, 10_800),
    stations: stations(stationSchema),
  }),
  z.strictObject({
    type: z.literal('intervals'),
    rounds: whole(1, MOST_ROUNDS),
    stations: stations(intervalStationSchema),
    roundRest: whole(0, 3_600).optional(),
  }),
  z.strictObject({
    type: z.literal('every'),
    seconds: whole(1, 10_800),
    times: whole(1, MOST_TIMES),
    stations: stations(stationSchema),
  }),
  z.strictObject({ type: z.literal('holds'), stations: stations(holdStationSchema) }),
  z.strictObject({
    type: z.literal('rest'),
    seconds: whole(1, 10_800),
    atLeast: whole(0, 10_800).optional(),
    atMost: whole(0, 10_800).optional(),
  }),
])

export const anchorSchema = z.union([
  z.strictObject({ from: oneOf(['start', 'end']), s: whole(0, 10_800) }),
  z.strictObject({ round: whole(1, 10_000) }),
  z.strictObject({ station: whole(0, MOST_STATIONS - 1), round: whole(1, 10_000).optional() }),
])

export const cueSchema = z.strictObject({
  id: idSchema,
  text: text(1, 80),
  spoken: text(1, 200).optional(),
  kind: oneOf(CUE_KINDS),
  say: z.boolean({ error: 'Give true or false.' }).optional(),
  show: z
    .strictObject({ station: whole(0, MOST_STATIONS - 1), option: slugSchema.optional() })
    .optional(),
  at: anchorSchema,
})

export const blockSchema = z.strictObject({
  id: idSchema,
  kind: oneOf(BLOCK_KINDS),
  title: text(1, 80),
  brief: text(1, 400).optional(),
  briefSeconds: whole(0, 300).optional(),
  countIn: whole(0, 15).optional(),
  format: formatSchema,
  cues: list(cueSchema, 0, 60, 'cues').optional(),
})

const kitItemSchema = z.strictObject({
  item: text(1, 60),
  count: whole(1, 100),
  optional: z.boolean({ error: 'Give true or false.' }).optional(),
})

export const sessionSpecSchema = z.strictObject({
  spec: z.literal(1, { error: 'Give 1: the only version of the session spec.' }),
  title: text(1, 80),
  focus: text(1, 120).optional(),
  intendedRpe: whole(0, 10).optional(),
  kit: list(kitItemSchema, 0, 20, 'items').optional(),
  blocks: list(blockSchema, 1, 40, 'blocks'),
})

export type SessionSpec = z.infer<typeof sessionSpecSchema>
export type Block = z.infer<typeof blockSchema>
export type BlockKind = Block['kind']
export type Format = z.infer<typeof formatSchema>
export type FormatType = Format['type']
export type Station = z.infer<typeof stationSchema>
export type IntervalStation = z.infer<typeof intervalStationSchema>
export type HoldStation = z.infer<typeof holdStationSchema>
export type AnyStation = Station | IntervalStation | HoldStation
export type Reps = z.infer<typeof repsSchema>
export type Sides = z.infer<typeof sidesSchema>
export type Tempo = z.infer<typeof tempoSchema>
export type Cue = z.infer<typeof cueSchema>
export type Anchor = z.infer<typeof anchorSchema>
