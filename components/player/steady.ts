/**
 * A selector that keeps giving its last value while `same` finds the next one equal, so that a store
 * which is refreshed several times a second renders only where something to be seen has changed.
 */
import { useState } from 'react'
import type { PlayerStore } from '@/hooks/player/types'
import type { Position } from '@/server/engine/timeline/run-types'
import { usePlayer } from './player-context'

export function steady<T>(select: (state: PlayerStore) => T, same: (one: T, other: T) => boolean) {
  let last: { value: T } | null = null
  return (state: PlayerStore): T => {
    const next = select(state)
    if (last && same(last.value, next)) return last.value
    last = { value: next }
    return next
  }
}

function samePlace(one: Position | null, other: Position | null): boolean {
  if (one === other) return true
  if (!one || !other) return false
  return (
    one.phase === other.phase &&
    one.halted === other.halted &&
    one.segmentIndex === other.segmentIndex &&
    one.segment === other.segment &&
    one.blockIndex === other.blockIndex &&
    one.round === other.round &&
    one.workedOff === other.workedOff &&
    (one.briefLeftMs === null) === (other.briefLeftMs === null) &&
    (one.restingMs === null) === (other.restingMs === null) &&
    (one.rest === null) === (other.rest === null) &&
    (one.rest === null || one.rest.mayCutInMs <= 0) ===
      (other.rest === null || other.rest.mayCutInMs <= 0) &&
    one.rest?.mayLengthenMs === other.rest?.mayLengthenMs &&
    sameLead(one.lead, other.lead)
  )
}

/** A new rep is something to be seen; how far it is, the figure shows by itself. */
function sameLead(one: Position['lead'], other: Position['lead']): boolean {
  if (!one || !other) return one === other
  return (
    one.round === other.round &&
    one.station === other.station &&
    one.state === other.state &&
    one.rep === other.rep &&
    one.of === other.of &&
    one.side === other.side &&
    one.logs === other.logs &&
    one.isWaiting === other.isWaiting
  )
}

/** The position, given anew only when something other than its running times has changed. */
export function useSteadyPosition(): Position | null {
  const [select] = useState(() => steady((state) => state.position, samePlace))
  return usePlayer(select)
}
