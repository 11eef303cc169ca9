'use client'
import clsx from 'clsx'
import { useRef, useState } from 'react'
import type { PlayerState } from '@/hooks/player/types'
import type { Position } from '@/server/engine/timeline/run-types'
import { clockText } from './texts'
import styles from './floor-plan.module.css'
import { usePaint } from './use-paint'
import { usePhoneLayout } from './use-phone-layout'
import { usePlayer, usePlayerStore } from './player-context'
import { steady } from './steady'

/** How much time the line shows, from the present to its far end. */
const LINE_MS = 45_000
/** A phone's line is short: less time at a width in which words can be read. */
const PHONE_LINE_MS = 24_000
const TICK_MS = 5_000
/** Room on the line before the next mark that a time, and a text, need at least. */
const TIME_ROOM_MS = 4_500
const TEXT_ROOM_MS = 9_000

type Coming = PlayerState['cueLine']

const sameMarks = (one: Coming, other: Coming) =>
  one.length === other.length &&
  one.every((each, index) => {
    const twin = other[index]
    // Marks keep their distance from one another while the class runs; a jump is drawn anew.
    return (
      twin !== undefined &&
      twin.mark.key === each.mark.key &&
      Math.floor(twin.dueInMs / 5_000) === Math.floor(each.dueInMs / 5_000)
    )
  })

/** The line is a container, so that its own width is the measure. */
const place = (dueInMs: number, limitMs: number) =>
  `translateX(${Math.max(0, (dueInMs / limitMs) * 100).toFixed(3)}cqw)`

/** How long the class has run between a position of the store and a painted one. */
function runSinceMs(stored: Position, painted: Position): number {
  if (stored.briefLeftMs !== null && painted.briefLeftMs !== null) {
    return stored.briefLeftMs - painted.briefLeftMs
  }
  return painted.classMs - stored.classMs
}

/** Cues, time calls and what is next, each at its distance in time, sliding towards the present. */
export function CueLine() {
  const limitMs = usePhoneLayout() ? PHONE_LINE_MS : LINE_MS
  const store = usePlayerStore()
  // Rendered when a mark comes or goes; where each stands is painted.
  const [select] = useState(() => steady((state) => state.cueLine, sameMarks))
  const cueLine = usePlayer(select)
  const line = useRef<HTMLDivElement>(null)
  const coming = cueLine
    .filter((each) => each.dueInMs > -500 && each.dueInMs < limitMs + 5_000)
    .sort((one, other) => one.dueInMs - other.dueInMs)

  usePaint((now) => {
    if (!line.current) return
    const state = store.getState()
    const sinceMs = state.position ? runSinceMs(state.position, now) : 0
    const dueIn = new Map(state.cueLine.map((each) => [each.mark.key, each.dueInMs - sinceMs]))
    for (const element of line.current.querySelectorAll<HTMLElement>('[data-mark]')) {
      const dueInMs = dueIn.get(element.dataset['mark'] ?? '') ?? 0
      element.style.transform = place(dueInMs, limitMs)
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
            data-mark={each.mark.key}
            className={styles.mark}
            style={{
              transform: place(each.dueInMs, limitMs),
              maxWidth: `${(Math.min(roomMs, limitMs - each.dueInMs) / limitMs) * 100}%`,
            }}
          >
            {/* Marks that stand close together keep what there is room for. */}
            <b
              className={clsx('condensed', roomMs < TIME_ROOM_MS && 'invisible')}
              style={{ fontVariantNumeric: 'tabular-nums' }}
            >
              {clockText(each.dueInMs)}
            </b>
            {roomMs < TEXT_ROOM_MS ? null : (
              <span className="condensed" style={{ fontWeight: 450 }}>
                {each.text}
              </span>
            )}
          </div>
        )
      })}
    </div>
  )
}
