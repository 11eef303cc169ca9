'use client'
import { useState } from 'react'
import { easierFor, HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import type { HurtPlace } from '@/server/engine/tally/events'
import { HURT_PLACES } from '@/server/engine/tally/names'
import { ActionButton } from './button'
import { Panel } from './panel'
import { usePlayer } from './player-context'
import { usePlayerUi } from './player-ui'
import type { StationView } from './scene'

/**
 * 'This hurts': one press says where, and that joint's easier option is on offer at once. It is
 * recorded with the first press; nothing more has to be said.
 */
export function HurtPanel({ view, onClose }: { view: StationView | null; onClose: () => void }) {
  const send = usePlayer((state) => state.send)
  const ui = usePlayerUi()
  const [where, setWhere] = useState<HurtPlace | null>(null)
  const offered =
    where && view?.movement ? (easierFor(where, view.station, view.movement) ?? null) : null

  if (where === null) {
    return (
      <Panel title="Where does it hurt?" onClose={onClose}>
        <ul className="grid grid-cols-2 gap-3 md:grid-cols-3">
          {HURT_PLACES.map((place) => (
            <li key={place}>
              <ActionButton
                className="w-full py-4 text-[1.3em]"
                onClick={() => {
                  send({ type: 'hurt', where: place })
                  setWhere(place)
                }}
              >
                {HURT_PLACE_TEXT[place]}
              </ActionButton>
            </li>
          ))}
        </ul>
        <p className="max-w-[34em]">
          Your coach sees it. The clock runs on; take a rest whenever you need one. If it is in your
          chest, or you feel faint, press Stop.
        </p>
        <ActionButton look="stop" className="self-start text-[1.3em]" onClick={ui.stop} hint="S">
          Stop
        </ActionButton>
      </Panel>
    )
  }
  return (
    <Panel title={`${HURT_PLACE_TEXT[where]}: noted`} onClose={onClose}>
      {view && offered && offered.option !== view.option?.option ? (
        <>
          <p className="max-w-[34em] text-[1.25em]">
            For {view.name.toLowerCase()}, this is easier on it:
          </p>
          <div className="border-l-8 border-text pl-4">
            <p className="condensed text-[1.9em] leading-tight font-bold">{offered.name}</p>
            <p>{offered.description}</p>
          </div>
          <div className="flex flex-wrap gap-4 text-[1.3em]">
            <ActionButton
              look="primary"
              autoFocus
              onClick={() => {
                send({
                  type: 'choose-option',
                  block: view.block,
                  station: view.index,
                  option: offered.option,
                  ...reasonOf(where, offered.reasons),
                })
                onClose()
              }}
            >
              Take it
            </ActionButton>
            <ActionButton
              onClick={() => {
                send({ type: 'rest-as-needed' })
                onClose()
              }}
            >
              Rest as needed
            </ActionButton>
          </div>
          <p className="max-w-[34em] text-text-quiet">
            It stays your option until you and your coach have cleared it.
          </p>
        </>
      ) : (
        <>
          <p className="max-w-[34em] text-[1.25em]">
            {view && offered
              ? `You are on the option that answers it: ${offered.name}. If it still hurts, rest, or leave this block out.`
              : `${view ? view.name : 'This movement'} has no option for it here. Rest, leave this block out, or stop: nobody counts that against you.`}
          </p>
          <div className="flex flex-wrap gap-4 text-[1.3em]">
            <ActionButton
              look="primary"
              autoFocus
              onClick={() => {
                send({ type: 'rest-as-needed' })
                onClose()
              }}
            >
              Rest as needed
            </ActionButton>
            <ActionButton onClick={() => ui.open('skip')}>Skip block</ActionButton>
            <ActionButton look="stop" onClick={ui.stop}>
              Stop
            </ActionButton>
          </div>
        </>
      )}
    </Panel>
  )
}

function reasonOf(
  where: HurtPlace,
  reasons: readonly string[],
): { reason?: Exclude<HurtPlace, 'elbow' | 'elsewhere'> } {
  if (where === 'elbow' || where === 'elsewhere' || !reasons.includes(where)) return {}
  return { reason: where }
}
