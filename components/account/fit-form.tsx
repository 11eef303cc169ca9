'use client'
import { useActionState, useState } from 'react'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { Notice } from '@/components/ui/notice'
import { SubmitButton } from '@/components/ui/submit-button'
import { Tick } from '@/components/ui/tick'
import { saveFit } from '@/server/actions/fit'
import { BODY_NOTES, BODY_NOTE_TEXT, type BodyNote, type FitProfile } from '@/server/contract/fit'

/** What a member's body objects to, and whether they want more: classes start on the options for it. */
export function FitForm({ fit }: { fit: Pick<FitProfile, 'bodyNotes' | 'wantsMore'> }) {
  const [result, action, isPending] = useActionState(saveFit, null)
  const { form, message } = useFormErrors(result)
  const [notes, setNotes] = useState<readonly BodyNote[]>(fit.bodyNotes)
  const [wantsMore, setWantsMore] = useState(fit.wantsMore)
  const isSaved =
    wantsMore === fit.wantsMore &&
    notes.length === fit.bodyNotes.length &&
    notes.every((note) => fit.bodyNotes.includes(note))
  return (
    <KeptForm ref={form} action={action} isPending={isPending}>
      <FormMessage result={result} ref={message} />
      <fieldset>
        <legend className="sr-only">What your body objects to</legend>
        <div className="grid gap-x-6 sm:grid-cols-2">
          {BODY_NOTES.map((note) => (
            <Tick
              key={note}
              name="note"
              value={note}
              checked={notes.includes(note)}
              onChange={(event) =>
                setNotes(
                  event.target.checked ? [...notes, note] : notes.filter((one) => one !== note),
                )
              }
            >
              {BODY_NOTE_TEXT[note]}
            </Tick>
          ))}
        </div>
      </fieldset>
      <div className="mt-2 border-t-4 border-fill pt-2">
        <Tick
          name="wantsMore"
          checked={wantsMore}
          onChange={(event) => setWantsMore(event.target.checked)}
        >
          I want more: start me on the harder option where nothing speaks against it
        </Tick>
      </div>
      <div className="mt-4 flex min-h-14 flex-wrap items-center gap-4">
        <SubmitButton isPending={isPending} pending="Saving">
          Save my notes
        </SubmitButton>
        {result?.ok && isSaved ? (
          <Notice tone="saved">Your notes are saved.</Notice>
        ) : isSaved ? null : (
          <p className="text-text-quiet">Not saved yet.</p>
        )}
      </div>
    </KeptForm>
  )
}
