'use client'
import { useId, useState, type InputHTMLAttributes } from 'react'

interface TextFieldProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'id'> {
  name: string
  label: string
  hint?: string
  error?: string | undefined
}

/** A line to write on. Passwords can be shown; what was typed stays when the form comes back. */
export function TextField({ label, hint, error, type = 'text', ...rest }: TextFieldProps) {
  const id = useId()
  const [isShown, setShown] = useState(false)
  const isPassword = type === 'password'
  const described = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ')
  return (
    <div>
      <label htmlFor={id} className="block font-semibold">
        {label}
      </label>
      <div
        className={`mt-1 flex border-b-4 bg-raised focus-within:border-present focus-within:outline-2 focus-within:outline-(--text) ${error ? 'border-stop' : 'border-line'}`}
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
            className="min-w-16 shrink-0 cursor-pointer px-3 font-semibold text-rest underline underline-offset-4"
          >
            {isShown ? 'Hide' : 'Show'}
            <span className="sr-only"> {label.toLowerCase()}</span>
          </button>
        ) : null}
      </div>
      {hint ? (
        <p id={`${id}-hint`} className="mt-1 text-base text-text-quiet">
          {hint}
        </p>
      ) : null}
      {error ? (
        <p id={`${id}-error`} className="mt-1 font-semibold text-stop">
          {error}
        </p>
      ) : null}
    </div>
  )
}
