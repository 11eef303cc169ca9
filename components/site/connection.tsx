'use client'
import { useEffect, useSyncExternalStore } from 'react'
import { Sign } from '@/components/ui/sign'
import { registerServiceWorker } from '@/hooks/player/service-worker'
import { useOutboxDrain } from '@/hooks/use-outbox-drain'

function subscribe(tell: () => void): () => void {
  window.addEventListener('online', tell)
  window.addEventListener('offline', tell)
  return () => {
    window.removeEventListener('online', tell)
    window.removeEventListener('offline', tell)
  }
}

/** Says when the network is away, and sends what a class left unsent. */
export function Connection({ membershipId }: { membershipId: string | null }) {
  const isOnline = useSyncExternalStore(
    subscribe,
    () => navigator.onLine,
    () => true,
  )
  useEffect(registerServiceWorker, [])
  return (
    <>
      {membershipId === null ? null : <Drain membershipId={membershipId} />}
      <div role="status">
        {isOnline ? null : (
          <p className="mt-2 flex items-center gap-3 border-y-4 border-rest bg-raised page py-2 leading-snug">
            <Sign tone="info" />
            <span>
              <strong>No network.</strong> You see what was loaded; a class that is open goes on and
              is sent later.
            </span>
          </p>
        )}
      </div>
    </>
  )
}

function Drain({ membershipId }: { membershipId: string }) {
  useOutboxDrain(membershipId)
  return null
}
