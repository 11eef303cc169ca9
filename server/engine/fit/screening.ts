/**
 * The health questions: what is asked, and what each answer changes. Own wording, after the factors
 * that published screening weighs (symptoms, known disease, supervision); never a diagnosis.
 */

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

/** `blocks`: not played until cleared; `clearance`: cleared or with limits; `note`: the coach is told, nothing else. */
type HealthConsequence = 'blocks' | 'clearance' | 'note'

interface HealthQuestionText {
  question: string
  /** Said beside the question: what a yes changes. */
  change: string
  consequence: HealthConsequence
}

const BLOCKS_CHANGE =
  'With yes you can read classes, and play them once you state that a licensed professional has cleared you.'
const CLEARANCE_CHANGE =
  'With yes you state that you have been cleared, or choose limits for yourself. Then you can play. Your coach sees which.'

export const HEALTH_QUESTION_TEXT: Readonly<Record<HealthQuestion, HealthQuestionText>> = {
  'chest-pain': {
    question: 'Do you get pain or pressure in the chest, at rest or when you move?',
    change: BLOCKS_CHANGE,
    consequence: 'blocks',
  },
  'faint-or-dizzy': {
    question: 'Have you fainted, or been dizzy enough to lose your balance, in recent months?',
    change: BLOCKS_CHANGE,
    consequence: 'blocks',
  },
  breathless: {
    question: 'Are you short of breath at rest or with light effort, such as a slow walk?',
    change: BLOCKS_CHANGE,
    consequence: 'blocks',
  },
  'only-supervised': {
    question: 'Has a doctor told you to exercise only under supervision?',
    change: BLOCKS_CHANGE,
    consequence: 'blocks',
  },
  'known-condition': {
    question:
      'Do you have a known condition of the heart, the circulation or the kidneys, or diabetes?',
    change: CLEARANCE_CHANGE,
    consequence: 'clearance',
  },
  medicine: {
    question: 'Do you take medicine for your heart or your blood pressure?',
    change: CLEARANCE_CHANGE,
    consequence: 'clearance',
  },
  'recent-injury': {
    question: 'Have you had an injury or an operation lately that exercise could trouble?',
    change: CLEARANCE_CHANGE,
    consequence: 'clearance',
  },
  'pregnant-or-recent-birth': {
    question: 'Are you pregnant, or have you given birth recently?',
    change:
      'With yes your coach is told, so that you can talk about it. Nothing is chosen for you, and you can play.',
    consequence: 'note',
  },
}

/** Asked before every class. */
export const TODAY_QUESTION = 'Anything new today: illness, pain, dizziness?'

export const CLEARANCE_STATEMENT =
  'I state that a licensed professional who knows my answers has cleared me to exercise.'

/** Limits that a member can choose instead of clearance; the coach reads the label. */
export const HEALTH_LIMITS = [
  { limit: 'easy-effort', label: 'I keep to an effort at which I can talk in sentences' },
  { limit: 'light-loads', label: 'I use light loads only' },
  { limit: 'no-jumping', label: 'I do not jump' },
  { limit: 'no-breath-holding', label: 'I do not hold my breath or strain' },
  { limit: 'spare-the-injury', label: 'I leave out what troubles the injury' },
  { limit: 'get-up-slowly', label: 'I get up from the floor slowly' },
] as const

const DAY_MS = 86_400_000

export interface StandingInput {
  /** The latest answers, and when they were given; null where there are none. Instants are epoch milliseconds. */
  answers: HealthAnswers | null
  answeredAtMs: number | null
  /** When the member stated clearance for these answers; null where not. */
  clearedAtMs: number | null
  limits: readonly string[]
  /** The gym's setting: answers are good for so many days. */
  intervalDays: number
  nowMs: number
}

export interface Standing {
  /**
   * `open`: must be answered (again); `blocked`: read, not play, until cleared; `clearance`: state
   * clearance or choose limits first; `clear`: may play.
   */
  standing: 'open' | 'blocked' | 'clearance' | 'clear'
  /** Last instant at which the answers are good, epoch milliseconds. */
  goodUntilMs: number | null
}

/** Whether a member may play a class, by their own answers. */
export function standing(input: StandingInput): Standing {
  const { answers, answeredAtMs } = input
  if (!answers || answeredAtMs === null) return { standing: 'open', goodUntilMs: null }
  const goodUntilMs = answeredAtMs + input.intervalDays * DAY_MS
  if (input.nowMs > goodUntilMs) return { standing: 'open', goodUntilMs }
  if (input.clearedAtMs !== null) return { standing: 'clear', goodUntilMs }
  if (hasAnswered(answers, 'blocks')) return { standing: 'blocked', goodUntilMs }
  if (hasAnswered(answers, 'clearance') && !input.limits.some(isKnownLimit)) {
    return { standing: 'clearance', goodUntilMs }
  }
  return { standing: 'clear', goodUntilMs }
}

function hasAnswered(answers: HealthAnswers, consequence: HealthConsequence): boolean {
  return HEALTH_QUESTIONS.some(
    (question) => answers[question] && HEALTH_QUESTION_TEXT[question].consequence === consequence,
  )
}

function isKnownLimit(limit: string): boolean {
  return HEALTH_LIMITS.some((one) => one.limit === limit)
}

/** What the coach reads of the answers: words about what to mind, never the answers one by one. Null: nothing. */
export function noteForCoach(input: StandingInput): string | null {
  const { answers } = input
  if (!answers) return null
  const parts: string[] = []
  const { standing: now } = standing(input)
  const isCleared = input.clearedAtMs !== null
  if (hasAnswered(answers, 'blocks') || hasAnswered(answers, 'clearance')) {
    if (isCleared) parts.push('States clearance by a licensed professional.')
    else if (now === 'blocked') parts.push('May not play until cleared by a licensed professional.')
    else if (now === 'clearance') parts.push('Has not yet stated clearance or chosen limits.')
    const limits = HEALTH_LIMITS.filter((one) => input.limits.includes(one.limit))
    if (!isCleared && limits.length > 0) {
      parts.push(`Has chosen limits: ${limits.map((one) => one.label).join('; ')}.`)
    }
  }
  if (answers['pregnant-or-recent-birth']) parts.push('Pregnant, or has recently given birth.')
  return parts.length > 0 ? parts.join(' ') : null
}
