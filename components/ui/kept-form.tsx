'use client'
import { startTransition, type FormHTMLAttributes, type RefObject } from 'react'

interface KeptFormProps extends Omit<FormHTMLAttributes<HTMLFormElement>, 'action' | 'onSubmit'> {
  action: (form: FormData) => void
  isPending: boolean
  ref?: RefObject<HTMLFormElement | null>
}

/**
 * A form that keeps what was typed when it comes back with errors (React empties a form after its
 * action), and that is on its way once at most. `action` on the form itself is for whoever sends it
 * before the page's script runs: it is posted, and nothing typed lands in the address.
 */
export function KeptForm({ action, isPending, children, ref, ...rest }: KeptFormProps) {
  return (
    <form
      {...(ref ? { ref } : {})}
      action={action}
      noValidate
      onSubmit={(event) => {
        event.preventDefault()
        if (isPending) return
        const form = new FormData(event.currentTarget)
        startTransition(() => action(form))
      }}
      {...rest}
    >
      {children}
    </form>
  )
}
