'use client'
import clsx from 'clsx'
import { useId, useState, type InputHTMLAttributes } from 'react'
import { FieldError } from './field-error'

interface TextFieldProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'id'> {
  name: string
  label: string
  hint?: string
  error?: string | undefined
}

/** Under the field that has the focus its line becomes a bar of paint. */
const FOCUS_BAR =
  'after:absolute after:-inset-x-0.5 after:-bottom-3 after:hidden after:h-3 after:bg-present after:outline-2 after:outline-(--text) focus-within:after:block'

/** A line to write on. Passwords can be shown; what was typed stays when the form comes back. */
export function TextField({ label, hint, error, type = 'text', ...rest }: TextFieldProps) {
  const id = useId()
  const [isShown, setShown] = useState(false)
  const isPassword = type === 'password'
  const described = [error ? `${id}-error` : '', hint ? `${id}-hint` : ''].filter(Boolean).join(' ')
  return (
    <div>
      <label htmlFor={id} className="block font-semibold">
        {label}
      </label>
      <div
        className={clsx(
          'relative mt-1 flex border-b-4 bg-raised',
          FOCUS_BAR,
          error ? 'border-stop' : 'border-line',
        )}
      >
        <input
          id={id}
          type={isPassword && isShown ? 'text' : type}
          aria-invalid={error ? true : undefined}
          aria-describedby={described || undefined}
          className="min-h-13 w-full min-w-0 bg-transparent px-4 text-xl shadow-none! outline-none!"
          {...rest}
        />
        {isPassword ? (
          <button
            type="button"
            onClick={() => setShown(!isShown)}
            aria-pressed={isShown}
            className="min-h-13 min-w-18 shrink-0 cursor-pointer px-3 font-semibold text-rest underline decoration-3 underline-offset-6"
          >
            {isShown ? 'Hide' : 'Show'}
            <span className="sr-only"> {label.toLowerCase()}</span>
          </button>
        ) : null}
      </div>
      <div className="pt-1">
        <FieldError id={`${id}-error`}>{error}</FieldError>
        {hint ? (
          <p id={`${id}-hint`} className="mt-2 text-text-quiet">
            {hint}
          </p>
        ) : null}
      </div>
    </div>
  )
}
