'use client'
import { useEffect, useState } from 'react'

/** True once no key, pointer or focus has moved for `ms`, while `on`: near text may fade then. */
export function useIdle(ms: number, on: boolean): boolean {
  const [idle, setIdle] = useState(false)
  useEffect(() => {
    if (!on) return
    let timer = setTimeout(() => setIdle(true), ms)
    const wake = () => {
      setIdle(false)
      clearTimeout(timer)
      timer = setTimeout(() => setIdle(true), ms)
    }
    const kinds = ['pointermove', 'pointerdown', 'keydown', 'focusin'] as const
    for (const kind of kinds) window.addEventListener(kind, wake, { passive: true })
    return () => {
      clearTimeout(timer)
      for (const kind of kinds) window.removeEventListener(kind, wake)
    }
  }, [ms, on])
  return idle && on
}
