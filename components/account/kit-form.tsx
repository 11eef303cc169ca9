'use client'
import { useActionState, useState } from 'react'
import { KitPicture } from '@/components/figure/kit-picture'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { Notice } from '@/components/ui/notice'
import { TextField } from '@/components/ui/text-field'
import { SubmitButton } from '@/components/ui/submit-button'
import { saveOwnKit } from '@/server/actions/kit'
import { parseWeights, WEIGHED_ITEMS, weightsText } from '@/server/engine/fit/weights'

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

const isSame = (one: Record<string, number>, other: Record<string, number>): boolean =>
  ITEMS.every(([item]) => (one[item] ?? 0) === (other[item] ?? 0))

const isWeighed = (item: string) => WEIGHED_ITEMS.some((one) => one === item)

export function KitForm({
  kit,
  weights,
}: {
  kit: Record<string, number>
  weights: Record<string, number[]>
}) {
  const [result, action, isPending] = useActionState(saveOwnKit, null)
  const { form, message } = useFormErrors(result)
  const [counts, setCounts] = useState<Record<string, number>>(kit)
  const kept = (item: string) => weightsText(weights[item] ?? [])
  const [written, setWritten] = useState<Record<string, string>>(() =>
    Object.fromEntries(WEIGHED_ITEMS.map((item) => [item, kept(item)])),
  )
  const fields = result && !result.ok ? result.fields : undefined
  const set = (item: string, count: number) =>
    setCounts({ ...counts, [item]: Math.min(MOST, Math.max(0, count)) })
  // After saving the page is read again, so `kit` is what is stored.
  const isSaved =
    isSame(counts, kit) &&
    WEIGHED_ITEMS.every((item) => sameWeights(written[item] ?? '', weights[item] ?? []))
  return (
    <KeptForm ref={form} action={action} isPending={isPending}>
      <FormMessage result={result} ref={message} />
      <ul className="border-t-4 border-fill">
        {ITEMS.map(([item, label]) => {
          const count = counts[item] ?? 0
          return (
            <li
              key={item}
              className="flex flex-wrap items-center justify-between gap-2 border-b-4 border-fill py-1.5"
            >
              <span className="flex min-w-0 items-center gap-2 font-semibold sm:gap-5">
                <KitPicture item={item} count={1} />
                {label}
              </span>
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
                  className="w-10 text-center figures text-3xl sm:w-12"
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
              {isWeighed(item) && count > 0 ? (
                <div className="w-full pb-3">
                  <TextField
                    name={`weights:${item}`}
                    label={`What your ${label.toLowerCase()} weigh`}
                    hint="Such as 2 × 8 kg, or 20 lb. Leave it empty where you do not know."
                    value={written[item] ?? ''}
                    error={fields?.[`weights:${item}`]}
                    onChange={(event) => setWritten({ ...written, [item]: event.target.value })}
                  />
                </div>
              ) : null}
            </li>
          )
        })}
      </ul>
      <div className="mt-5 flex min-h-14 flex-wrap items-center gap-4">
        <SubmitButton isPending={isPending} pending="Saving">
          Save my kit
        </SubmitButton>
        {result?.ok && isSaved ? (
          <Notice tone="saved">Your kit is saved.</Notice>
        ) : isSaved ? null : (
          <p className="text-text-quiet">Not saved yet.</p>
        )}
      </div>
    </KeptForm>
  )
}

/** Whether what is written says the same as what is kept, in whatever words. */
function sameWeights(text: string, kept: readonly number[]): boolean {
  const read = parseWeights(text)
  return 'kilograms' in read && weightsText(read.kilograms) === weightsText(kept)
}

interface StepProps {
  label: string
  disabled: boolean
  onClick: () => void
  children: string
}

/** At its end a step stays reachable, so that the focus is not lost under the finger. */
function Step({ label, disabled, onClick, children }: StepProps) {
  return (
    <button
      type="button"
      aria-label={label}
      aria-disabled={disabled}
      onClick={disabled ? undefined : onClick}
      className="size-12 cursor-pointer border-4 border-line font-display text-2xl leading-none font-bold hover:bg-fill aria-disabled:cursor-not-allowed aria-disabled:border-line-lesser aria-disabled:bg-transparent aria-disabled:text-text-quiet"
    >
      {children}
    </button>
  )
}
