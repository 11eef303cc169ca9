'use client'
import { ActionButton } from './button'
import { usePlayer } from './player-context'

const RATES = [
  { rate: 0.8, words: 'slower' },
  { rate: 1, words: 'usual' },
  { rate: 1.2, words: 'faster' },
  { rate: 1.4, words: 'much faster' },
] as const

/** Which voice speaks the cues, how fast and how loud, and the check by ear. */
export function VoiceControls() {
  const preferences = usePlayer((state) => state.preferences)
  const set = usePlayer((state) => state.setPreferences)
  const voices = usePlayer((state) => state.voices)
  const tryVoice = usePlayer((state) => state.tryVoice)
  if (voices.length === 0) {
    return (
      <p role="status" className="border-l-8 border-rest pl-3">
        This browser has no voice. Cues and calls are written on the screen, and the sounds go on as
        usual.
      </p>
    )
  }
  const chosen = voices.find((voice) => voice.id === preferences.voice) ?? voices[0]
  const field = 'min-h-12 w-full max-w-[22em] border-3 border-text bg-raised px-2'
  return (
    <div className="grid gap-3">
      <label className="flex min-h-12 items-center gap-3">
        <input
          type="checkbox"
          className="size-7 flex-none accent-(--text)"
          checked={preferences.voiceOn}
          onChange={(event) => set({ voiceOn: event.target.checked })}
        />
        Cues and calls spoken
      </label>
      <label className="grid gap-1">
        Voice
        <select
          value={chosen?.id}
          disabled={!preferences.voiceOn}
          onChange={(event) => set({ voice: event.target.value })}
          className={field}
        >
          {voices.map((voice) => (
            <option key={voice.id} value={voice.id}>
              {voice.name} ({voice.language})
            </option>
          ))}
        </select>
      </label>
      <label className="grid gap-1">
        Speed
        <select
          value={preferences.voiceRate}
          disabled={!preferences.voiceOn}
          onChange={(event) => set({ voiceRate: Number(event.target.value) })}
          className={field}
        >
          {RATES.map(({ rate, words }) => (
            <option key={rate} value={rate}>
              {words}
            </option>
          ))}
        </select>
      </label>
      <label className="grid gap-1">
        <span>Voice volume, {Math.round(preferences.voiceVolume * 100)} %</span>
        <input
          type="range"
          min={0}
          max={100}
          step={5}
          value={Math.round(preferences.voiceVolume * 100)}
          disabled={!preferences.voiceOn}
          onChange={(event) => set({ voiceVolume: Number(event.target.value) / 100 })}
          className="h-12 w-full max-w-[22em] accent-(--text)"
        />
      </label>
      <ActionButton
        className="justify-self-start"
        disabled={!preferences.voiceOn}
        onClick={tryVoice}
      >
        Hear the voice
      </ActionButton>
      <p className="text-text-quiet">
        Under the beeps it speaks softer. All that it says is written on the screen.
      </p>
    </div>
  )
}
