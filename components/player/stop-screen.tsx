'use client'
import { useEffect, useRef, useState } from 'react'
import {
  AFTER_RED_FLAG,
  emergencyText,
  isRedFlag,
  STOP_ADVICE,
  STOP_SIGN_TEXT,
} from '@/server/engine/fit/stop-signs'
import type { StopSign } from '@/server/engine/tally/events'
import { RED_FLAG_SIGNS } from '@/server/engine/tally/names'
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
  const title = useRef<HTMLHeadingElement>(null)
  useEffect(() => {
    const element = dialog.current
    if (element && !element.open) {
      element.showModal()
      title.current?.focus()
    }
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
      <div className="mx-auto grid min-h-full max-w-[1500px] content-start gap-x-12 gap-y-5 p-[clamp(16px,3.2vw,64px)] text-[clamp(17px,2.1vh,26px)] lg:grid-cols-[minmax(0,1fr)_minmax(0,1.1fr)]">
        <div className="grid min-w-0 content-start gap-5">
          <h2
            id="stop-title"
            ref={title}
            tabIndex={-1}
            style={{ boxShadow: 'none' }}
            className="text-[clamp(44px,min(11vh,15vw),130px)] leading-[0.95] text-stop outline-none"
          >
            Stopped
          </h2>
          <p className="max-w-[28em] text-[1.2em]">The clock stands. {STOP_ADVICE}</p>
          <div className="border-l-[12px] border-stop py-1 pl-4">
            <p>Call</p>
            <p className="mt-2">
              {number ? (
                <a
                  href={`tel:${number}`}
                  className="inline-block figures text-[clamp(48px,10vh,120px)] leading-none"
                >
                  {number}
                </a>
              ) : (
                <span className="condensed text-[clamp(28px,5vh,56px)] leading-tight">
                  {emergencyText(number)}
                </span>
              )}
            </p>
          </div>
          <div role="status">
            {redFlag ? (
              <p className="max-w-[30em] border-l-8 border-stop pl-3 font-semibold">
                {AFTER_RED_FLAG}
              </p>
            ) : null}
          </div>
          <div className="flex flex-wrap gap-5 text-[1.25em]">
            <ActionButton look="primary" onClick={end} className="min-h-16">
              End class here
            </ActionButton>
            {redFlag ? null : (
              <ActionButton className="min-h-16" onClick={() => send({ type: 'go-on-after-stop' })}>
                Go on with class
              </ActionButton>
            )}
          </div>
          <p className="max-w-[30em] text-text-quiet">
            Floorside cannot tell what it is. If you are unsure, ask somebody who can.
          </p>
        </div>
        <div className="grid min-w-0 content-start gap-5">
          <fieldset className="grid min-w-0">
            <legend className="mb-2 condensed text-[1.3em]">
              What made you stop? Only if you like to say
            </legend>
            {[...RED_FLAG_SIGNS, ...OTHER_SIGNS].map((each) => (
              <label
                key={each}
                className="flex min-h-12 min-w-0 items-center gap-3 border-b-3 border-(--line-lesser) px-2 py-1 leading-tight has-checked:bg-present has-checked:text-on-present"
              >
                <input
                  type="radio"
                  name="sign"
                  className="size-6 flex-none accent-(--text)"
                  checked={sign === each}
                  disabled={redFlag && !isRedFlag(each)}
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
        </div>
      </div>
    </dialog>
  )
}
