'use client'
import { MessagePage } from '@/components/site/message-page'
import { Button } from '@/components/ui/button'

export default function ErrorPage({
  error,
  reset,
}: {
  error: Error & { digest?: string }
  reset: () => void
}) {
  return (
    <MessagePage title="That did not work" figure="hip-hinge">
      <title>That did not work · Floorside</title>
      <p>
        The page could not be read just now. Nothing that you did is lost: rounds are kept on this
        computer until they are sent.
      </p>
      {error.digest ? (
        <p className="text-text-quiet">If it stays, tell your gym this number: {error.digest}</p>
      ) : null}
      <Button onClick={reset}>Try again</Button>
    </MessagePage>
  )
}
