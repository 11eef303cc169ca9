/** The library's lists in the words of the trade. Apart from what parses, so that a page carries no parser. */
import type { Impact, Joint, LibraryRow, Pattern, Position } from './library-types'
import type { Level, Muscle, Reason } from '../engine/spec/movement'
import type { Reps, Sides, Tempo } from '../engine/spec/schema'
import { kitText } from './kit-text'

/** Kit that most homes and gyms have, in the order in which it is asked. A coach may name more. */
export const KIT_ITEMS = ['dumbbell', 'kettlebell', 'band', 'bench', 'chair', 'mat'] as const

const sentence = (key: string): string => {
  const words = key.replaceAll('-', ' ')
  return words.charAt(0).toUpperCase() + words.slice(1)
}

export const patternText = (pattern: Pattern): string => sentence(pattern)
export const positionText = (position: Position): string => sentence(position)
export const jointText = (joint: Joint): string => sentence(joint)
export const muscleText = (muscle: Muscle): string => sentence(muscle)
/** A figure's name as a picker shows it. */
export const figureText = (figure: string): string => sentence(figure)

const IMPACT_TEXT: Record<Impact, string> = {
  none: 'No impact',
  low: 'Low impact',
  jump: 'Jumps',
}
export const impactText = (impact: Impact): string => IMPACT_TEXT[impact]

export function reasonText(reason: Reason): string {
  return reason === 'cannot-get-down' ? 'Cannot get down to the floor' : sentence(reason)
}

export const LEVEL_TEXT: Record<Level, string> = {
  easier: 'Easier',
  'as-planned': 'As planned',
  harder: 'Harder',
}

export const SIDES_TEXT: Record<Sides, string> = {
  together: 'Both sides together',
  alternate: 'Sides in turn',
  each: 'All on one side, then the other',
}

/** Where a movement comes from, as a list says it; nothing for what came with the product. */
export const ORIGIN_TEXT: Record<LibraryRow['origin'], string> = {
  'built-in': 'Built in',
  copy: 'Changed by your gym',
  own: 'Your gym’s own',
}

/** ['dumbbell', 'dumbbell', 'mat'] as people say it: 'two dumbbells, mat'. Empty for none. */
export function kitWords(kit: readonly string[]): string {
  return [...new Set(kit)]
    .map((item) => kitText(item, kit.filter((one) => one === item).length))
    .map((text) => text.charAt(0).toLowerCase() + text.slice(1))
    .join(', ')
}

/** '2 s down, 1 s up' of a tempo, '3 s a rep' of a pace; null where neither is given. */
export function tempoText(timing: {
  tempo?: Tempo | undefined
  secondsPerRep?: number | undefined
}): string | null {
  if (timing.tempo) {
    const [down, bottom, up, top] = timing.tempo
    const parts = [
      `${down} s down`,
      ...(bottom > 0 ? [`${bottom} s at the bottom`] : []),
      `${up} s up`,
      ...(top > 0 ? [`${top} s at the top`] : []),
    ]
    return parts.join(', ')
  }
  return timing.secondsPerRep === undefined ? null : `${timing.secondsPerRep} s a rep`
}

export const REPS_HELP = 'Such as 10; or 12, 9, 6; or from 4 by 2 to 12.'

/** '10'; '12, 9, 6'; 'from 4 by 2 to 12, then hold'. What the form reads again. */
export function writeReps(reps: Reps): string {
  if (typeof reps === 'number') return String(reps)
  const then = reps.then === undefined ? '' : `, then ${reps.then}`
  if ('list' in reps) return reps.list.join(', ') + (reps.list.length === 1 && !then ? ',' : then)
  return `from ${reps.from} by ${reps.step}${reps.to === undefined ? '' : ` to ${reps.to}`}${then}`
}
