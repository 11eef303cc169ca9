'use client'
import { ActionButton } from './button'
import { useSteadyPosition } from './steady'
import { usePlayer } from './player-context'
import { usePlayerUi } from './player-ui'

/** Joins or leaves the lead; there only while rounds are being done. */
export function LeadButton({
  look,
  className,
  hint,
  onDone,
}: {
  look?: 'plain'
  className?: string
  hint?: string
  onDone?: () => void
}) {
  const ui = usePlayerUi()
  const position = useSteadyPosition()
  const format = usePlayer(
    (state) => state.data.version.spec.blocks[position?.blockIndex ?? -1]?.format.type,
  )
  const isRounds = format === 'rounds' || format === 'for-time'
  if (!position || !isRounds || position.segment?.kind !== 'work' || position.workedOff) return null
  return (
    <ActionButton
      {...(look ? { look } : {})}
      {...(hint ? { hint } : {})}
      className={className}
      aria-pressed={position.lead !== null}
      disabled={position.halted !== null}
      onClick={() => {
        ui.toggleLead()
        onDone?.()
      }}
    >
      {position.lead ? 'Leave the lead' : 'Follow the lead'}
    </ActionButton>
  )
}
