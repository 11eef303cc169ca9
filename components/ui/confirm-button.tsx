'use client'
import { useId, useRef, type ReactNode } from 'react'
import { Button, buttonClass } from './button'

interface ConfirmButtonProps {
  children: ReactNode
  /** The question, what happens then, and the verb that does it. */
  title: string
  explanation: string
  confirm: string
  onConfirm: () => void
  disabled?: boolean
}

/** What cannot be undone asks once. Escape and 'Keep' leave everything as it is; the focus comes back. */
export function ConfirmButton({
  children,
  title,
  explanation,
  confirm,
  onConfirm,
  disabled = false,
}: ConfirmButtonProps) {
  const dialog = useRef<HTMLDialogElement>(null)
  const id = useId()
  return (
    <>
      <Button look="stop" disabled={disabled} onClick={() => dialog.current?.showModal()}>
        {children}
      </Button>
      <dialog
        ref={dialog}
        aria-labelledby={`${id}-title`}
        aria-describedby={`${id}-text`}
        className="m-auto max-w-[min(34rem,calc(100vw-2rem))] border-t-12 border-present bg-ground p-6 text-text backdrop:bg-text/70 sm:p-8"
      >
        <h2 id={`${id}-title`} className="text-3xl">
          {title}
        </h2>
        <p id={`${id}-text`} className="mt-3 text-lg">
          {explanation}
        </p>
        <div className="mt-6 flex flex-wrap gap-4">
          <button
            type="button"
            className={buttonClass('stop')}
            onClick={() => {
              dialog.current?.close()
              onConfirm()
            }}
          >
            {confirm}
          </button>
          <Button look="outlined" onClick={() => dialog.current?.close()}>
            Keep it as it is
          </Button>
        </div>
      </dialog>
    </>
  )
}
