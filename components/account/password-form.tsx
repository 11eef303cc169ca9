'use client'
import { useActionState, useEffect } from 'react'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { Notice } from '@/components/ui/notice'
import { SubmitButton } from '@/components/ui/submit-button'
import { TextField } from '@/components/ui/text-field'
import { changePassword } from '@/server/actions/account'

export function PasswordForm({ email }: { email: string }) {
  const [result, action, isPending] = useActionState(changePassword, null)
  const { form, message } = useFormErrors(result)
  const fields = result && !result.ok ? result.fields : undefined
  useEffect(() => {
    if (result?.ok) form.current?.reset()
  }, [result, form])
  return (
    <KeptForm ref={form} action={action} isPending={isPending} className="max-w-md space-y-5">
      <FormMessage result={result} ref={message} />
      {result?.ok ? (
        <Notice tone="saved">Your password is changed. Other browsers are signed out.</Notice>
      ) : null}
      <input type="hidden" autoComplete="username" value={email} readOnly />
      <TextField
        name="current"
        type="password"
        label="Present password"
        autoComplete="current-password"
        error={fields?.['current']}
      />
      <TextField
        name="wanted"
        type="password"
        label="New password"
        autoComplete="new-password"
        hint="At least 8 characters. A few words in a row are good; pasting is fine."
        error={fields?.['wanted']}
      />
      <TextField
        name="again"
        type="password"
        label="New password once more"
        autoComplete="new-password"
        error={fields?.['again']}
      />
      <SubmitButton isPending={isPending} pending="Changing">
        Change password
      </SubmitButton>
    </KeptForm>
  )
}
