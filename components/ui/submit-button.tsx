import clsx from 'clsx'
import type { ReactNode } from 'react'
import { buttonClass } from './button'

interface SubmitButtonProps {
  children: ReactNode
  isPending: boolean
  /** What it says while the form is on its way. */
  pending: string
  look?: 'filled' | 'outlined' | 'stop' | 'text'
  className?: string
}

/** Sends its form; says so while it is on its way. It keeps the focus, so it is never `disabled`. */
export function SubmitButton({
  children,
  isPending,
  pending,
  look = 'filled',
  className,
}: SubmitButtonProps) {
  return (
    <button
      type="submit"
      aria-disabled={isPending}
      className={buttonClass(look, clsx(isPending && 'under-way', className))}
    >
      {isPending ? pending : children}
    </button>
  )
}
