/** A movement as it is frozen into a published version, and the trade's lists that describe one. */
import { z } from 'zod'
import { PATTERNS, POSITIONS, IMPACTS, JOINTS, MUSCLES, REASONS, LEVELS } from './names'
import {
  changeSchema,
  oneOf,
  repsSchema,
  sidesSchema,
  slugSchema,
  tempoSchema,
  text,
} from './schema'

const SECONDS_PER_REP_ERROR = 'Give seconds above 0, 600 at most.'

const timing = {
  /** Over `secondsPerRep` where both are given. */
  tempo: tempoSchema.optional(),
  secondsPerRep: z
    .number({ error: SECONDS_PER_REP_ERROR })
    .positive({ error: SECONDS_PER_REP_ERROR })
    .max(600, { error: SECONDS_PER_REP_ERROR })
    .optional(),
}

export const movementOptionSchema = z.object({
  option: slugSchema,
  name: text(1, 60),
  level: oneOf(LEVELS),
  reasons: z.array(oneOf(REASONS)),
  /** One sentence: what changes. */
  description: text(0, 200),
  ...timing,
  reps: repsSchema.optional(),
  sides: sidesSchema.optional(),
  change: changeSchema.optional(),
  /** A figure of its own where the shape differs; else the movement's. */
  figure: slugSchema.optional(),
})

export const movementSchema = z.object({
  slug: slugSchema,
  name: text(1, 60),
  pattern: oneOf(PATTERNS),
  position: oneOf(POSITIONS),
  impact: oneOf(IMPACTS),
  joints: z.array(oneOf(JOINTS)),
  /** What works most, and what helps. Versions published before this was kept have none. */
  muscles: z
    .object({ primary: z.array(oneOf(MUSCLES)), secondary: z.array(oneOf(MUSCLES)) })
    .optional(),
  /** How it is done as a rule: what a planner puts into a station. */
  sides: sidesSchema.optional(),
  kit: z.array(text(1, 60)),
  ...timing,
  /** Seconds to get from this movement to the station after it. */
  change: changeSchema.optional(),
  figure: slugSchema.optional(),
  start: text(0, 300),
  steps: z.array(text(0, 200)),
  cues: z.array(text(0, 80)),
  faults: z.array(z.object({ fault: text(0, 120), correction: text(0, 160) })),
  stopWhen: text(0, 200),
  /** Easier first, then as planned, then harder; an `as-planned` one is always among them. */
  options: z.array(movementOptionSchema).min(1, { error: 'Give at least one option.' }),
})

export type Joint = (typeof JOINTS)[number]
export type Reason = (typeof REASONS)[number]
export type Muscle = (typeof MUSCLES)[number]
export type Level = (typeof LEVELS)[number]
export type MovementOption = z.infer<typeof movementOptionSchema>
export type Movement = z.infer<typeof movementSchema>
