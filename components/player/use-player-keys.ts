'use client'
import { useEffect, useRef } from 'react'

export type PlayerKey =
  | 'log-round'
  | 'undo-round'
  | 'pause'
  | 'option-1'
  | 'option-2'
  | 'option-3'
  | 'options'
  | 'lead'
  | 'rest'
  | 'hurt'
  | 'stop'
  | 'full-screen'
  | 'keys'

const LETTERS: Record<string, PlayerKey> = {
  p: 'pause',
  o: 'options',
  l: 'lead',
  r: 'rest',
  h: 'hurt',
  s: 'stop',
  f: 'full-screen',
  '1': 'option-1',
  '2': 'option-2',
  '3': 'option-3',
  '?': 'keys',
}

const CONTROLS =
  'button, a[href], input, select, textarea, summary, [role="slider"], [contenteditable]'

/**
 * What a key press means in class, or null. Space belongs to whatever control has the focus; a
 * clicker's Page Down and the media key 'next' are the same press without that limit. Character keys
 * can be turned off whole (WCAG 2.1.4).
 */
function playerKey(
  event: Pick<KeyboardEvent, 'key' | 'repeat' | 'ctrlKey' | 'metaKey' | 'altKey' | 'target'>,
  lettersOn: boolean,
): PlayerKey | null {
  if (event.repeat || event.ctrlKey || event.metaKey || event.altKey) return null
  const target = event.target instanceof Element ? event.target : null
  if (target?.closest('input, select, textarea, [contenteditable]')) return null
  if (event.key === ' ') return target?.closest(CONTROLS) ? null : 'log-round'
  if (event.key === 'PageDown' || event.key === 'MediaTrackNext') return 'log-round'
  if (event.key === 'Backspace') return 'undo-round'
  if (!lettersOn) return null
  return LETTERS[event.key.toLowerCase()] ?? null
}

/** Listens while `on`; a modal panel keeps its keys for itself. */
export function usePlayerKeys(
  on: boolean,
  lettersOn: boolean,
  act: (key: PlayerKey) => void,
): void {
  const latest = useRef(act)
  useEffect(() => {
    latest.current = act
  })
  useEffect(() => {
    if (!on) return
    const listen = (event: KeyboardEvent) => {
      if (event.defaultPrevented) return
      const key = playerKey(event, lettersOn)
      if (!key) return
      event.preventDefault()
      latest.current(key)
    }
    document.addEventListener('keydown', listen)
    return () => document.removeEventListener('keydown', listen)
  }, [on, lettersOn])
}
