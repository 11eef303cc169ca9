'use client'
import { startTransition, useState } from 'react'
import { Button } from '@/components/ui/button'
import { forgetSentClasses } from '@/hooks/player/memory'
import { forgetKeptPages } from '@/hooks/player/service-worker'
import { signOut, signOutEverywhere } from '@/server/actions/account'

/** Ends this session, or all of the person's. What the browser kept of them and the server has is forgotten first. */
export function SignOutButton({ everywhere = false }: { everywhere?: boolean }) {
  const [isPending, setPending] = useState(false)
  return (
    <Button
      look={everywhere ? 'stop' : 'outlined'}
      disabled={isPending}
      onClick={() => {
        setPending(true)
        startTransition(async () => {
          await Promise.all([forgetKeptPages(), forgetSentClasses()])
          await (everywhere ? signOutEverywhere() : signOut())
        })
      }}
    >
      {everywhere ? 'Sign out everywhere' : 'Sign out'}
    </Button>
  )
}
