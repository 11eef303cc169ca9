'use client'
import clsx from 'clsx'
import {
  createContext,
  use,
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from 'react'
import { FieldError } from '@/components/ui/field-error'

/** What was wrong with each field when the form came back, by its name. */
export const FieldErrors = createContext<Readonly<Record<string, string>>>({})

interface Common {
  name: string
  label: string
  hint?: string | undefined
  /** Said to those who cannot see which part of the form the field is in. */
  of?: string | undefined
}

function useField({ name, hint }: Common) {
  const id = useId()
  const error = use(FieldErrors)[name]
  const described = [error ? `${id}-error` : '', hint ? `${id}-hint` : ''].filter(Boolean).join(' ')
  return {
    id,
    error,
    input: {
      id,
      name,
      'aria-invalid': error ? (true as const) : undefined,
      'aria-describedby': described || undefined,
    },
  }
}

const BOX = 'border-4 bg-raised'
const boxClass = (error: string | undefined) =>
  clsx(BOX, error ? 'border-stop' : 'border-line-lesser')

function Frame({
  id,
  label,
  hint,
  of,
  error,
  className,
  children,
}: Omit<Common, 'name'> & {
  id: string
  error: string | undefined
  className?: string | undefined
  children: ReactNode
}) {
  return (
    <div className={clsx('min-w-0', className)}>
      <label htmlFor={id} className="block font-semibold">
        {label}
        {of ? <span className="sr-only">, {of}</span> : null}
      </label>
      {children}
      {hint ? (
        <p id={`${id}-hint`} className="mt-1 text-[0.9em] leading-snug text-text-quiet">
          {hint}
        </p>
      ) : null}
      <FieldError id={`${id}-error`}>{error}</FieldError>
    </div>
  )
}

type LineProps = Common &
  Omit<InputHTMLAttributes<HTMLInputElement>, 'id' | 'name'> & { wide?: string }

export function LineField({ name, label, hint, of, wide, className, ...rest }: LineProps) {
  const { id, error, input } = useField({ name, label, hint })
  return (
    <Frame id={id} label={label} hint={hint} of={of} error={error} className={wide}>
      <input
        {...rest}
        {...input}
        autoComplete="off"
        className={clsx('mt-1 h-13 px-3', boxClass(error), className ?? 'w-full')}
      />
    </Frame>
  )
}

type AreaProps = Common & Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'id' | 'name'>

export function AreaField({ name, label, hint, of, rows = 3, ...rest }: AreaProps) {
  const { id, error, input } = useField({ name, label, hint })
  return (
    <Frame id={id} label={label} hint={hint} of={of} error={error}>
      <textarea
        {...rest}
        {...input}
        rows={rows}
        className={clsx('mt-1 block field-sizing-content w-full p-3 leading-snug', boxClass(error))}
      />
    </Frame>
  )
}

type SelectProps = Common &
  Omit<SelectHTMLAttributes<HTMLSelectElement>, 'id' | 'name'> & {
    choices: readonly (readonly [value: string, text: string])[]
  }

export function SelectField({ name, label, hint, of, choices, ...rest }: SelectProps) {
  const { id, error, input } = useField({ name, label, hint })
  return (
    <Frame id={id} label={label} hint={hint} of={of} error={error}>
      <select
        {...rest}
        {...input}
        className={clsx('mt-1 h-13 w-full cursor-pointer px-2', boxClass(error))}
      >
        {choices.map(([value, text]) => (
          <option key={value} value={value}>
            {text}
          </option>
        ))}
      </select>
    </Frame>
  )
}

interface GroupProps extends Common {
  children: ReactNode
}

/** A few inputs under one question. */
export function FieldGroup({ name, label, hint, of, children }: GroupProps) {
  const { id, error } = useField({ name, label, hint })
  return (
    <fieldset
      className="min-w-0"
      aria-invalid={error ? true : undefined}
      aria-describedby={error ? `${id}-error` : undefined}
    >
      <legend className="mb-1 font-semibold">
        {label}
        {of ? <span className="sr-only">, {of}</span> : null}
      </legend>
      {children}
      {hint ? <p className="mt-1 text-[0.9em] leading-snug text-text-quiet">{hint}</p> : null}
      <FieldError id={`${id}-error`}>{error}</FieldError>
    </fieldset>
  )
}

interface ChipsProps extends Common {
  choices: readonly (readonly [value: string, text: string])[]
  chosen: readonly string[]
  /** One of them only. */
  single?: boolean
}

/** Words to tick: each a bay, filled and marked where it is chosen. */
export function Chips({ choices, chosen, single = false, ...group }: ChipsProps) {
  return (
    <FieldGroup {...group}>
      <div className="flex flex-wrap gap-2">
        {choices.map(([value, text]) => (
          <label
            key={value}
            className="flex min-h-11 cursor-pointer items-center gap-2 border-2 border-line-lesser bg-raised px-3 leading-tight hover:bg-fill has-checked:border-on-present has-checked:bg-present has-checked:font-semibold has-checked:text-on-present has-focus-visible:shadow-[0_0_0_2px_var(--text)] has-focus-visible:outline-4 has-focus-visible:outline-offset-2 has-focus-visible:outline-present"
          >
            <input
              type={single ? 'radio' : 'checkbox'}
              name={group.name}
              value={value}
              defaultChecked={chosen.includes(value)}
              className="peer sr-only"
            />
            <svg
              viewBox="0 0 24 24"
              aria-hidden
              focusable="false"
              className="hidden size-4 shrink-0 peer-checked:block"
            >
              <path
                d="M3 12.5l6.5 6.5L21 6"
                fill="none"
                strokeWidth="4.5"
                className="stroke-on-present"
              />
            </svg>
            {text}
          </label>
        ))}
      </div>
    </FieldGroup>
  )
}
