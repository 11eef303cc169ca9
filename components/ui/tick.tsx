import type { InputHTMLAttributes, ReactNode } from 'react'

interface TickProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'type' | 'className'> {
  children: ReactNode
}

/** A painted square to tick, and what the tick says. */
export function Tick({ children, ...rest }: TickProps) {
  return (
    <label className="flex min-h-12 cursor-pointer items-start gap-4 py-2">
      <span className="relative mt-[-0.05em] size-8 shrink-0">
        <input
          type="checkbox"
          className="peer size-8 cursor-pointer appearance-none border-4 border-line bg-raised checked:bg-present"
          {...rest}
        />
        <svg
          viewBox="0 0 24 24"
          aria-hidden
          focusable="false"
          className="pointer-events-none absolute inset-1.5 hidden size-5 peer-checked:block"
        >
          <path
            d="M3 12.5l6.5 6.5L21 6"
            fill="none"
            strokeWidth="4.5"
            className="stroke-on-present"
          />
        </svg>
      </span>
      <span className="pt-0.5 leading-snug">{children}</span>
    </label>
  )
}
