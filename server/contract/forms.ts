/** What forms send. Parsed once, at the edge. */
import { z } from 'zod'
import { parseWeights, WEIGHED_ITEMS } from '../engine/fit/weights'
import { HEALTH_LIMITS, HEALTH_QUESTIONS, type HealthAnswers } from '../engine/fit/screening'
import { PASSWORD_MOST, passwordProblem } from './passwords'
import { storable } from './text'

/** A character outside the first plane counts twice in a string's length, once in a password's. */
const LONGEST_PASSWORD = PASSWORD_MOST * 2

export const signInInput = z.object({
  email: z
    .string()
    .trim()
    .min(1, 'Give your e-mail address.')
    .max(254, 'That is longer than any e-mail address.')
    .transform(storable),
  password: z
    .string()
    .min(1, 'Give your password.')
    .max(LONGEST_PASSWORD, 'That is longer than any password here.'),
  next: z.string().max(500).optional(),
})

export const changePasswordInput = z
  .object({
    current: z.string().min(1, 'Give your present password.').max(LONGEST_PASSWORD),
    wanted: z.string().superRefine((password, context) => {
      const problem = passwordProblem(password)
      if (problem) context.addIssue({ code: 'custom', message: problem })
    }),
    again: z.string(),
  })
  .refine((input) => input.wanted === input.again, {
    path: ['again'],
    message: 'The two new passwords differ.',
  })

const answer = z.enum(['yes', 'no'], { message: 'Answer with yes or no.' })
export const healthInput = z.object({
  answers: z
    .object(Object.fromEntries(HEALTH_QUESTIONS.map((question) => [question, answer])))
    .transform(
      (answers) =>
        Object.fromEntries(
          HEALTH_QUESTIONS.map((question) => [question, answers[question] === 'yes']),
        ) as HealthAnswers,
    ),
  cleared: z.boolean(),
  limits: z.array(z.enum(HEALTH_LIMITS.map((one) => one.limit))).max(HEALTH_LIMITS.length),
})

export const kitInput = z
  .record(
    z
      .string()
      .max(60)
      .regex(/^[\p{L}\p{N}][\p{L}\p{N} -]*$/u),
    z.number().int().min(0).max(20),
  )
  .refine((kit) => Object.keys(kit).length <= 100, 'That is more kit than fits here.')

/** What a member writes of the weights of their kit. */
export const weightsInput = z.partialRecord(
  z.enum(WEIGHED_ITEMS),
  z
    .string()
    .max(200, 'That is longer than 20 weights need.')
    .transform((text, context) => {
      const read = parseWeights(text)
      if ('kilograms' in read) return read.kilograms
      context.addIssue({ code: 'custom', message: read.problem })
      return z.NEVER
    }),
)

/** Only a path of this product may follow a sign-in: `/…`, never `//…` nor another address. */
export function safeNext(next: string | null | undefined): string | null {
  if (!next || !next.startsWith('/') || /^\/[/\\]/.test(next) || /[\u0000-\u001f\\]/.test(next))
    return null
  return next
}

/** Messages beside fields, the first of each, by the field's name. */
export function fieldMessages(error: z.ZodError): Record<string, string> {
  const fields: Record<string, string> = {}
  for (const issue of error.issues) {
    const name = issue.path.map(String).join('.')
    fields[name] ??= issue.message
  }
  return fields
}
