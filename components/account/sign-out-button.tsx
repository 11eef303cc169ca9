'use client'
import { startTransition, useState } from 'react'
import { Button } from '@/components/ui/button'
import { forgetKeptPages } from '@/hooks/player/service-worker'
import { signOut, signOutEverywhere } from '@/server/actions/account'

/** Ends this session, or all of the person's. Pages kept for a reload without a network are forgotten first. */
export function SignOutButton({ everywhere = false }: { everywhere?: boolean }) {
  const [isPending, setPending] = useState(false)
  return (
    <Button
      look={everywhere ? 'stop' : 'outlined'}
      disabled={isPending}
      onClick={() => {
        setPending(true)
        forgetKeptPages()
        startTransition(() => (everywhere ? signOutEverywhere() : signOut()))
      }}
    >
      {everywhere ? 'Sign out everywhere' : 'Sign out'}
    </Button>
  )
}
