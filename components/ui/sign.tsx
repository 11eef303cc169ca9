import clsx from 'clsx'

type Tone = 'info' | 'error' | 'saved'

const SIGNS: Record<Tone, { ground: string; path: string }> = {
  error: { ground: 'fill-stop', path: 'M12 5v9M12 17.5v2.5' },
  info: { ground: 'fill-rest', path: 'M12 4v2.5M12 10v9.5' },
  saved: { ground: 'fill-done', path: 'M5 12.5l5 5L19 7' },
}

/** A painted square that tells a tone by its shape as well as its colour. Sized by the text beside it. */
export function Sign({ tone, className }: { tone: Tone; className?: string }) {
  const { ground, path } = SIGNS[tone]
  return (
    <svg
      viewBox="0 0 24 24"
      aria-hidden
      focusable="false"
      className={clsx('size-[1.3em] shrink-0', className)}
    >
      <path d="M0 0h24v24H0z" className={ground} />
      <path d={path} fill="none" strokeWidth="3.4" className="stroke-raised" />
    </svg>
  )
}
