'use client'
import { useActionState } from 'react'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { TextField } from '@/components/ui/text-field'
import { signIn } from '@/server/actions/account'

/** `next`: the page that was asked for, a path of this product. */
export function SignInForm({ next }: { next: string | null }) {
  const [result, action, isPending] = useActionState(signIn, null)
  const { form, message } = useFormErrors(result)
  const fields = result && !result.ok ? result.fields : undefined
  return (
    <KeptForm ref={form} action={action} isPending={isPending} className="mt-5 space-y-5">
      <FormMessage result={result} ref={message} />
      {next ? <input type="hidden" name="next" value={next} /> : null}
      <TextField
        name="email"
        type="email"
        label="E-mail"
        autoComplete="username"
        inputMode="email"
        autoCapitalize="none"
        spellCheck={false}
        autoFocus
        error={fields?.['email']}
      />
      <TextField
        name="password"
        type="password"
        label="Password"
        autoComplete="current-password"
        error={fields?.['password']}
      />
      <SubmitButton
        isPending={isPending}
        pending="Signing in"
        className="mt-3 min-h-16! w-full text-[1.6rem]!"
      >
        Sign in
      </SubmitButton>
    </KeptForm>
  )
}
