/** Words of the trade for what the engine names by key. */
import type { Reason } from '@/server/engine/spec/movement'
import type { Reps, Sides } from '@/server/engine/spec/schema'

export const REASON_TEXT: Record<Reason, string> = {
  'load-too-heavy': 'load too heavy',
  'no-jumping': 'no jumping',
  knee: 'knee',
  hip: 'hip',
  'ankle-or-foot': 'ankle or foot',
  'lower-back': 'lower back',
  neck: 'neck',
  shoulder: 'shoulder',
  wrist: 'wrist',
  'cannot-get-down': 'not down to the floor',
  'cannot-kneel': 'cannot kneel',
  balance: 'balance',
  'only-one-dumbbell': 'only one dumbbell',
  'wants-more': 'wants more',
}

/** A clock as the wall shows it: a second is on show until it has run out. `ms` in milliseconds. */
export function clockText(ms: number): string {
  const seconds = Math.max(0, Math.ceil(ms / 1000))
  const hours = Math.floor(seconds / 3600)
  const minutes = Math.floor(seconds / 60) % 60
  const two = (value: number) => String(value).padStart(2, '0')
  if (hours > 0) return `${hours}:${two(minutes)}:${two(seconds % 60)}`
  return `${minutes}:${two(seconds % 60)}`
}

/** Time that has passed: a second counts once it is full. */
export function elapsedText(ms: number): string {
  return clockText(Math.floor(ms / 1000) * 1000)
}

/** '33 minutes', '1 hour 5 minutes', '50 seconds'. */
export function lengthText(ms: number): string {
  const seconds = Math.round(ms / 1000)
  if (seconds < 90) return plural(seconds, 'second')
  const minutes = Math.round(seconds / 60)
  if (minutes < 60) return plural(minutes, 'minute')
  const rest = minutes % 60
  return rest === 0
    ? plural(minutes / 60, 'hour')
    : `${plural(Math.floor(minutes / 60), 'hour')} ${plural(rest, 'minute')}`
}

export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`
}

/** How a scheme reads: '8 a round', '4, 6, 8 … to 12', '12, 9 … to 3, then done'. */
export function schemeText(reps: Reps): string {
  if (typeof reps === 'number') return String(reps)
  const after = reps.then === 'repeat' ? ', then again' : reps.then === 'done' ? ', then done' : ''
  if ('list' in reps) {
    const shown = reps.list.slice(0, 6).join(', ')
    return `${shown}${reps.list.length > 6 ? ' …' : ''}${after}`
  }
  const start = [0, 1, 2].map((step) => reps.from + step * reps.step)
  if (reps.to === undefined) return `${start.join(', ')} …`
  const to = reps.to
  const within = start.filter((value) => (reps.step > 0 ? value <= to : value >= to))
  const last = within.at(-1)
  return `${within.join(', ')}${last === to ? '' : ` … ${to}`}${after}`
}

/** What follows the number of reps. */
export function sidesText(sides: Sides | undefined): string | null {
  if (sides === 'each') return 'each side'
  if (sides === 'alternate') return 'changing sides'
  return null
}

const lowerFirst = (text: string) =>
  /^[A-Z][a-z]/.test(text) ? text.charAt(0).toLowerCase() + text.slice(1) : text
/** A name inside a sentence. */
export const inSentence = lowerFirst
