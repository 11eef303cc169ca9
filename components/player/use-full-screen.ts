'use client'
import { useCallback, useSyncExternalStore } from 'react'

function subscribe(tell: () => void): () => void {
  document.addEventListener('fullscreenchange', tell)
  return () => document.removeEventListener('fullscreenchange', tell)
}

/** Full screen and out of it. A browser that has none, or refuses, leaves the page as it is. */
export function useFullScreen(): { on: boolean; toggle: () => void } {
  const on = useSyncExternalStore(
    subscribe,
    () => document.fullscreenElement != null,
    () => false,
  )
  const toggle = useCallback(() => {
    const change = document.fullscreenElement
      ? document.exitFullscreen?.()
      : document.documentElement.requestFullscreen?.()
    change?.catch(() => undefined)
  }, [])
  return { on, toggle }
}
