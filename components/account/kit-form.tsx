'use client'
import { useActionState, useState } from 'react'
import { FormMessage } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { Notice } from '@/components/ui/notice'
import { SubmitButton } from '@/components/ui/submit-button'
import { saveOwnKit } from '@/server/actions/kit'

/** What classes ask for; a gym's own words for more come with the library. */
const ITEMS = [
  ['dumbbell', 'Dumbbells'],
  ['kettlebell', 'Kettlebells'],
  ['band', 'Bands'],
  ['mat', 'Mat'],
  ['chair', 'Sturdy chair'],
  ['bench', 'Bench'],
] as const
const MOST = 20

export function KitForm({ kit }: { kit: Record<string, number> }) {
  const [result, action, isPending] = useActionState(saveOwnKit, null)
  const [counts, setCounts] = useState<Record<string, number>>(kit)
  const set = (item: string, count: number) =>
    setCounts({ ...counts, [item]: Math.min(MOST, Math.max(0, count)) })
  return (
    <KeptForm action={action} isPending={isPending} className="max-w-md">
      <FormMessage result={result} />
      {result?.ok ? <Notice tone="saved">Your kit is saved.</Notice> : null}
      <ul className="mt-3 border-t-4 border-line">
        {ITEMS.map(([item, label]) => {
          const count = counts[item] ?? 0
          return (
            <li
              key={item}
              className="flex items-center justify-between border-b-4 border-fill py-1.5"
            >
              <span className="font-semibold">{label}</span>
              <span className="flex items-center">
                <input type="hidden" name={item} value={count} />
                <Step
                  label={`One less: ${label}`}
                  disabled={count === 0}
                  onClick={() => set(item, count - 1)}
                >
                  −
                </Step>
                <output
                  aria-label={`${label}: how many`}
                  className="w-12 text-center figures text-3xl"
                >
                  {count}
                </output>
                <Step
                  label={`One more: ${label}`}
                  disabled={count === MOST}
                  onClick={() => set(item, count + 1)}
                >
                  +
                </Step>
              </span>
            </li>
          )
        })}
      </ul>
      <SubmitButton isPending={isPending} pending="Saving" className="mt-5">
        Save my kit
      </SubmitButton>
    </KeptForm>
  )
}

interface StepProps {
  label: string
  disabled: boolean
  onClick: () => void
  children: string
}

function Step({ label, disabled, onClick, children }: StepProps) {
  return (
    <button
      type="button"
      aria-label={label}
      disabled={disabled}
      onClick={onClick}
      className="size-12 cursor-pointer border-4 border-line font-display text-2xl leading-none font-bold hover:bg-fill disabled:cursor-not-allowed disabled:opacity-40"
    >
      {children}
    </button>
  )
}
