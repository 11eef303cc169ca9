/** Classes of a gym as its coaches plan them. Instants are ISO 8601 text. */
import { z } from 'zod'
import type { PublishedVersion } from '../engine/spec/version'

export interface PlannedClassSummary {
  classId: string
  title: string
  focus: string | null
  realLengthMs: number
  versions: number
  publishedAt: string
  publishedBy: string | null
  /** Dates ahead on which it is scheduled. */
  ahead: number
}

export interface PlannedClass {
  classId: string
  /** The latest. */
  versionId: string
  version: PublishedVersion
  /** Latest first. */
  versions: { versionId: string; publishedAt: string; publishedBy: string | null }[]
  ahead: number
}

/** Of a file that is imported; a form carries 1 MB at most. */
export const MOST_CAPTION_LETTERS = 700_000

export const importCuesInput = z.object({
  classId: z.string().min(1).max(100),
  /** The version that the coach saw. */
  basedOn: z.string().min(1).max(100),
  block: z.string().min(1, 'Choose the block that the cues are for.').max(40),
  timesFrom: z.enum(['block', 'class'], { message: 'Say from where the times count.' }),
  captions: z
    .string()
    .min(1, 'Choose a file, or paste its text.')
    .max(MOST_CAPTION_LETTERS, 'That is more than a block can hold: 700,000 letters at most.'),
  /** Whether the dates ahead take the new version. */
  ahead: z.boolean(),
})
