'use client'
import { useRouter } from 'next/navigation'
import { useActionState, useEffect, useState } from 'react'
import { FormMessage, useFocusFirstError } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
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

interface HealthFormProps {
  health: HealthStanding
  /** Where to go once the answers are kept. */
  next: string
}

/** The health questions; each says what a yes changes, and what is needed then appears below. */
export function HealthForm({ health, next }: HealthFormProps) {
  const [result, action, isPending] = useActionState(saveHealthAnswers, null)
  const form = useFocusFirstError(result)
  const router = useRouter()
  const [answers, setAnswers] = useState<Answers>(() =>
    health.answers
      ? Object.fromEntries(
          HEALTH_QUESTIONS.map((question) => [question, health.answers?.[question] ? 'yes' : 'no']),
        )
      : {},
  )
  useEffect(() => {
    if (result?.ok) router.push(next)
  }, [result, router, next])
  const fields = result && !result.ok ? result.fields : undefined
  const saidYes = (consequence: 'blocks' | 'clearance') =>
    HEALTH_QUESTIONS.some(
      (question) =>
        answers[question] === 'yes' && HEALTH_QUESTION_TEXT[question].consequence === consequence,
    )
  const needsClearance = saidYes('blocks')
  const needsEither = saidYes('clearance')
  return (
    <KeptForm ref={form} action={action} isPending={isPending} className="space-y-2">
      <FormMessage result={result} />
      {HEALTH_QUESTIONS.map((question) => (
        <Question
          key={question}
          question={question}
          answer={answers[question]}
          error={fields?.[question]}
          onAnswer={(answer) => setAnswers({ ...answers, [question]: answer })}
        />
      ))}
      {needsClearance || needsEither ? (
        <fieldset className="space-y-4 border-l-8 border-present py-2 pl-5">
          <legend className="pt-4 font-display text-2xl font-bold">Before you play</legend>
          <label className="flex cursor-pointer items-start gap-4">
            <input
              type="checkbox"
              name="cleared"
              defaultChecked={health.clearedAt !== null}
              className="mt-1 size-7 shrink-0 accent-(--text)"
            />
            <span>{CLEARANCE_STATEMENT}</span>
          </label>
          {needsClearance ? (
            <p>
              Without this you can read classes and not play them. Floorside never says what is
              wrong with anybody: a doctor, or whoever is licensed to where you live, does.
            </p>
          ) : (
            <div>
              <p className="mb-2">Or choose limits. Your coach sees which.</p>
              <div className="space-y-1">
                {HEALTH_LIMITS.map(({ limit, label }) => (
                  <label key={limit} className="flex min-h-12 cursor-pointer items-center gap-4">
                    <input
                      type="checkbox"
                      name="limits"
                      value={limit}
                      defaultChecked={health.limits.includes(limit)}
                      className="size-7 shrink-0 accent-(--text)"
                    />
                    <span>{label}</span>
                  </label>
                ))}
              </div>
            </div>
          )}
        </fieldset>
      ) : null}
      <div className="pt-6">
        <SubmitButton isPending={isPending} pending="Saving" className="w-full text-xl sm:w-auto">
          Save my answers
        </SubmitButton>
      </div>
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
  const { question: text, change } = HEALTH_QUESTION_TEXT[question]
  return (
    <fieldset
      aria-invalid={error ? true : undefined}
      className="grid gap-x-8 gap-y-3 border-b-4 border-fill py-4 sm:grid-cols-[1fr_auto] sm:items-center"
    >
      <legend className="sr-only">{text}</legend>
      <div>
        <p aria-hidden className="text-lg font-semibold">
          {text}
        </p>
        <p className="text-base text-text-quiet">{change}</p>
        {error ? <p className="mt-1 font-semibold text-stop">{error}</p> : null}
      </div>
      <div className="flex">
        {(['no', 'yes'] as const).map((value) => (
          <label
            key={value}
            className="-ml-1 flex min-h-13 min-w-20 cursor-pointer items-center justify-center border-4 border-line px-4 font-semibold first:ml-0 has-checked:bg-present has-checked:text-on-present has-focus-visible:outline-4 has-focus-visible:outline-offset-2 has-focus-visible:outline-present"
          >
            <input
              type="radio"
              name={question}
              value={value}
              checked={answer === value}
              onChange={() => onAnswer(value)}
              className="sr-only"
            />
            {value === 'yes' ? 'Yes' : 'No'}
          </label>
        ))}
      </div>
    </fieldset>
  )
}
