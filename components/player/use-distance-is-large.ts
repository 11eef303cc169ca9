'use client'
import { useSyncExternalStore } from 'react'
import { usePlayer } from './player-context'

/** From this share of the screen's height on, distance text leaves no room for near text beside it. */
const LARGE_SHARE = 0.066

function subscribe(tell: () => void): () => void {
  window.addEventListener('resize', tell)
  return () => window.removeEventListener('resize', tell)
}

function isLarge(): boolean {
  const size = getComputedStyle(document.documentElement).getPropertyValue('--distance-text')
  return Number.parseFloat(size) > window.innerHeight * LARGE_SHARE
}

/** True where the screen is small for its distance, such as a laptop two metres away. */
export function useDistanceIsLarge(): boolean {
  // Read again when the member changes the screen or the distance.
  usePlayer((state) => state.preferences.distanceMetres)
  usePlayer((state) => state.preferences.screenDiagonalInches)
  return useSyncExternalStore(subscribe, isLarge, () => false)
}
