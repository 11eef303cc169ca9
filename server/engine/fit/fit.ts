/** A class fitted to a member: for every station the option to start with, and why, in a sentence. */
import type { Movement, MovementOption, Reason } from '../spec/movement'
import { AS_PLANNED, FLOOR_POSITIONS } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { AnyStation } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { HurtPlace } from '../tally/events'
import { easierFor, HURT_PLACE_TEXT } from './hurt'

/** What a class is fitted to. Pregnancy or a recent birth is a note for the coach and never among it. */
export interface FittedTo {
  /** What the body objects to. */
  notes: readonly Reason[]
  /** Places of 'this hurts' that member and coach have not both cleared. */
  holds: readonly HurtPlace[]
  wantsMore: boolean
  /** Item → how many the member has; null where nothing is known of it. */
  kit: Readonly<Record<string, number>> | null
  /** The coach's own word: movement → option. */
  rules: readonly { movement: string; option: string }[]
}

export interface FittedStation {
  block: string
  station: number
  option: string
  from: 'coach' | 'hold' | 'note' | 'kit' | 'wish' | 'planned'
  /** For the member; null where nothing was changed and nothing is to be said. */
  why: string | null
  /** What could not be met, in sentences. */
  conflicts: string[]
}

const NOTE_WORDS: Readonly<Record<Reason, string>> = {
  'load-too-heavy': 'the load',
  'no-jumping': 'no jumping',
  knee: 'your knee',
  hip: 'your hip',
  'ankle-or-foot': 'your ankle or foot',
  'lower-back': 'your lower back',
  neck: 'your neck',
  shoulder: 'your shoulder',
  wrist: 'your wrist',
  'cannot-get-down': 'not getting down to the floor',
  'cannot-kneel': 'not kneeling',
  balance: 'balance',
  'only-one-dumbbell': 'one dumbbell',
  'wants-more': 'more',
}

/** Whether a note has to do with a movement at all: a sore wrist says nothing about a march. */
export function concerns(note: Reason, movement: Movement): boolean {
  switch (note) {
    case 'no-jumping':
      return movement.impact === 'jump'
    case 'cannot-get-down':
      return FLOOR_POSITIONS.includes(movement.position)
    case 'cannot-kneel':
      return movement.position === 'kneeling'
    case 'balance':
      return (
        movement.position === 'standing' &&
        movement.options.some((option) => option.reasons.includes('balance'))
      )
    case 'load-too-heavy':
    case 'only-one-dumbbell':
    case 'wants-more':
      return false
    default:
      return movement.joints.some((joint) => joint === note)
  }
}

function listed(words: readonly string[]): string {
  const last = words.at(-1) ?? ''
  return words.length > 1 ? `${words.slice(0, -1).join(', ')} and ${last}` : last
}

function nameOf(option: MovementOption | undefined, movement: Movement): string {
  return option && option.option !== AS_PLANNED ? option.name : movement.name
}

/** Kit of a movement that the member is known not to have. */
function missingKit(movement: Movement, to: FittedTo): string[] {
  const { kit } = to
  return kit === null ? [] : movement.kit.filter((item) => (kit[item] ?? 0) === 0)
}

/**
 * Of the options that are not harder the one that answers most of `wanted`; of equals the nearest to as
 * planned. Null where none answers any.
 */
function bestFor(
  options: readonly MovementOption[],
  wanted: readonly Reason[],
): { option: MovementOption; answered: Reason[] } | null {
  let best: { option: MovementOption; answered: Reason[] } | null = null
  // Easier ones stand before the planned one, the easiest first: the last of equals is the nearest to it.
  for (const option of options) {
    if (option.level === 'harder' || option.option === AS_PLANNED) continue
    const answered = wanted.filter((note) => option.reasons.includes(note))
    if (answered.length > 0 && answered.length >= (best?.answered.length ?? 0)) {
      best = { option, answered }
    }
  }
  return best
}

function fitStation(
  station: AnyStation,
  movement: Movement,
  to: FittedTo,
): Omit<FittedStation, 'block' | 'station'> {
  const options = optionsOf(station, movement)
  const notes = to.notes.filter((note) => concerns(note, movement))
  const held = to.holds.filter((place) => movement.joints.some((joint) => joint === place))
  const words = (list: readonly Reason[]) => listed(list.map((note) => NOTE_WORDS[note]))
  const conflicts: string[] = []
  const missing = missingKit(movement, to)

  const rule = to.rules.find((one) => one.movement === movement.slug)
  const ruled = options.find((one) => one.option === rule?.option)
  if (rule && ruled) {
    const ignored = notes.filter((note) => !ruled.reasons.includes(note))
    if (ignored.length > 0) {
      conflicts.push(
        `Your coach chose ${nameOf(ruled, movement)}, though ${words(ignored)} ${ignored.length > 1 ? 'are' : 'is'} on your notes. Choose another way if it does not feel right, and tell them.`,
      )
    }
    const against = held.filter(
      (place) => easierFor(place, station, movement)?.option !== ruled.option,
    )
    if (against.length > 0) {
      conflicts.push(
        `Your coach chose ${nameOf(ruled, movement)}, though your ${listed(against.map((place) => HURT_PLACE_TEXT[place].toLowerCase()))} hurt and is not cleared yet.`,
      )
    }
    return {
      option: ruled.option,
      from: 'coach',
      why: `${nameOf(ruled, movement)}, as your coach has it for you.`,
      conflicts,
    }
  }
  if (rule) conflicts.push('Your coach’s way of doing this is not offered in this class.')

  for (const place of held) {
    const option = easierFor(place, station, movement)
    const where = HURT_PLACE_TEXT[place].toLowerCase()
    if (!option) {
      conflicts.push(`Nothing easier is offered for your ${where}: leave it out if it hurts.`)
      continue
    }
    return {
      option: option.option,
      from: 'hold',
      why: `${nameOf(option, movement)}, since your ${where} hurt last time. It stays until you and your coach have cleared it.`,
      conflicts,
    }
  }

  const best = bestFor(options, notes)
  const unanswered = notes.filter((note) => !best?.answered.includes(note))
  if (unanswered.length > 0) {
    conflicts.push(
      `No way of doing this spares ${words(unanswered)}: rest or leave it out if it objects.`,
    )
  }
  if (best) {
    const { option, answered } = best
    return {
      option: option.option,
      from: 'note',
      why: `${nameOf(option, movement)}, since ${words(answered)} ${answered.length > 1 ? 'are' : 'is'} on your notes.`,
      conflicts,
    }
  }

  const isOneShort = to.kit !== null && to.kit['dumbbell'] === 1
  const withOne = isOneShort ? bestFor(options, ['only-one-dumbbell']) : null
  if (withOne) {
    return {
      option: withOne.option.option,
      from: 'kit',
      why: `${nameOf(withOne.option, movement)}, since you have one dumbbell.`,
      conflicts,
    }
  }
  if (missing.length > 0) {
    conflicts.push(
      `This wants a ${listed(missing)}, which is not in your kit: look through its options.`,
    )
  }

  // Never more by itself where anything at all speaks against it.
  const isFree = notes.length === 0 && held.length === 0 && missing.length === 0
  const harder = options.find((one) => one.level === 'harder')
  if (to.wantsMore && isFree && harder) {
    return {
      option: harder.option,
      from: 'wish',
      why: `${nameOf(harder, movement)}, since you want more.`,
      conflicts,
    }
  }
  return { option: AS_PLANNED, from: 'planned', why: null, conflicts }
}

/**
 * The option to start with at every station, in the order of the class. The coach's rule stands over
 * everything; then places that hurt and are not cleared; then notes; then kit; then the wish for more,
 * which counts only where no note, no hold and no missing kit speaks against the movement. A note matters only
 * where it concerns the movement. No diagnosis, and no more than a start: the member may always choose
 * otherwise. Stations of unknown movements stay as planned.
 */
export function fit(version: PublishedVersion, to: FittedTo): FittedStation[] {
  return version.spec.blocks.flatMap((block) => {
    const stations: readonly AnyStation[] =
      block.format.type === 'rest' ? [] : block.format.stations
    return stations.map((station, index): FittedStation => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      const fitted = movement
        ? fitStation(station, movement, to)
        : { option: AS_PLANNED, from: 'planned' as const, why: null, conflicts: [] }
      return { block: block.id, station: index, ...fitted }
    })
  })
}
