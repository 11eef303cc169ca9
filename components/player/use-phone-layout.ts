'use client'
import { useSyncExternalStore } from 'react'

const QUERY = '(width < 700px)'

function subscribe(tell: () => void): () => void {
  const list = window.matchMedia?.(QUERY)
  list?.addEventListener('change', tell)
  return () => list?.removeEventListener('change', tell)
}

/** True where the floor plan is the phone's own. */
export function usePhoneLayout(): boolean {
  return useSyncExternalStore(
    subscribe,
    () => window.matchMedia?.(QUERY).matches ?? false,
    () => false,
  )
}
