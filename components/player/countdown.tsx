'use client'
import { useRef } from 'react'
import type { Position } from '@/server/engine/timeline/run-types'
import { clockEms } from './scene'
import styles from './floor-plan.module.css'
import { clockText } from './texts'
import { usePaint } from './use-paint'

/** What the big clock counts: a brief's own time, the seconds of a count-in, else the segment's rest. */
export function countdownText(position: Position): string {
  if (position.phase === 'brief') {
    return position.briefLeftMs === null ? '–:––' : clockText(position.briefLeftMs)
  }
  if (position.segment?.kind === 'count-in') return String(Math.ceil(position.leftMs / 1000))
  return clockText(position.leftMs)
}

/** Milliseconds until the digits change; none while they stand. */
function untilNextSecond({ phase, halted, briefLeftMs, leftMs }: Position): number | undefined {
  const shownMs = phase === 'brief' ? briefLeftMs : leftMs
  return halted || !shownMs ? undefined : shownMs % 1_000 || 1_000
}

function widestText(position: Position): string {
  if (position.phase === 'brief')
    return position.briefLeftMs === null ? '0:00' : clockText(position.briefLeftMs)
  const segment = position.segment
  if (!segment) return '0:00'
  if (segment.kind === 'count-in') return '0:00'
  return clockText(segment.endMs - segment.startMs)
}

/**
 * The countdown. Its digits are painted frame by frame; a screen reader hears the calls and cues
 * instead of a ticking number.
 */
export function Countdown({ position }: { position: Position }) {
  const digits = useRef<HTMLSpanElement>(null)
  usePaint((now) => {
    const text = countdownText(now)
    if (digits.current && digits.current.textContent !== text) digits.current.textContent = text
    return untilNextSecond(now)
  })
  return (
    <div
      role="timer"
      aria-live="off"
      aria-label="Time left"
      className={`figures ${styles.clock}`}
      style={{ ['--ems' as string]: clockEms(widestText(position)).toFixed(2) }}
    >
      <span ref={digits} data-testid="countdown" suppressHydrationWarning>
        {countdownText(position)}
      </span>
    </div>
  )
}
