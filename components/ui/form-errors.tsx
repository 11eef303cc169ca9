'use client'
import { useEffect, useRef, type RefObject } from 'react'
import { Notice } from './notice'

/** What came of a form: done, or a sentence for the person. */
type FormResult = { ok: true } | { ok: false; message: string }

/** After a form came back with errors, the first field that is wrong has the focus. */
export function useFocusFirstError(result: FormResult | null): RefObject<HTMLFormElement | null> {
  const form = useRef<HTMLFormElement>(null)
  useEffect(() => {
    if (!result || result.ok) return
    const wrong = form.current?.querySelector<HTMLElement>('[aria-invalid="true"]')
    wrong?.focus()
  }, [result])
  return form
}

/** What was wrong with the form as a whole. */
export function FormMessage({ result }: { result: FormResult | null }) {
  if (!result || result.ok) return null
  return <Notice tone="error">{result.message}</Notice>
}
