'use client'
import { useEffect } from 'react'
import { browserMemory } from './player/memory'
import { browserOutbox } from './player/outbox'
import { keepPagesOnlyFor } from './player/service-worker'

/** Sends from any page what a player could not send before its page was closed or the browser ended. */
export function useOutboxDrain(membershipId: string): void {
  useEffect(() => {
    const outbox = browserOutbox(browserMemory(), membershipId)
    outbox.kick()
    void keepPagesOnlyFor(membershipId)
    return () => outbox.close()
  }, [membershipId])
}
