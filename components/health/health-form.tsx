'use client'
import { useRouter } from 'next/navigation'
import { useActionState, useEffect, useId, useState } from 'react'
import { ChoiceBays } from '@/components/ui/choice-bays'
import { FieldError } from '@/components/ui/field-error'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { Tick } from '@/components/ui/tick'
import { saveHealthAnswers } from '@/server/actions/health'
import type { HealthStanding } from '@/server/contract/classes'
import {
  CLEARANCE_STATEMENT,
  HEALTH_LIMITS,
  HEALTH_QUESTION_TEXT,
  HEALTH_QUESTIONS,
  type HealthQuestion,
} from '@/server/engine/fit/screening'

type Answer = 'yes' | 'no'
type Answers = Partial<Record<HealthQuestion, Answer>>
type Consequence = (typeof HEALTH_QUESTION_TEXT)[HealthQuestion]['consequence']

const CHOICES = [
  { value: 'no', label: 'No' },
  { value: 'yes', label: 'Yes' },
] as const

/** Questions with the same consequence stand together, so that it is read once. */
const GROUPS: readonly { consequence: Consequence; title: string }[] = [
  { consequence: 'blocks', title: 'Signs to have looked at first' },
  { consequence: 'clearance', title: 'What your coach has to know' },
  { consequence: 'note', title: 'For a word with your coach' },
]

const askedWith = (consequence: Consequence): HealthQuestion[] =>
  HEALTH_QUESTIONS.filter((question) => HEALTH_QUESTION_TEXT[question].consequence === consequence)

/** Answers to change. Those that are out of date are asked afresh: nobody should nod through old ones. */
function answersToBeginWith({ answers, standing }: HealthStanding): Answers {
  if (!answers || standing === 'open') return {}
  return Object.fromEntries(
    HEALTH_QUESTIONS.map((question) => [question, answers[question] ? 'yes' : 'no']),
  )
}

interface HealthFormProps {
  health: HealthStanding
  /** Where to go once the answers are kept. */
  next: string
}

/** The health questions; each says what a yes changes, and what is needed then appears below. */
export function HealthForm({ health, next }: HealthFormProps) {
  const [result, action, isPending] = useActionState(saveHealthAnswers, null)
  const { form, message } = useFormErrors(result)
  const router = useRouter()
  const [answers, setAnswers] = useState<Answers>(() => answersToBeginWith(health))
  useEffect(() => {
    if (result?.ok) router.push(next)
  }, [result, router, next])
  const fields = result && !result.ok ? result.fields : undefined
  const saidYes = (consequence: Consequence) =>
    askedWith(consequence).some((question) => answers[question] === 'yes')
  const isHeldBack = saidYes('blocks')
  const needsEither = !isHeldBack && saidYes('clearance')
  return (
    <KeptForm ref={form} action={action} isPending={isPending} className="space-y-9">
      <FormMessage result={result} ref={message} />
      {GROUPS.map(({ consequence, title }) => {
        const questions = askedWith(consequence)
        const [first] = questions
        return (
          <section key={consequence}>
            <div className="border-b-4 border-line pb-2">
              <h2 className="text-2xl sm:text-3xl">{title}</h2>
              {first ? (
                <p className="mt-1.5 text-text-quiet">{HEALTH_QUESTION_TEXT[first].change}</p>
              ) : null}
            </div>
            {questions.map((question) => (
              <Question
                key={question}
                question={question}
                answer={answers[question]}
                error={answers[question] ? undefined : fields?.[question]}
                onAnswer={(answer) => setAnswers({ ...answers, [question]: answer })}
              />
            ))}
          </section>
        )
      })}
      <div aria-live="polite">
        {isHeldBack || needsEither ? (
          <fieldset className="border-t-12 border-present pt-1">
            <legend className="sr-only">Before you play</legend>
            <p aria-hidden className="mt-4 font-display text-2xl font-bold sm:text-3xl">
              Before you play
            </p>
            <div className="mt-3">
              <Tick name="cleared" defaultChecked={health.clearedAt !== null}>
                {CLEARANCE_STATEMENT}
              </Tick>
            </div>
            {isHeldBack ? (
              <p className="mt-3 max-w-2xl">
                Without this you can read classes and not play them. Floorside never says what is
                wrong with anybody: a doctor, or whoever is licensed to where you live, does.
              </p>
            ) : (
              <div className="mt-3">
                <p className="mb-1">
                  Or choose limits; your coach sees which. With neither you can read classes and not
                  play them yet.
                </p>
                <div className="grid gap-x-8 sm:grid-cols-2">
                  {HEALTH_LIMITS.map(({ limit, label }) => (
                    <Tick
                      key={limit}
                      name="limits"
                      value={limit}
                      defaultChecked={health.limits.includes(limit)}
                    >
                      {label}
                    </Tick>
                  ))}
                </div>
              </div>
            )}
          </fieldset>
        ) : null}
      </div>
      <SubmitButton
        isPending={isPending}
        pending="Saving"
        className="min-h-14! w-full text-2xl! sm:w-auto sm:min-w-72"
      >
        Save my answers
      </SubmitButton>
    </KeptForm>
  )
}

interface QuestionProps {
  question: HealthQuestion
  answer: Answer | undefined
  error: string | undefined
  onAnswer: (answer: Answer) => void
}

function Question({ question, answer, error, onAnswer }: QuestionProps) {
  const id = useId()
  const { question: text, change } = HEALTH_QUESTION_TEXT[question]
  const described = [answer === 'yes' ? `${id}-change` : '', error ? `${id}-error` : '']
    .filter(Boolean)
    .join(' ')
  return (
    <fieldset
      role="radiogroup"
      aria-invalid={error ? true : undefined}
      aria-describedby={described || undefined}
      className="grid gap-x-8 gap-y-3 border-b-4 border-fill py-4 sm:grid-cols-[1fr_auto] sm:items-center"
    >
      <legend className="sr-only">{text}</legend>
      <div>
        <p aria-hidden className="text-lg leading-snug font-semibold">
          {text}
        </p>
        {answer === 'yes' ? (
          <p id={`${id}-change`} className="mt-2 border-l-8 border-present pl-3 leading-snug">
            {change}
          </p>
        ) : null}
        <FieldError id={`${id}-error`}>{error}</FieldError>
      </div>
      <ChoiceBays name={question} choices={CHOICES} chosen={answer} onChoose={onAnswer} />
    </fieldset>
  )
}
