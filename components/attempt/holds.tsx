'use client'
import { useActionState } from 'react'
import { FormMessage } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { clearHurtHold } from '@/server/actions/health'
import type { HurtHold } from '@/server/contract/classes'
import { dateOf } from '@/server/contract/format'
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'

interface HoldsProps {
  holds: readonly HurtHold[]
  as: 'member' | 'coach'
  timeZone: string
}

/** Places that keep a member on easier options, until member and coach have both said that they are well. */
export function Holds({ holds, as, timeZone }: HoldsProps) {
  if (holds.length === 0) return null
  return (
    <section>
      <h2 className="mb-2 text-2xl">Easier for now</h2>
      <p className="mb-3 text-text-quiet">
        After ‘this hurts’ the easier option stays until member and coach both say that it is well.
        Pain that stays belongs to a licensed professional.
      </p>
      <ul className="space-y-3">
        {holds.map((hold) => (
          <Hold key={hold.id} hold={hold} as={as} timeZone={timeZone} />
        ))}
      </ul>
    </section>
  )
}

function Hold({
  hold,
  as,
  timeZone,
}: {
  hold: HurtHold
  as: 'member' | 'coach'
  timeZone: string
}) {
  const [result, action, isPending] = useActionState(clearHurtHold, null)
  const own = as === 'coach' ? hold.coachClearedAt : hold.memberClearedAt
  const other = as === 'coach' ? hold.memberClearedAt : hold.coachClearedAt
  return (
    <li className="border-l-8 border-line-lesser pl-4">
      <p>
        <strong>{HURT_PLACE_TEXT[hold.place]}</strong>, since {dateOf(hold.since, timeZone)}
      </p>
      <p className="text-base text-text-quiet">
        {other
          ? as === 'coach'
            ? 'The member says it is well.'
            : 'Your coach says it is well.'
          : as === 'coach'
            ? 'The member has not said so yet.'
            : 'Your coach has not said so yet.'}
      </p>
      <FormMessage result={result} />
      {own ? (
        <p className="font-semibold text-done">You have said that it is well.</p>
      ) : (
        <KeptForm action={action} isPending={isPending} className="mt-2">
          <input type="hidden" name="holdId" value={hold.id} />
          <input type="hidden" name="as" value={as} />
          <SubmitButton isPending={isPending} pending="Saving" look="outlined">
            It is well again
          </SubmitButton>
        </KeptForm>
      )}
    </li>
  )
}
