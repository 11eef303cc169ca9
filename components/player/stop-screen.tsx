'use client'
import { useEffect, useRef, useState } from 'react'
import {
  AFTER_RED_FLAG,
  emergencyText,
  STOP_ADVICE,
  STOP_SIGN_TEXT,
} from '@/server/engine/fit/stop-signs'
import { RED_FLAG_SIGNS, type StopSign } from '@/server/engine/tally/events'
import { ActionButton } from './button'
import { usePlayer } from './player-context'

const OTHER_SIGNS = ['pain', 'want-to-stop', 'other'] as const satisfies readonly StopSign[]

/**
 * After Stop: the clock stands already. Signs that mean stop exercising come first, with the number
 * to call; what the member says about it is their own choice. After such a sign going on is not
 * offered.
 */
export function StopScreen() {
  const send = usePlayer((state) => state.send)
  const number = usePlayer((state) => state.data.emergencyNumber)
  const redFlag = usePlayer((state) => state.position?.redFlag ?? false)
  const [sign, setSign] = useState<StopSign | null>(null)
  const [note, setNote] = useState('')
  const dialog = useRef<HTMLDialogElement>(null)
  useEffect(() => {
    const element = dialog.current
    if (element && !element.open) element.showModal()
    return () => element?.close()
  }, [])
  const choose = (next: StopSign) => {
    setSign(next)
    send({ type: 'describe-stop', sign: next, ...(note ? { note } : {}) })
  }
  const end = () => {
    if (note.trim()) {
      send({ type: 'describe-stop', ...(sign ? { sign } : {}), note: note.trim() })
    }
    send({ type: 'end-class' })
  }
  return (
    <dialog
      ref={dialog}
      aria-labelledby="stop-title"
      data-ground="birch"
      onCancel={(event) => event.preventDefault()}
      onKeyDown={(event) => {
        if (event.key === 'Escape') event.preventDefault()
      }}
      className="fixed inset-0 m-0 h-dvh max-h-none w-screen max-w-none overflow-y-auto border-[12px] border-stop boards p-0 text-text"
    >
      <div className="mx-auto grid max-w-[1500px] gap-x-12 gap-y-6 p-[clamp(16px,4vw,72px)] text-[clamp(17px,2.2vh,26px)] lg:grid-cols-[1fr_1.1fr]">
        <div className="grid content-start gap-5">
          <h2 id="stop-title" className="text-[clamp(44px,11vh,130px)] leading-[0.9] text-stop">
            Stopped
          </h2>
          <p className="max-w-[26em] text-[1.3em]">The clock stands. {STOP_ADVICE}</p>
          <div className="border-l-[12px] border-stop pl-4">
            <p className="text-[1.15em]">
              Chest pain, fainting, or trouble breathing that does not pass:
            </p>
            <p className="figures text-[clamp(40px,9vh,110px)]">
              {number ? (
                <a href={`tel:${number}`}>{number}</a>
              ) : (
                <span className="condensed text-[0.5em] leading-tight">
                  {emergencyText(number)}
                </span>
              )}
            </p>
          </div>
          <p className="max-w-[30em] text-text-quiet">
            Floorside cannot tell what it is. If you are unsure, ask somebody who can.
          </p>
        </div>
        <div className="grid content-start gap-5">
          <fieldset className="grid gap-2">
            <legend className="mb-2 condensed text-[1.3em]">
              What made you stop? Only if you like
            </legend>
            {[...RED_FLAG_SIGNS, ...OTHER_SIGNS].map((each) => (
              <label
                key={each}
                className="flex min-h-12 items-center gap-3 border-b-3 border-(--line) px-2 py-1 has-checked:bg-present has-checked:text-on-present"
              >
                <input
                  type="radio"
                  name="sign"
                  className="size-6 flex-none accent-(--text)"
                  checked={sign === each}
                  disabled={redFlag && !RED_FLAG_SIGNS.some((flag) => flag === each)}
                  onChange={() => choose(each)}
                />
                {STOP_SIGN_TEXT[each]}
              </label>
            ))}
          </fieldset>
          <label className="grid gap-1">
            A word to your coach, if you like
            <textarea
              value={note}
              maxLength={500}
              rows={2}
              onChange={(event) => setNote(event.target.value)}
              className="w-full border-3 border-text bg-raised p-2"
            />
          </label>
          <div role="status">
            {redFlag ? (
              <p className="border-l-8 border-stop pl-3 font-semibold">{AFTER_RED_FLAG}</p>
            ) : null}
          </div>
          <div className="flex flex-wrap gap-4 text-[1.2em]">
            <ActionButton look="primary" onClick={end}>
              End class here
            </ActionButton>
            {redFlag ? null : (
              <ActionButton onClick={() => send({ type: 'go-on-after-stop' })}>
                Go on with class
              </ActionButton>
            )}
          </div>
        </div>
      </div>
    </dialog>
  )
}
