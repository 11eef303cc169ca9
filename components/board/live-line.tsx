'use client'
import clsx from 'clsx'
import { useNow } from '@/hooks/use-now'
import type { LiveState } from '@/hooks/live-channel'
import { agoText, timeOfDay } from '@/server/contract/format'

interface LiveLineProps {
  readAt: string
  live: LiveState
  problem: string | null
  reload: () => void
  timeZone: string
}

/** Whether the board is connected, and how old what it shows is when it is not. */
export function LiveLine({ readAt, live, problem, reload, timeZone }: LiveLineProps) {
  const nowMs = useNow(Date.parse(readAt), 1_000)
  const ageMs = Math.max(0, nowMs - Date.parse(readAt))
  const lost = problem !== null || (live === 'lost' && ageMs > 10_000)
  return (
    <p role="status" className="mt-3 flex min-h-8 flex-wrap items-center gap-x-3 gap-y-1">
      <span
        aria-hidden
        className={clsx(
          'size-3.5',
          lost
            ? 'border-4 border-stop'
            : live === 'connecting'
              ? 'border-4 border-line-lesser'
              : 'bg-done',
        )}
      />
      {lost ? (
        <>
          <span className="font-semibold text-stop">Not connected.</span>
          <span>
            {problem ? `${problem} ` : ''}You see {timeOfDay(readAt, timeZone)}, {agoText(ageMs)}{' '}
            old. Trying again by itself.
          </span>
          <button
            type="button"
            onClick={reload}
            className="min-h-8 cursor-pointer font-semibold text-rest underline decoration-2 underline-offset-4"
          >
            Try now
          </button>
        </>
      ) : (
        <span className="text-text-quiet">
          {live === 'live'
            ? 'Live'
            : live === 'connecting'
              ? 'Connecting'
              : 'Reading every two seconds'}
        </span>
      )}
    </p>
  )
}
