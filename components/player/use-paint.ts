'use client'
import { useEffect, useRef } from 'react'
import type { Position } from '@/server/engine/timeline/run-types'
import { usePlayerStore } from './player-context'

/**
 * Calls `paint` in every animation frame with the position of that very instant. Painting writes to
 * the DOM itself: rendering sixty times a second would cost a slow laptop its figure.
 */
export function usePaint(paint: (position: Position) => void): void {
  const store = usePlayerStore()
  const latest = useRef(paint)
  useEffect(() => {
    latest.current = paint
  })
  useEffect(() => {
    let known: Position | null = null
    let knownAtMs = 0
    let frame = 0
    const draw = (frameMs: number) => {
      const { position } = store.getState()
      if (position) {
        if (position !== known) {
          known = position
          knownAtMs = performance.now()
        }
        latest.current(ahead(position, Math.max(0, frameMs - knownAtMs)))
      }
      frame = requestAnimationFrame(draw)
    }
    frame = requestAnimationFrame(draw)
    return () => cancelAnimationFrame(frame)
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
