import clsx from 'clsx'
import type { ReactNode } from 'react'

/** What a page is, as large as the floor's own lettering. `size`: `long` for names of people and sentences. */
export function PageTitle({
  children,
  size = 'short',
}: {
  children: ReactNode
  size?: 'short' | 'long'
}) {
  return (
    <h1
      className={clsx(
        '-ml-[0.04em] leading-[0.95] font-extrabold text-balance [overflow-wrap:anywhere]',
        size === 'short' ? 'text-6xl sm:text-7xl lg:text-8xl' : 'text-5xl sm:text-6xl',
      )}
    >
      {children}
    </h1>
  )
}

/** A part of a page: its name on a painted baseline, with `beside` at the other end of it. */
export function Part({
  title,
  beside,
  id,
  children,
  className,
}: {
  title: string
  beside?: ReactNode
  id?: string
  children: ReactNode
  className?: string
}) {
  return (
    <section id={id} className={className}>
      <div className="flex flex-wrap items-baseline justify-between gap-x-6 border-b-4 border-line pb-1.5">
        <h2 className="text-2xl sm:text-3xl">{title}</h2>
        {beside}
      </div>
      {children}
    </section>
  )
}
