'use client'
import { startTransition, useState } from 'react'
import { Button } from '@/components/ui/button'
import { ConfirmButton } from '@/components/ui/confirm-button'
import { forgetSentClasses } from '@/hooks/player/memory'
import { forgetKeptPages } from '@/hooks/player/service-worker'
import { signOut, signOutEverywhere } from '@/server/actions/account'

/** What the browser kept of the person and the server has is forgotten before the session ends. */
function useLeaving(leave: () => Promise<void>): { isPending: boolean; go: () => void } {
  const [isPending, setPending] = useState(false)
  return {
    isPending,
    go: () => {
      setPending(true)
      startTransition(async () => {
        await Promise.all([forgetKeptPages(), forgetSentClasses()])
        await leave()
      })
    },
  }
}

/** Ends this session. `className`: where it is one line of a menu instead of a block of paint. */
export function SignOutButton({ className }: { className?: string }) {
  const { isPending, go } = useLeaving(signOut)
  const words = isPending ? 'Signing out' : 'Sign out'
  return className ? (
    <button type="button" disabled={isPending} onClick={go} className={className}>
      {words}
    </button>
  ) : (
    <Button look="outlined" disabled={isPending} onClick={go}>
      {words}
    </Button>
  )
}

/** Ends every session of the person, this one too; asks once. */
export function SignOutEverywhereButton() {
  const { isPending, go } = useLeaving(signOutEverywhere)
  return (
    <ConfirmButton
      title="Sign out everywhere?"
      explanation="Every browser that is signed in with your account is signed out, this one too. A class that is being played there goes on, and its rounds are sent after the next sign-in."
      confirm="Sign out everywhere"
      disabled={isPending}
      onConfirm={go}
    >
      {isPending ? 'Signing out' : 'Sign out everywhere'}
    </ConfirmButton>
  )
}
