'use client'
import { useEffect } from 'react'

export interface Box {
  left: number
  top: number
  right: number
  bottom: number
}
type Direction = 'left' | 'right' | 'up' | 'down'

const KEYS: Record<string, Direction> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
}
const FOCUSABLE =
  'button:not(:disabled), a[href], input:not(:disabled), select:not(:disabled), textarea:not(:disabled)'
/** Controls that need the arrows for themselves. */
const OWN_ARROWS = 'input, select, textarea'

const middle = (box: Box) => ({ x: (box.left + box.right) / 2, y: (box.top + box.bottom) / 2 })

/**
 * Index of the box that an arrow leads to from `from`, or -1: the nearest that lies wholly in that
 * direction, where straying sideways counts twice as much as going on.
 */
export function nearestInDirection(from: Box, boxes: readonly Box[], direction: Direction): number {
  const start = middle(from)
  let best = -1
  let bestCost = Infinity
  for (const [index, box] of boxes.entries()) {
    const gap = {
      left: from.left - box.right,
      right: box.left - from.right,
      up: from.top - box.bottom,
      down: box.top - from.bottom,
    }[direction]
    if (gap < -4) continue
    const end = middle(box)
    const sideways =
      direction === 'left' || direction === 'right'
        ? Math.max(0, box.top - from.bottom, from.top - box.bottom) + Math.abs(end.y - start.y) / 4
        : Math.max(0, box.left - from.right, from.left - box.right) + Math.abs(end.x - start.x) / 4
    const cost = Math.max(0, gap) + sideways * 2
    if (cost < bestCost) {
      bestCost = cost
      best = index
    }
  }
  return best
}

/** A television's remote has arrows and OK only: the arrows move the focus, Enter presses. */
export function useArrowFocus(startsFromNothing: boolean): void {
  useEffect(() => {
    const listen = (event: KeyboardEvent) => {
      const direction = KEYS[event.key]
      if (!direction || event.defaultPrevented || event.altKey || event.ctrlKey || event.metaKey) {
        return
      }
      const scope = document.querySelector('dialog[open]') ?? document.querySelector('main')
      const focused = document.activeElement
      if (!scope || focused?.matches(OWN_ARROWS)) return
      const controls = [...scope.querySelectorAll<HTMLElement>(FOCUSABLE)].filter(
        (control) => control !== focused && control.getClientRects().length > 0,
      )
      if (!(focused instanceof HTMLElement) || !scope.contains(focused)) {
        const first = scope.querySelector<HTMLElement>('[data-first]') ?? controls[0]
        if (!startsFromNothing || !first) return
        event.preventDefault()
        first.focus()
        return
      }
      const next =
        controls[
          nearestInDirection(
            focused.getBoundingClientRect(),
            controls.map((control) => control.getBoundingClientRect()),
            direction,
          )
        ]
      if (!next) return
      event.preventDefault()
      next.focus()
    }
    document.addEventListener('keydown', listen)
    return () => document.removeEventListener('keydown', listen)
  }, [startsFromNothing])
}
