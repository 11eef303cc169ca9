'use client'
import { useSyncExternalStore } from 'react'

function subscribe(tell: () => void): () => void {
  window.addEventListener('resize', tell)
  return () => window.removeEventListener('resize', tell)
}

function share(): number {
  const size = document.documentElement.style.getPropertyValue('--distance-text')
  return Number.parseFloat(size) / window.innerHeight || 0
}

/** Distance text as a share of the screen's height: a laptop two metres away has 0.09, a television 0.05. */
export function useDistanceShare(): number {
  return useSyncExternalStore(subscribe, share, () => 0)
}
