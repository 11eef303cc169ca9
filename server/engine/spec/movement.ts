/** A movement as it is frozen into a published version, and the trade's lists that describe one. */
import { z } from 'zod'
import { PATTERNS, POSITIONS, IMPACTS, JOINTS, REASONS, LEVELS } from './names'
import { changeSchema, repsSchema, sidesSchema, slugSchema, tempoSchema } from './schema'

const timing = {
  /** Over `secondsPerRep` where both are given. */
  tempo: tempoSchema.optional(),
  secondsPerRep: z.number().positive().max(600).optional(),
}

export const movementOptionSchema = z.object({
  option: slugSchema,
  name: z.string().min(1).max(60),
  level: z.enum(LEVELS),
  reasons: z.array(z.enum(REASONS)),
  /** One sentence: what changes. */
  description: z.string().max(200),
  ...timing,
  reps: repsSchema.optional(),
  sides: sidesSchema.optional(),
  change: changeSchema.optional(),
  /** A figure of its own where the shape differs; else the movement's. */
  figure: slugSchema.optional(),
})

export const movementSchema = z.object({
  slug: slugSchema,
  name: z.string().min(1).max(60),
  pattern: z.enum(PATTERNS),
  position: z.enum(POSITIONS),
  impact: z.enum(IMPACTS),
  joints: z.array(z.enum(JOINTS)),
  kit: z.array(z.string().min(1).max(60)),
  ...timing,
  /** Seconds to get from this movement to the station after it. */
  change: changeSchema.optional(),
  figure: slugSchema.optional(),
  start: z.string().max(300),
  steps: z.array(z.string().max(200)),
  cues: z.array(z.string().max(80)),
  faults: z.array(z.object({ fault: z.string().max(120), correction: z.string().max(160) })),
  stopWhen: z.string().max(200),
  /** Easier first, then as planned, then harder; an `as-planned` one is always among them. */
  options: z.array(movementOptionSchema).min(1),
})

export type Joint = (typeof JOINTS)[number]
export type Reason = (typeof REASONS)[number]
export type Level = (typeof LEVELS)[number]
export type MovementOption = z.infer<typeof movementOptionSchema>
export type Movement = z.infer<typeof movementSchema>
