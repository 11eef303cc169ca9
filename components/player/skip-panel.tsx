'use client'
import { ActionButton } from './button'
import { Panel } from './panel'
import { usePlayer } from './player-context'

const REASONS = [
  'It hurts',
  'Too hard today',
  'No kit for it',
  'No room for it',
  'No time',
] as const

/** Leaves the present block, with a reason or without. */
export function SkipPanel({ title, onClose }: { title: string; onClose: () => void }) {
  const send = usePlayer((state) => state.send)
  const skip = (reason?: string) => {
    send({ type: 'skip-block', ...(reason ? { reason } : {}) })
    onClose()
  }
  return (
    <Panel title={`Skip ‘${title}’?`} onClose={onClose} closeWord="Stay in it">
      <p className="max-w-[34em]">
        The class goes on with the next block. What you have logged here stays. Your coach sees why,
        if you say so.
      </p>
      <ul className="grid max-w-[26em] gap-3">
        {REASONS.map((reason) => (
          <li key={reason}>
            <ActionButton className="w-full py-4 text-[1.25em]" onClick={() => skip(reason)}>
              {reason}
            </ActionButton>
          </li>
        ))}
        <li>
          <ActionButton className="w-full py-4 text-[1.25em]" onClick={() => skip()}>
            Skip without a reason
          </ActionButton>
        </li>
      </ul>
    </Panel>
  )
}
