import clsx from 'clsx'
import type { CSSProperties, ReactNode } from 'react'

/** Width of a heading's letters in em, on the generous side. */
const LETTER_EM = 0.62

/** Longer ones are set smaller, or they would push what they name off the screen. */
const LONG = 24

type FitStyle = CSSProperties & { '--fit': string }

/**
 * What a page is, as large as the floor's own lettering and never so large that a word would break.
 * `size`: `long` for names of people and sentences.
 */
export function PageTitle({
  children,
  size = 'short',
}: {
  children: string
  size?: 'short' | 'long'
}) {
  const longest = Math.max(1, ...children.split(/[\s-]+/).map((word) => word.length))
  const style: FitStyle = {
    '--fit': `calc((100vw - 2.2rem) / ${(longest * LETTER_EM).toFixed(2)})`,
  }
  return (
    <h1
      style={style}
      className={clsx(
        '-ml-[0.04em] leading-[0.95] font-extrabold text-balance [overflow-wrap:anywhere]',
        size === 'short' && children.length <= LONG
          ? 'text-[min(3.75rem,var(--fit))] sm:text-[min(4.5rem,var(--fit))] lg:text-[min(6rem,var(--fit))]'
          : 'text-[min(3rem,var(--fit))] sm:text-[min(3.75rem,var(--fit))]',
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
