'use client'
import clsx from 'clsx'
import { ActionButton } from './button'
import { LeadButton } from './lead-button'
import styles from './floor-plan.module.css'
import { usePlayer } from './player-context'
import { usePlayerUi } from './player-ui'

/** Where what was recorded lies now, in one line. */
export function SavingLine() {
  const saving = usePlayer((state) => state.saving)
  const words =
    saving.state === 'saved'
      ? 'saved'
      : saving.state === 'saved-here'
        ? `saved here${saving.unsent > 0 ? `, ${saving.unsent} to send` : ''}`
        : saving.state === 'sending'
          ? 'sending'
          : 'not kept'
  return (
    <span
      className={clsx(
        'inline-flex min-w-0 items-center gap-[0.4em] whitespace-nowrap',
        saving.state === 'not-kept'
          ? 'text-stop'
          : saving.state === 'saved'
            ? 'text-done'
            : 'text-text-quiet',
      )}
      title={saving.message ?? undefined}
      data-testid="saving"
    >
      <SavedMark state={saving.state} />
      {words}
      {saving.message ? <span className="truncate">: {saving.message}</span> : null}
    </span>
  )
}

/** Filled where it is safe on the server, half where it is safe here, crossed where it is not kept. */
function SavedMark({ state }: { state: 'saved' | 'saved-here' | 'sending' | 'not-kept' }) {
  return (
    <svg viewBox="0 0 16 16" width="0.8em" height="0.8em" aria-hidden="true" className="flex-none">
      <rect
        x="1.5"
        y="1.5"
        width="13"
        height="13"
        fill="none"
        stroke="currentColor"
        strokeWidth="3"
      />
      {state === 'saved' ? <rect x="3" y="3" width="10" height="10" fill="currentColor" /> : null}
      {state === 'saved-here' || state === 'sending' ? (
        <rect x="3" y="8" width="10" height="5" fill="currentColor" />
      ) : null}
      {state === 'not-kept' ? (
        <path d="M3 3 L13 13 M13 3 L3 13" stroke="currentColor" strokeWidth="2.5" />
      ) : null}
    </svg>
  )
}

const SOUND_WORDS = {
  ready: 'sound on',
  blocked: 'sound is blocked: tap here',
  off: 'sound off',
  failed: 'no sound: watch the numbers',
} as const

function SoundLine() {
  const sound = usePlayer((state) => state.sound)
  const unlock = usePlayer((state) => state.unlockSound)
  if (sound === 'blocked') {
    return (
      <button
        type="button"
        onClick={unlock}
        className="min-h-12 text-stop underline underline-offset-4"
      >
        {SOUND_WORDS.blocked}
      </button>
    )
  }
  return (
    <span
      className={clsx('whitespace-nowrap', sound === 'failed' ? 'text-stop' : 'text-text-quiet')}
    >
      {SOUND_WORDS[sound]}
    </span>
  )
}

/** The thin line under the lane: what is saved, what sounds, and the keys for who walks up. */
export function StatusStrip({
  phone,
  paused,
  canUndo,
  onUndo,
  className,
}: {
  phone: boolean
  paused: boolean
  canUndo: boolean
  onUndo: () => void
  className?: string
}) {
  const ui = usePlayerUi()
  const plain = 'text-[length:var(--small)] px-[0.55em] font-medium'
  return (
    <div className={clsx(styles.strip, className)}>
      <div className="flex min-w-0 items-center gap-[1.2em] overflow-hidden">
        <SavingLine />
        <SoundLine />
      </div>
      <div className={clsx('condensed', styles.stripControls)}>
        <ActionButton look="plain" className={plain} hint="P" onClick={ui.togglePause}>
          {paused ? 'Go on' : 'Pause'}
        </ActionButton>
        {phone ? (
          <ActionButton look="plain" className={plain} onClick={() => ui.open('more')}>
            More
          </ActionButton>
        ) : (
          <>
            {canUndo ? (
              <ActionButton look="plain" className={plain} hint="⌫" onClick={onUndo}>
                Undo round
              </ActionButton>
            ) : null}
            <LeadButton look="plain" className={plain} hint="L" />
            <ActionButton
              look="plain"
              className={plain}
              hint="O"
              onClick={() => ui.open('options')}
            >
              Options
            </ActionButton>
            <ActionButton look="plain" className={plain} onClick={() => ui.open('skip')}>
              Skip block
            </ActionButton>
            <ActionButton look="plain" className={plain} onClick={() => ui.open('sound')}>
              Sound
            </ActionButton>
            <ActionButton look="plain" className={plain} hint="F" onClick={ui.toggleFullScreen}>
              Full screen
            </ActionButton>
            <ActionButton look="plain" className={plain} hint="?" onClick={() => ui.open('keys')}>
              Keys
            </ActionButton>
          </>
        )}
      </div>
    </div>
  )
}
