'use client'
import { ActionButton } from './button'
import { LeadButton } from './lead-button'
import { Panel } from './panel'
import { usePlayerUi } from './player-ui'

/** On a phone: what a wide screen has in its bottom line. */
export function MorePanel({
  onClose,
  onUndo,
}: {
  onClose: () => void
  onUndo: (() => void) | null
}) {
  const ui = usePlayerUi()
  const wide = 'w-full py-4 text-[1.25em]'
  return (
    <Panel title="More" onClose={onClose}>
      <div className="grid gap-3">
        {onUndo ? (
          <ActionButton
            className={wide}
            onClick={() => {
              onUndo()
              onClose()
            }}
          >
            Undo round
          </ActionButton>
        ) : null}
        <LeadButton className={wide} onDone={onClose} />
        <ActionButton className={wide} onClick={() => ui.open('options')}>
          All options
        </ActionButton>
        <ActionButton className={wide} onClick={() => ui.open('skip')}>
          Skip block
        </ActionButton>
        <ActionButton className={wide} onClick={() => ui.open('sound')}>
          Sound
        </ActionButton>
        <ActionButton className={wide} onClick={ui.toggleFullScreen}>
          Full screen
        </ActionButton>
        <ActionButton className={wide} onClick={() => ui.open('keys')}>
          Keys
        </ActionButton>
      </div>
    </Panel>
  )
}
