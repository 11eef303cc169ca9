'use client'
import { useEffect } from 'react'

/**
 * A control that was pressed by pointer does not keep the focus, and a panel that closes does not give it
 * back to one: else the next press of the space bar would press it again instead of logging a round.
 * Focus that came by keyboard stays where it is.
 */
export function useDropPointerFocus(): void {
  useEffect(() => {
    let byPointer = false
    const onPointer = () => {
      byPointer = true
    }
    const onKey = () => {
      byPointer = false
    }
    const onFocus = ({ target }: FocusEvent) => {
      if (!byPointer || !(target instanceof HTMLElement)) return
      if (target.matches('button, a[href], summary') && !target.closest('dialog')) target.blur()
    }
    document.addEventListener('pointerdown', onPointer, true)
    document.addEventListener('keydown', onKey, true)
    document.addEventListener('focusin', onFocus)
    return () => {
      document.removeEventListener('pointerdown', onPointer, true)
      document.removeEventListener('keydown', onKey, true)
      document.removeEventListener('focusin', onFocus)
    }
  }, [])
}
