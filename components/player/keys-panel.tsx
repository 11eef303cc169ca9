'use client'
import { KeyHint } from './button'
import { Panel } from './panel'
import { usePlayer } from './player-context'

const KEYS: readonly [string, string][] = [
  ['Space', 'Log round; in a rest 15 s more; in a brief go on'],
  ['Page Down', 'The same, for a clicker in the hand'],
  ['Play, pause', 'Pause, and go on: media keys, headset, lock screen'],
  ['Next', 'The media key: log round; in a brief or a rest, go on'],
  ['Backspace', 'Take the last round back'],
  ['P', 'Pause, and go on'],
  ['1', 'Easier option'],
  ['2', 'As planned'],
  ['3', 'Harder option'],
  ['O', 'All options, by what bothers you'],
  ['L', 'Follow the lead, and leave it'],
  ['R', 'Rest as needed, and go on; cuts a rest once it may'],
  ['H', 'This hurts'],
  ['S', 'Stop at once'],
  ['F', 'Full screen'],
  ['Escape', 'Leave full screen or close a panel. It never ends a class'],
  ['?', 'This list'],
]

/** All keys, and the switch that turns the letters off. */
export function KeysPanel({ onClose }: { onClose: () => void }) {
  const lettersOn = usePlayer((state) => state.preferences.lettersOn)
  const setPreferences = usePlayer((state) => state.setPreferences)
  return (
    <Panel title="Keys" onClose={onClose}>
      <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-5 gap-y-2">
        {KEYS.map(([key, what]) => (
          <div key={key} className="contents">
            <dt className="border-3 border-text px-2 py-0.5 text-center condensed font-semibold">
              {key}
            </dt>
            <dd>{what}</dd>
          </div>
        ))}
      </dl>
      <label className="flex min-h-12 items-center gap-3">
        <input
          type="checkbox"
          className="size-7 accent-(--text)"
          checked={lettersOn}
          onChange={(event) => setPreferences({ lettersOn: event.target.checked })}
        />
        <span>
          Letters and figures work as keys <KeyHint>A–Z</KeyHint>
        </span>
      </label>
    </Panel>
  )
}
