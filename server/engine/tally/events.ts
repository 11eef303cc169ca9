/** What a member does in class: the only thing that a player stores. */
import { z } from 'zod'
import type { RED_FLAG_SIGNS } from './names'
import { HURT_PLACES, STOP_SIGNS, COUNTINGS, COUNTED_BY } from './names'
import { idSchema, slugSchema } from '../spec/schema'
import { REASONS } from '../spec/names'

const ms = z
  .number()
  .int()
  .min(0)
  .max(1_000 * 60 * 60 * 24 * 7)
const round = z.number().int().min(1).max(1_000_000)
const station = z.number().int().min(0).max(1_000_000)
const note = z.string().max(1_000).optional()

const common = {
  /** UUIDv7 made by the client; two events with the same id are one. */
  id: z.string().min(1).max(64),
  device: z.string().min(1).max(100),
  /** Lamport clock: 1 + the highest this device has seen in the attempt. */
  seq: z.number().int().min(0).max(Number.MAX_SAFE_INTEGER),
  classMs: ms,
  /** The computer's clock, kept and never ordered by. */
  wallMs: z.number().int(),
}
const event = <T extends string, S extends z.ZodRawShape>(type: T, shape: S) =>
  z.strictObject({ ...common, type: z.literal(type), ...shape })

const startOptionSchema = z.strictObject({
  block: idSchema,
  station,
  option: slugSchema,
  from: z.enum(['fitted', 'chosen', 'coach']),
})

export const eventSchema = z.discriminatedUnion('type', [
  event('started', {
    version: z.string().min(1).max(100),
    counting: z.enum(COUNTINGS),
    options: z.array(startOptionSchema).max(480),
  }),
  event('brief-passed', { block: idSchema }),
  event('round-done', { block: idSchema, round, by: z.enum(COUNTED_BY) }),
  event('round-undone', { block: idSchema, round, by: z.enum(COUNTED_BY) }),
  event('reps-noted', { block: idSchema, round, reps: z.number().int().min(0).max(100_000) }),
  event('block-finished', { block: idSchema, ms }),
  event('option-chosen', {
    block: idSchema,
    station,
    option: slugSchema,
    reason: z.enum(REASONS).optional(),
  }),
  event('load-noted', { block: idSchema, station, kilograms: z.number().min(0).max(500) }),
  event('lead-followed', { block: idSchema }),
  event('lead-left', { block: idSchema }),
  event('paused', {}),
  event('resumed', {}),
  event('rest-taken', { block: idSchema, segment: station, ms }),
  event('rest-lengthened', { block: idSchema, segment: station, ms }),
  event('rest-cut', { block: idSchema, segment: station, ms }),
  event('block-skipped', { block: idSchema, reason: z.string().max(200).optional() }),
  event('hurt', {
    block: idSchema.optional(),
    station: station.optional(),
    where: z.enum(HURT_PLACES),
    note,
  }),
  event('stopped', {
    sign: z.enum(STOP_SIGNS).optional(),
    where: z.string().max(60).optional(),
    note,
  }),
  event('finished', {}),
  event('rated', {
    rpe: z.number().min(0).max(10),
    note,
    hurts: z
      .array(z.strictObject({ where: z.enum(HURT_PLACES), note }))
      .max(20)
      .optional(),
  }),
])

export type ClassEvent = z.infer<typeof eventSchema>
export type ClassEventType = ClassEvent['type']
export type EventOf<T extends ClassEventType> = Extract<ClassEvent, { type: T }>
export type HurtPlace = (typeof HURT_PLACES)[number]
export type RedFlagSign = (typeof RED_FLAG_SIGNS)[number]
export type StopSign = (typeof STOP_SIGNS)[number]
export type Counting = (typeof COUNTINGS)[number]
export type CountedBy = (typeof COUNTED_BY)[number]
