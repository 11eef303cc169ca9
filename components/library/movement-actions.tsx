'use client'
import { startTransition, useActionState } from 'react'
import { LinkButton } from '@/components/ui/button'
import { ConfirmButton } from '@/components/ui/confirm-button'
import { FormMessage } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { archiveMovement, backToBuiltIn, bringBackMovement } from '@/server/actions/library'
import type { LibraryMovement } from '@/server/contract/library-types'
import { paths } from '@/server/contract/paths'

/** What a coach can do with a movement as a whole. Archiving is taken back by the same button. */
export function MovementActions({ found }: { found: LibraryMovement }) {
  const { movement, archived, origin, token } = found
  const { slug } = movement
  const [archiving, archive, isArchiving] = useActionState(archiveMovement, null)
  const [bringing, bringBack, isBringing] = useActionState(bringBackMovement, null)
  const [removing, remove, isRemoving] = useActionState(backToBuiltIn, null)
  const refused = [archiving, bringing, removing].find((one) => one && !one.ok) ?? null
  return (
    <div className="space-y-4">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-3">
        <LinkButton href={paths.editMovement(slug)}>Edit</LinkButton>
        {archived ? (
          <KeptForm action={bringBack} isPending={isBringing}>
            <input type="hidden" name="slug" value={slug} />
            <SubmitButton look="outlined" isPending={isBringing} pending="Bringing back">
              Bring back
            </SubmitButton>
          </KeptForm>
        ) : (
          <KeptForm action={archive} isPending={isArchiving}>
            <input type="hidden" name="slug" value={slug} />
            <SubmitButton look="outlined" isPending={isArchiving} pending="Archiving">
              Archive
            </SubmitButton>
          </KeptForm>
        )}
        {origin === 'copy' ? (
          <ConfirmButton
            title="Back to the built-in?"
            explanation="What your gym changed in this movement is removed, and the one that came with Floorside stands here again. Published classes keep what they have."
            confirm="Remove our changes"
            disabled={isRemoving}
            onConfirm={() => {
              const form = new FormData()
              form.set('slug', slug)
              form.set('basedOn', token)
              startTransition(() => remove(form))
            }}
          >
            Back to the built-in
          </ConfirmButton>
        ) : null}
      </div>
      <FormMessage result={refused} />
    </div>
  )
}
