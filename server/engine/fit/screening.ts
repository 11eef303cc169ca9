/** The health questions: what is asked, and what each answer changes. Own wording; never a diagnosis. */

export const HEALTH_QUESTIONS = [
  'chest-pain',
  'faint-or-dizzy',
  'breathless',
  'only-supervised',
  'known-condition',
  'medicine',
  'recent-injury',
  'pregnant-or-recent-birth',
] as const
export type HealthQuestion = (typeof HEALTH_QUESTIONS)[number]
export type HealthAnswers = Record<HealthQuestion, boolean>
