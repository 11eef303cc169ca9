'use client'
import { useActionState, useState } from 'react'
import { FormMessage } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { saveOptionRule } from '@/server/actions/fit'
import { BODY_NOTE_TEXT, type FitProfile } from '@/server/contract/fit'
import type { Movement } from '@/server/engine/spec/movement'

interface OptionRulesProps {
  membershipId: string
  memberName: string
  fit: FitProfile
  /** Those of the class; a rule may be there for others as well. */
  movements: readonly Movement[]
}

/** What a coach settles for one member: this movement, this way, whatever would be fitted else. */
export function OptionRules({ membershipId, memberName, fit, movements }: OptionRulesProps) {
  return (
    <section>
      <h2 className="mb-2 text-2xl">Fitted to</h2>
      <p className="mb-1">
        {fit.bodyNotes.length > 0
          ? fit.bodyNotes.map((note) => BODY_NOTE_TEXT[note].toLowerCase()).join(', ')
          : 'No notes of their own.'}
        {fit.wantsMore ? ' Wants more.' : ''}
      </p>
      <p className="mb-3 text-text-quiet">
        Your rule stands over what is fitted by itself. {memberName} sees it, and may still choose
        another way in class.
      </p>
      <ul className="border-t-4 border-fill">
        {movements.map((movement) => (
          <Rule
            key={movement.slug}
            membershipId={membershipId}
            movement={movement}
            rule={fit.rules.find((one) => one.movement === movement.slug)}
          />
        ))}
      </ul>
    </section>
  )
}

function Rule({
  membershipId,
  movement,
  rule,
}: {
  membershipId: string
  movement: Movement
  rule: FitProfile['rules'][number] | undefined
}) {
  const [result, action, isPending] = useActionState(saveOptionRule, null)
  const kept = rule?.option ?? ''
  const [option, setOption] = useState(kept)
  return (
    <li className="border-b-4 border-fill py-2">
      <KeptForm
        action={action}
        isPending={isPending}
        className="flex flex-wrap items-center gap-x-4 gap-y-2"
      >
        <input type="hidden" name="membershipId" value={membershipId} />
        <input type="hidden" name="movement" value={movement.slug} />
        <label className="flex min-w-0 flex-1 basis-72 flex-wrap items-center gap-x-4 gap-y-1">
          <span className="min-w-48 font-semibold">{movement.name}</span>
          <select
            name="option"
            value={option}
            onChange={(event) => setOption(event.target.value)}
            className="min-h-12 min-w-0 flex-1 border-4 border-line bg-raised px-3"
          >
            <option value="">as fitted</option>
            {movement.options.map((one) => (
              <option key={one.option} value={one.option}>
                {one.name}
              </option>
            ))}
          </select>
        </label>
        {option === kept ? null : (
          <SubmitButton isPending={isPending} pending="Saving" look="outlined">
            Save rule
          </SubmitButton>
        )}
        {rule && option === kept ? (
          <span className="text-[0.9em] text-text-quiet">
            {rule.setBy ? `set by ${rule.setBy}` : 'set'}
          </span>
        ) : null}
        <FormMessage result={result} />
      </KeptForm>
    </li>
  )
}
