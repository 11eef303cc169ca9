'use client'
import { useEffect, useState } from 'react'

/** The reader's clock in milliseconds since 1970, refreshed every `everyMs`; first the moment given, so that server and client draw the same. */
export function useNow(firstMs: number, everyMs: number): number {
  const [nowMs, setNowMs] = useState(firstMs)
  useEffect(() => {
    const tick = () => setNowMs(Date.now())
    tick()
    const timer = setInterval(tick, everyMs)
    return () => clearInterval(timer)
  }, [everyMs])
  return nowMs
}
