'use client'
import clsx from 'clsx'
import type { ButtonHTMLAttributes, ReactNode } from 'react'

interface ActionButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  look?: 'primary' | 'framed' | 'stop' | 'plain'
  /** The key that does the same, shown beside the words. */
  hint?: string | undefined
  children: ReactNode
}

/** A painted button: filled and framed in yellow for the one thing to press, framed for the rest. */
export function ActionButton({
  look = 'framed',
  hint,
  children,
  className,
  ...rest
}: ActionButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      className={clsx(
        'inline-flex min-h-12 min-w-12 items-center justify-center gap-[0.5em] px-[0.7em] py-[0.3em] condensed leading-none disabled:cursor-not-allowed',
        look === 'primary' &&
          'border-[max(3px,0.35vw)] border-ground bg-button text-on-button outline-[max(4px,0.45vw)] outline-present outline-solid focus-visible:outline-text disabled:opacity-60',
        look === 'framed' && 'border-[max(3px,0.3vw)] border-line text-text hover:bg-fill',
        look === 'stop' &&
          'border-[max(3px,0.3vw)] border-stop text-text hover:bg-stop hover:text-ground',
        look === 'plain' && 'text-text hover:underline',
        className,
      )}
    >
      {children}
      {hint ? <KeyHint>{hint}</KeyHint> : null}
    </button>
  )
}

export function KeyHint({ children }: { children: ReactNode }) {
  return (
    <kbd
      aria-hidden="true"
      className="hidden border-[max(2px,0.14vw)] border-current px-[0.4em] py-[0.15em] font-(family-name:--font-display) text-[0.6em] leading-none font-semibold [@media(hover:hover)_and_(min-width:700px)]:inline-block"
    >
      {children}
    </kbd>
  )
}
