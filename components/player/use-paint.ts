'use client'
import { useEffect, useRef } from 'react'
import type { Position } from '@/server/engine/timeline/run-types'
import { usePlayerStore } from './player-context'

/** A change nearer than this is painted at its own instant: a frame may come too late for its sound. */
const SOON_MS = 60

/**
 * Calls `paint` in every animation frame with the position of that very instant. Painting writes to
 * the DOM itself: rendering sixty times a second would cost a slow laptop its figure. What `paint` gives
 * back, if anything, is in how many milliseconds it has something new to paint.
 */
export function usePaint(paint: (position: Position) => number | void): void {
  const store = usePlayerStore()
  const latest = useRef(paint)
  useEffect(() => {
    latest.current = paint
  })
  useEffect(() => {
    let frame = 0
    let timer: ReturnType<typeof setTimeout> | null = null
    const draw = () => {
      const { position, positionAtMs } = store.getState()
      if (!position) return
      const sinceMs = Math.max(0, performance.now() - positionAtMs)
      const inMs = latest.current(ahead(position, sinceMs))
      if (typeof inMs !== 'number' || inMs > SOON_MS || timer !== null) return
      timer = setTimeout(
        () => {
          timer = null
          draw()
        },
        Math.max(0, inMs),
      )
    }
    const step = () => {
      draw()
      frame = requestAnimationFrame(step)
    }
    frame = requestAnimationFrame(step)
    return () => {
      cancelAnimationFrame(frame)
      if (timer !== null) clearTimeout(timer)
    }
  }, [store])
}

/** The position `ms` later, within its segment; the next computed one takes over at its end. */
function ahead(position: Position, ms: number): Position {
  if (position.halted || ms === 0) return position
  if (position.phase === 'brief') {
    if (position.briefLeftMs === null) return position
    return { ...position, briefLeftMs: Math.max(0, position.briefLeftMs - ms) }
  }
  if (position.phase !== 'segment') return position
  const step = Math.min(ms, position.leftMs)
  return {
    ...position,
    classMs: position.classMs + step,
    elapsedMs: position.elapsedMs + step,
    leftMs: position.leftMs - step,
    bodyElapsedMs: position.bodyElapsedMs + step,
    bodyLeftMs: Math.max(0, position.bodyLeftMs - step),
    lead:
      position.lead === null || position.lead.isWaiting
        ? position.lead
        : {
            ...position.lead,
            elapsedMs: Math.min(position.lead.lengthMs, position.lead.elapsedMs + step),
          },
    restingMs: position.restingMs === null ? null : position.restingMs + step,
    rest: position.rest
      ? { ...position.rest, mayCutInMs: Math.max(0, position.rest.mayCutInMs - step) }
      : null,
  }
}
