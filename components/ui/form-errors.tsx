'use client'
import { useLayoutEffect, useRef, type Ref, type RefObject } from 'react'
import { Notice } from './notice'

/** What came of a form: done, or a sentence for the person. */
type FormResult = { ok: true } | { ok: false; message: string }

interface FormErrors {
  form: RefObject<HTMLFormElement | null>
  message: RefObject<HTMLDivElement | null>
}

/** After a form came back with errors the first wrong field has the focus, or else the sentence above it. */
export function useFormErrors(result: FormResult | null): FormErrors {
  const form = useRef<HTMLFormElement>(null)
  const message = useRef<HTMLDivElement>(null)
  useLayoutEffect(() => {
    if (!result || result.ok) return
    const wrong = form.current?.querySelector<HTMLElement>('[aria-invalid="true"]')
    const first = wrong?.matches('fieldset') ? wrong.querySelector('input') : wrong
    ;(first ?? message.current)?.focus()
  }, [result])
  return { form, message }
}

/** What was wrong with the form as a whole. */
export function FormMessage({
  result,
  ref,
}: {
  result: FormResult | null
  ref?: Ref<HTMLDivElement>
}) {
  if (!result || result.ok) return null
  return (
    <Notice tone="error" {...(ref ? { ref } : {})}>
      {result.message}
    </Notice>
  )
}
