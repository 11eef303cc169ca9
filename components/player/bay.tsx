'use client'
import clsx from 'clsx'
import { useEffect, useState, type ReactNode } from 'react'
import { CueLine } from './cue-line'
import styles from './floor-plan.module.css'
import { usePlayer } from './player-context'

/** After this a cue is quiet, after the other it is gone. */
const FRESH_MS = 9_000
const GONE_MS = 25_000
/** More than two lines on a laptop at two metres. */
const LONG_LETTERS = 38

/**
 * The painted line with its corner arc: the present. What is due stands here, large; under it the
 * coming cues slide towards it. Read out politely, once each.
 */
export function Bay({
  tone,
  fallback,
  children,
}: {
  tone: 'present' | 'rest' | 'stop'
  /** Quiet text where no cue is due: the station's note, or what its movement is about. */
  fallback: string | null
  /** A question of this rest; it stands under what is due. */
  children?: ReactNode
}) {
  const dueKey = usePlayer((state) => state.due?.mark.key ?? null)
  const dueText = usePlayer((state) =>
    state.due && state.due.sinceMs < GONE_MS ? state.due.text : null,
  )
  const fresh = usePlayer((state) => state.due !== null && state.due.sinceMs < FRESH_MS)
  const text = dueText ?? fallback
  const caption = usePlayer((state) => state.caption)
  return (
    <section
      aria-label="Cues"
      className={styles.bay}
      style={{ ['--bay-line' as string]: `var(--${tone})` }}
    >
      {text || !children ? (
        <div
          className={styles.bayText}
          data-near={dueText ? undefined : ''}
          data-long={dueText && dueText.length > LONG_LETTERS ? '' : undefined}
        >
          {text ? (
            <p
              key={dueText ? dueKey : 'fallback'}
              className={clsx(
                dueText && fresh && styles.rise,
                !(dueText && fresh) && styles.fading,
              )}
              data-testid={dueText ? 'due-cue' : 'quiet-cue'}
            >
              {text}
            </p>
          ) : null}
        </div>
      ) : null}
      <p className="sr-only" aria-live="polite">
        {dueText}
      </p>
      {children}
      {caption !== null && !text?.includes(caption) ? (
        <p className={clsx('condensed', styles.caption)} data-testid="caption">
          {caption}
        </p>
      ) : null}
      <CueLine />
    </section>
  )
}

/** The store's sentence about the last command, for as long as it takes to read. */
export function Notice() {
  const notice = usePlayer((state) => state.notice)
  const [gone, setGone] = useState<number | null>(null)
  const at = notice?.atMs ?? null
  useEffect(() => {
    if (at === null) return
    const timer = setTimeout(() => setGone(at), 5_000)
    return () => clearTimeout(timer)
  }, [at])
  const text = notice && gone !== notice.atMs ? notice.text : null
  return (
    <div role="status" className="pointer-events-none absolute inset-x-0 bottom-full z-10">
      {text ? (
        <p className="mb-2 inline-block bg-button px-[0.6em] py-[0.4em] condensed text-[length:var(--near)] leading-tight text-on-button">
          {text}
        </p>
      ) : null}
    </div>
  )
}
