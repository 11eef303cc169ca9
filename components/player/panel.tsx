'use client'
import { useEffect, useId, useRef, type ReactNode } from 'react'
import { ActionButton } from './button'
import { RunningTime } from './count-area'
import { countdownText } from './countdown'
import { usePhoneLayout } from './use-phone-layout'

/**
 * A panel over the player. It never stops the clock (the countdown stays in sight beside it), keeps
 * the focus inside, gives it back afterwards, and Escape closes it and nothing else.
 */
export function Panel({
  title,
  onClose,
  closeWord = 'Back to class',
  ground = 'birch',
  alarm = false,
  children,
}: {
  title: string
  onClose: () => void
  closeWord?: string
  ground?: 'birch' | 'hall'
  /** Drawn in the colour of stop. */
  alarm?: boolean
  children: ReactNode
}) {
  const dialog = useRef<HTMLDialogElement>(null)
  const titleId = useId()
  useEffect(() => {
    const element = dialog.current
    if (!element || element.open) return
    const before = document.activeElement
    element.showModal()
    return () => {
      element.close()
      if (before instanceof HTMLElement && before.isConnected) before.focus()
    }
  }, [])
  useEffect(() => {
    // Not left to the dialog: some browsers leave full screen with Escape and cancel nothing.
    const listen = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return
      event.preventDefault()
      onClose()
    }
    document.addEventListener('keydown', listen)
    return () => document.removeEventListener('keydown', listen)
  }, [onClose])
  return (
    <dialog
      ref={dialog}
      data-ground={ground}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault()
        onClose()
      }}
      className="fixed inset-y-0 right-0 left-auto m-0 h-dvh max-h-none w-full max-w-[max(60vw,700px)] overflow-y-auto overscroll-contain boards p-0 text-text backdrop:bg-transparent"
      style={{ borderLeft: `8px solid var(${alarm ? '--stop' : '--present'})` }}
    >
      <div className="flex min-h-full flex-col gap-6 p-[clamp(16px,3vw,64px)] text-[clamp(17px,2.2vh,26px)]">
        <div className="flex items-start justify-between gap-4">
          <h2 id={titleId} className="text-[clamp(28px,min(5.4vh,8vw),64px)] text-balance">
            {title}
          </h2>
          <PanelClock />
          <ActionButton onClick={onClose} hint="Esc" className="flex-none">
            {closeWord}
          </ActionButton>
        </div>
        {children}
      </div>
    </dialog>
  )
}

/** On a phone a panel covers the countdown, so it carries one of its own. */
function PanelClock() {
  const phone = usePhoneLayout()
  if (!phone) return null
  return <RunningTime className="ml-auto figures text-[34px] leading-[1.4]" read={countdownText} />
}
