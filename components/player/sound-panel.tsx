'use client'
import { ActionButton } from './button'
import { Panel } from './panel'
import { usePlayer } from './player-context'
import { VoiceControls } from './voice-controls'

/** Volume, the check by ear, and what to do where no sound comes. */
export function SoundControls() {
  const preferences = usePlayer((state) => state.preferences)
  const setPreferences = usePlayer((state) => state.setPreferences)
  const setVolume = usePlayer((state) => state.setVolume)
  const playCount = usePlayer((state) => state.playCount)
  const sound = usePlayer((state) => state.sound)
  return (
    <div className="grid gap-3">
      <label className="flex min-h-12 items-center gap-3">
        <input
          type="checkbox"
          className="size-7 flex-none accent-(--text)"
          checked={preferences.soundOn}
          onChange={(event) => setPreferences({ soundOn: event.target.checked })}
        />
        Sound on
      </label>
      <label className="grid gap-1">
        <span>Volume of the sounds, {Math.round(preferences.soundVolume * 100)} %</span>
        <input
          type="range"
          min={0}
          max={100}
          step={5}
          value={Math.round(preferences.soundVolume * 100)}
          disabled={!preferences.soundOn}
          onChange={(event) => setVolume(Number(event.target.value) / 100)}
          className="h-12 w-full max-w-[22em] accent-(--text)"
        />
      </label>
      <ActionButton
        className="justify-self-start"
        disabled={!preferences.soundOn}
        onClick={playCount}
      >
        Play the count
      </ActionButton>
      <p role="status" className="text-text-quiet">
        {sound === 'blocked'
          ? 'Your browser holds the sound back until you press something here: play the count.'
          : sound === 'failed'
            ? 'No sound could be made here. Everything that sounds is on the screen as well.'
            : 'A knock for the count, a bell to start, two low bells to end, a quick three when a rest is over, a soft double at half-time.'}
      </p>
    </div>
  )
}

export function SoundPanel({ onClose }: { onClose: () => void }) {
  return (
    <Panel title="Sound and voice" onClose={onClose}>
      <div className="grid gap-6 md:grid-cols-2">
        <SoundControls />
        <VoiceControls />
      </div>
    </Panel>
  )
}
