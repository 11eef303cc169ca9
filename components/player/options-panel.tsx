'use client'
import clsx from 'clsx'
import { useState } from 'react'
import type { MovementOption, Reason } from '@/server/engine/spec/movement'
import { REASONS } from '@/server/engine/spec/names'
import { ActionButton } from './button'
import { heldReason } from './held'
import { Panel } from './panel'
import { usePlayer } from './player-context'
import type { StationView } from './scene'
import { schemeText, sidesText, REASON_TEXT } from './texts'

/** Every option of a station, found by what bothers the member. */
export function OptionsPanel({
  view,
  views,
  onClose,
}: {
  view: StationView | null
  /** Stations of the block, to change to another one. */
  views: readonly StationView[]
  onClose: () => void
}) {
  const [key, setKey] = useState(view?.key ?? null)
  const [bother, setBother] = useState<Reason | null>(null)
  const send = usePlayer((state) => state.send)
  const data = usePlayer((state) => state.data)
  const events = usePlayer((state) => state.events)
  const shown = views.find((each) => each.key === key) ?? view
  if (!shown) {
    return (
      <Panel title="Options" onClose={onClose}>
        <p>
          Nothing to choose here. The next block’s options can be chosen in its brief or its rest.
        </p>
      </Panel>
    )
  }
  const reasons = REASONS.filter((reason) =>
    shown.options.some((option) => option.reasons.includes(reason)),
  )
  const locked = heldReason(data, events, shown)
  const choose = (option: MovementOption) => {
    send({
      type: 'choose-option',
      block: shown.block,
      station: shown.index,
      option: option.option,
      ...(bother ? { reason: bother } : {}),
    })
    onClose()
  }
  const matching = bother
    ? shown.options.filter((option) => option.reasons.includes(bother))
    : shown.options
  return (
    <Panel title={shown.name} onClose={onClose}>
      {views.length > 1 ? (
        <div role="group" aria-label="Station" className="flex flex-wrap gap-2">
          {views.map((each) => (
            <ActionButton
              key={each.key}
              aria-pressed={each.key === shown.key}
              className={clsx(each.key === shown.key && 'bg-present text-on-present')}
              onClick={() => {
                setKey(each.key)
                setBother(null)
              }}
            >
              {each.name}
            </ActionButton>
          ))}
        </div>
      ) : null}
      <fieldset>
        <legend className="mb-2 condensed text-[1.2em]">What bothers you?</legend>
        <div className="flex flex-wrap gap-2">
          {reasons.map((reason) => (
            <ActionButton
              key={reason}
              aria-pressed={bother === reason}
              className={clsx(bother === reason && 'bg-present text-on-present')}
              onClick={() => setBother(bother === reason ? null : reason)}
            >
              {REASON_TEXT[reason]}
            </ActionButton>
          ))}
        </div>
      </fieldset>
      {locked ? (
        <p className="border-l-8 border-rest pl-3">
          Easier for now ({locked}): it stays until you and your coach have cleared it.
        </p>
      ) : null}
      <ul className="border-t-4 border-text">
        {matching.map((option) => {
          const chosen = option.option === shown.option?.option
          const barred = locked !== null && option.level !== 'easier'
          return (
            <li key={option.option} className="border-b-4 border-text">
              <button
                type="button"
                aria-pressed={chosen}
                disabled={barred}
                onClick={() => choose(option)}
                className="flex w-full items-stretch gap-4 text-left hover:bg-fill disabled:opacity-60"
              >
                <span
                  className={clsx(
                    'w-3 flex-none',
                    chosen && 'bg-present outline-3 outline-text outline-solid',
                  )}
                />
                <span className="min-w-0 flex-1 py-3">
                  <span className="block condensed text-[1.45em] leading-tight">{option.name}</span>
                  <span className="block">{option.description}</span>
                  <span className="block text-text-quiet">
                    {[
                      levelText[option.level],
                      option.reasons.map((reason) => REASON_TEXT[reason]).join(', '),
                      option.reps ? `${schemeText(option.reps)} reps` : null,
                      sidesText(option.sides),
                      chosen ? 'yours now' : null,
                    ]
                      .filter(Boolean)
                      .join(' · ')}
                  </span>
                </span>
              </button>
            </li>
          )
        })}
      </ul>
    </Panel>
  )
}

const levelText = { easier: 'easier', 'as-planned': 'as planned', harder: 'harder' } as const
