'use client'
import { useRef } from 'react'
import type { PlayerState } from '@/hooks/player/types'
import { clockText } from './texts'
import styles from './floor-plan.module.css'
import { usePaint } from './use-paint'
import { usePlayer } from './player-context'

/** How much time the line shows, from the present to its far end. */
export const LINE_MS = 45_000
const TICK_MS = 5_000

type Coming = PlayerState['cueLine'][number]

/** Cues, time calls and what is next, each at its distance in time, sliding towards the present. */
export function CueLine({ limitMs = LINE_MS }: { limitMs?: number }) {
  const cueLine = usePlayer((state) => state.cueLine)
  const line = useRef<HTMLDivElement>(null)
  const coming = cueLine
    .filter((each) => each.dueInMs > -500 && each.dueInMs < limitMs + 5_000)
    .sort((one, other) => one.dueInMs - other.dueInMs)

  // The store gives times at its own instant; between its answers the line runs on by class time.
  const knownAt = useRef<{ cueLine: Coming[]; classMs: number } | null>(null)
  usePaint((now) => {
    if (!line.current) return
    if (knownAt.current?.cueLine !== cueLine) knownAt.current = { cueLine, classMs: now.classMs }
    const passedMs = Math.max(0, now.classMs - knownAt.current.classMs)
    const width = line.current.clientWidth
    for (const element of line.current.querySelectorAll<HTMLElement>('[data-due]')) {
      const dueInMs = Number(element.dataset['due']) - passedMs
      const x = Math.max(0, (dueInMs / limitMs) * width)
      element.style.transform = `translateX(${x.toFixed(1)}px)`
      element.style.opacity = dueInMs <= 0 ? '0' : '1'
      const clock = element.firstElementChild
      const text = clockText(dueInMs)
      if (clock && clock.textContent !== text) clock.textContent = text
    }
  })

  return (
    <div ref={line} className={styles.cueLine} data-testid="cue-line" aria-hidden="true">
      {Array.from({ length: Math.floor(limitMs / TICK_MS) }, (_, index) => index + 1).map(
        (tick) => (
          <span
            key={tick}
            className={styles.tick}
            data-tall={tick % 2 === 0 ? '' : undefined}
            style={{ left: `${((tick * TICK_MS) / limitMs) * 100}%` }}
          />
        ),
      )}
      {coming.map((each, index) => {
        const after = coming[index + 1]
        const roomMs = after ? after.dueInMs - each.dueInMs : limitMs
        return (
          <div
            key={each.mark.key}
            data-due={each.dueInMs}
            className={styles.mark}
            style={{ maxWidth: `${(Math.min(roomMs, limitMs - each.dueInMs) / limitMs) * 100}%` }}
          >
            <b className="condensed" style={{ fontVariantNumeric: 'tabular-nums' }}>
              {clockText(each.dueInMs)}
            </b>
            <span className="condensed" style={{ fontWeight: 450 }}>
              {each.text}
            </span>
          </div>
        )
      })}
    </div>
  )
}
