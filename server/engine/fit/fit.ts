/** A class fitted to a member: for every station the option to start with, and why, in a sentence. */
import type { Movement, MovementOption, Reason } from '../spec/movement'
import { AS_PLANNED, FLOOR_POSITIONS } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { AnyStation } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { HurtPlace } from '../tally/events'
import { easierFor, HURT_PLACE_TEXT } from './hurt'

/**
 * The coach's own word: this option, for a movement, for a block, or for one station of it (from 0; it
 * counts only with its block). Every field that is given must fit. A rule that names neither a movement
 * nor a block says nothing.
 */
export interface CoachRule {
  option: string
  movement?: string | undefined
  block?: string | undefined
  station?: number | undefined
}

/** What a class is fitted to. Pregnancy or a recent birth is a note for the coach and never among it. */
export interface FittedTo {
  /** What the body objects to. */
  notes: readonly Reason[]
  /** Places of 'this hurts' that member and coach have not both cleared. */
  holds: readonly HurtPlace[]
  wantsMore: boolean
  /** Item → how many the member has; null where nothing is known of it. */
  kit: Readonly<Record<string, number>> | null
  /** The one that says the most exactly where it stands goes first; of equals the first. */
  rules: readonly CoachRule[]
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

/** Kit that is held in the hand, and is a load on it. */
export const HELD_KIT: readonly string[] = ['dumbbell', 'kettlebell', 'band']

/** `noted`: as in '… on your notes'; `answered`: what an option does that answers it. */
const NOTE_WORDS: Readonly<Record<Reason, { noted: string; answered: string }>> = {
  'load-too-heavy': { noted: 'the load', answered: 'makes the load lighter' },
  'no-jumping': { noted: 'no jumping', answered: 'goes without jumping' },
  knee: { noted: 'your knee', answered: 'spares your knee' },
  hip: { noted: 'your hip', answered: 'spares your hip' },
  'ankle-or-foot': { noted: 'your ankle or foot', answered: 'spares your ankle or foot' },
  'lower-back': { noted: 'your lower back', answered: 'spares your lower back' },
  neck: { noted: 'your neck', answered: 'spares your neck' },
  shoulder: { noted: 'your shoulder', answered: 'spares your shoulder' },
  wrist: { noted: 'your wrist', answered: 'spares your wrist' },
  'cannot-get-down': {
    noted: 'not getting down to the floor',
    answered: 'stays off the floor',
  },
  'cannot-kneel': { noted: 'not kneeling', answered: 'stays off the knees' },
  balance: { noted: 'balance', answered: 'asks less of your balance' },
  'only-one-dumbbell': { noted: 'one dumbbell', answered: 'does with one dumbbell' },
  'wants-more': { noted: 'more', answered: 'gives more' },
}

/**
 * Whether a note has to do with a movement at all: a sore wrist says nothing about a march. Loads matter
 * where something is held, one dumbbell where two are asked for, balance where the library has a way
 * that helps it. The wish for more is no note.
 */
export function concerns(note: Reason, movement: Movement): boolean {
  const isAnswered = movement.options.some((option) => option.reasons.includes(note))
  switch (note) {
    case 'no-jumping':
      return movement.impact === 'jump'
    case 'cannot-get-down':
      return FLOOR_POSITIONS.includes(movement.position)
    case 'cannot-kneel':
      return movement.position === 'kneeling'
    case 'balance':
      return movement.position === 'standing' && isAnswered
    case 'load-too-heavy':
      return movement.kit.some((item) => HELD_KIT.includes(item))
    case 'only-one-dumbbell': {
      const asked = howMany(movement.kit, 'dumbbell')
      return asked > 1 || (asked === 1 && isAnswered)
    }
    case 'wants-more':
      return false
    default:
      return movement.joints.some((joint) => joint === note)
  }
}

function howMany(kit: readonly string[], item: string): number {
  return kit.filter((one) => one === item).length
}

function listed(words: readonly string[], and = 'and'): string {
  const last = words.at(-1) ?? ''
  return words.length > 1 ? `${words.slice(0, -1).join(', ')} ${and} ${last}` : last
}

/** 'your knee is', 'your knee and balance are'. */
function listedBeing(words: readonly string[]): string {
  return `${listed(words)} ${words.length > 1 ? 'are' : 'is'}`
}

const notedWords = (notes: readonly Reason[]) => notes.map((note) => NOTE_WORDS[note].noted)
const placeWord = (place: HurtPlace) => HURT_PLACE_TEXT[place].toLowerCase()

function nameOf(option: MovementOption | undefined, movement: Movement): string {
  return option && option.option !== AS_PLANNED ? option.name : movement.name
}

/** What is known of the member that has to do with one station. */
interface Needs {
  station: AnyStation
  movement: Movement
  /** Of the station, in its order. */
  options: readonly MovementOption[]
  notes: Reason[]
  held: HurtPlace[]
  /** True where something hurts of which nobody knows where: it may be here. */
  isHeldElsewhere: boolean
  /** Kit of the movement of which the member is known to have too little. */
  missing: { item: string; asked: number; own: number }[]
  wantsMore: boolean
  rule: CoachRule | undefined
}

interface Choice {
  /** Undefined: as planned, of which the library may have no words. */
  option: MovementOption | undefined
  from: FittedStation['from']
  why: string | null
}

function needsAt(
  block: string,
  index: number,
  station: AnyStation,
  movement: Movement,
  to: FittedTo,
): Needs {
  const { kit } = to
  const options = optionsOf(station, movement)
  const missing = [...new Set(kit === null ? [] : movement.kit)].flatMap((item) => {
    const asked = howMany(movement.kit, item)
    const own = kit && Object.hasOwn(kit, item) ? (kit[item] ?? 0) : 0
    return own < asked ? [{ item, asked, own }] : []
  })
  return {
    station,
    movement,
    options,
    notes: [...new Set(to.notes)].filter((note) => concerns(note, movement)),
    held: [...new Set(to.holds)].filter((place) => movement.joints.some((one) => one === place)),
    isHeldElsewhere: to.holds.includes('elsewhere'),
    missing,
    wantsMore: to.wantsMore,
    rule: ruleAt(to.rules, block, index, movement, options),
  }
}

/** A station outweighs a movement, a movement a whole block. A block's rule passes over what does not offer it. */
function ruleAt(
  rules: readonly CoachRule[],
  block: string,
  index: number,
  movement: Movement,
  options: readonly MovementOption[],
): CoachRule | undefined {
  let best: { rule: CoachRule; rank: number } | undefined
  for (const rule of rules) {
    const ofStation = rule.block !== undefined && rule.station !== undefined
    const ofMovement = rule.movement !== undefined
    if (rule.block === undefined && (!ofMovement || rule.station !== undefined)) continue
    if (rule.block !== undefined && rule.block !== block) continue
    if (ofStation && rule.station !== index) continue
    if (ofMovement && rule.movement !== movement.slug) continue
    const isNarrow = ofStation || ofMovement
    if (!isNarrow && !options.some((one) => one.option === rule.option)) continue
    const rank = (ofStation ? 4 : 0) + (ofMovement ? 2 : 0) + (rule.block === undefined ? 0 : 1)
    if (rank > (best?.rank ?? -1)) best = { rule, rank }
  }
  return best?.rule
}

/**
 * Of the options that are not harder the one that answers most of `wanted`; of equals the nearest to as
 * planned in the order of the station, then the earlier. Null where none answers any.
 */
function bestFor(
  options: readonly MovementOption[],
  wanted: readonly Reason[],
): { option: MovementOption; answered: Reason[] } | null {
  const planned = options.findIndex((one) => one.option === AS_PLANNED)
  let best: { option: MovementOption; answered: Reason[]; away: number } | null = null
  for (const [index, option] of options.entries()) {
    if (option.level === 'harder') continue
    const answered = wanted.filter((note) => option.reasons.includes(note))
    const away = Math.abs(index - planned)
    const lead = answered.length - (best?.answered.length ?? 0)
    if (answered.length === 0 || lead < 0) continue
    if (lead > 0 || !best || away < best.away) best = { option, answered, away }
  }
  return best
}

function byCoach({ rule, options, movement }: Needs): Choice | null {
  const option = options.find((one) => one.option === rule?.option)
  if (!option) return null
  const why = `${nameOf(option, movement)}, as your coach has it for you.`
  return { option, from: 'coach', why }
}

function byHold({ held, station, movement }: Needs): Choice | null {
  for (const place of held) {
    const option = easierFor(place, station, movement)
    if (!option) continue
    const why = `${nameOf(option, movement)}, since your ${placeWord(place)} hurt last time. It stays until you and your coach have cleared it.`
    return { option, from: 'hold', why }
  }
  return null
}

function byNote({ options, notes, movement }: Needs): Choice | null {
  const best = bestFor(options, notes)
  // What is planned may already be the kindest way there is.
  if (!best || best.option.option === AS_PLANNED) return null
  const why = `${nameOf(best.option, movement)}, since ${listedBeing(notedWords(best.answered))} on your notes.`
  return { option: best.option, from: 'note', why }
}

const isOneDumbbellShort = (kit: Needs['missing'][number]) =>
  kit.item === 'dumbbell' && kit.own === 1

function byKit({ options, missing, movement }: Needs): Choice | null {
  if (!missing.some(isOneDumbbellShort)) return null
  const best = bestFor(options, ['only-one-dumbbell'])
  if (!best || best.option.option === AS_PLANNED) return null
  const why = `${nameOf(best.option, movement)}, since you have one dumbbell.`
  return { option: best.option, from: 'kit', why }
}

/** Never more by itself where anything at all speaks against it. */
function byWish(needs: Needs): Choice | null {
  const { options, notes, held, missing, movement } = needs
  if (!needs.wantsMore || needs.isHeldElsewhere) return null
  if (notes.length + held.length + missing.length > 0) return null
  const option = options.find((one) => one.level === 'harder' && one.reasons.includes('wants-more'))
  if (!option) return null
  return { option, from: 'wish', why: `${nameOf(option, movement)}, since you want more.` }
}

/** Whether an option keeps what a place that hurts has been given. */
function keeps(place: HurtPlace, option: MovementOption | undefined, needs: Needs): boolean {
  if (!option || option.level === 'harder') return false
  return (
    option.reasons.some((reason) => reason === place) ||
    easierFor(place, needs.station, needs.movement)?.option === option.option
  )
}

function conflictsOf(needs: Needs, { option, from }: Choice): string[] {
  const { rule, movement } = needs
  const unanswered = needs.notes.filter((note) => !option?.reasons.includes(note))
  const unkept = needs.held.filter((place) => !keeps(place, option, needs))
  const said: string[] = []
  if (rule && from !== 'coach') {
    said.push('Your coach’s way of doing this is not offered in this class.')
  }
  if (from === 'coach') {
    const chose = `Your coach chose ${nameOf(option, movement)}, though`
    if (unanswered.length > 0) {
      said.push(
        `${chose} ${listedBeing(notedWords(unanswered))} on your notes. Choose another way if it does not feel right, and tell them.`,
      )
    }
    if (unkept.length > 0) {
      said.push(
        `${chose} your ${listed(unkept.map(placeWord))} hurt and ${unkept.length > 1 ? 'are' : 'is'} not cleared yet.`,
      )
    }
  } else {
    said.push(
      ...unkept.map((place) => unkeptText(place, needs)),
      ...unansweredTexts(unanswered, option, needs),
    )
  }
  return [...said, ...missingTexts(needs, option, from)]
}

function unkeptText(place: HurtPlace, needs: Needs): string {
  const easier = easierFor(place, needs.station, needs.movement)
  return easier
    ? `For your ${placeWord(place)}, which hurt as well, there is ${nameOf(easier, needs.movement)}: choose what matters more today.`
    : `Nothing easier is offered for your ${placeWord(place)}: leave it out if it hurts.`
}

function unansweredTexts(
  unanswered: readonly Reason[],
  option: MovementOption | undefined,
  { options, movement }: Needs,
): string[] {
  const others = unanswered.map((note) => ({ note, other: bestFor(options, [note])?.option }))
  const byNone = others.flatMap(({ note, other }) => (other ? [] : [NOTE_WORDS[note].answered]))
  return [
    ...(byNone.length > 0
      ? [`No way of doing this ${listed(byNone, 'or')}: leave it out if you need to.`]
      : []),
    ...others.flatMap(({ note, other }) =>
      other
        ? [
            `${nameOf(other, movement)} ${NOTE_WORDS[note].answered}, which ${nameOf(option, movement)} does not: choose what matters more today.`,
          ]
        : [],
    ),
  ]
}

/** Options name no kit of their own, so an easier one may do without: it is asked for nothing. */
function missingTexts(
  { missing }: Needs,
  option: MovementOption | undefined,
  from: FittedStation['from'],
): string[] {
  const isAsked = from === 'kit' || !option || option.level !== 'easier'
  const wanted = missing.filter((kit) => isAsked && !(from === 'kit' && isOneDumbbellShort(kit)))
  const none = wanted.filter((kit) => kit.own === 0)
  return [
    ...(none.length > 0
      ? [
          `This wants ${listed(none.map(kitText))}, which ${none.length > 1 || none.some((kit) => kit.asked > 1) ? 'are' : 'is'} not in your kit: look through its options.`,
        ]
      : []),
    ...wanted.flatMap((kit) =>
      kit.own > 0
        ? [`This wants ${kitText(kit)}, and you have ${kit.own}: look through its options.`]
        : [],
    ),
  ]
}

/** 'a mat', '2 dumbbells', '2 benches'. */
function kitText({ item, asked }: Needs['missing'][number]): string {
  if (asked > 1) return `${asked} ${item}${/(?:s|x|ch|sh)$/.test(item) ? 'es' : 's'}`
  return `${/^[aeiou]/i.test(item) ? 'an' : 'a'} ${item}`
}

function fitStation(needs: Needs): Pick<FittedStation, 'option' | 'from' | 'why' | 'conflicts'> {
  const planned: Choice = {
    option: needs.options.find((one) => one.option === AS_PLANNED),
    from: 'planned',
    why: null,
  }
  const choice =
    byCoach(needs) ?? byHold(needs) ?? byNote(needs) ?? byKit(needs) ?? byWish(needs) ?? planned
  return {
    option: choice.option?.option ?? AS_PLANNED,
    from: choice.from,
    why: choice.why,
    conflicts: conflictsOf(needs, choice),
  }
}

/**
 * The option to start with at every station, in the order of the class. The coach's rule stands over
 * everything; then places that hurt and are not cleared; then notes; then kit; then the wish for more,
 * which counts only where no note, no hold and no missing kit speaks against the movement (a hurt
 * 'somewhere else' may be anywhere, and speaks against it everywhere). A note matters only where it
 * concerns the movement. No diagnosis, and no more than a start: the member may always choose otherwise.
 * Stations of unknown movements stay as planned.
 */
export function fit(version: PublishedVersion, to: FittedTo): FittedStation[] {
  return version.spec.blocks.flatMap((block) => {
    const stations: readonly AnyStation[] =
      block.format.type === 'rest' ? [] : block.format.stations
    return stations.map((station, index): FittedStation => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      const fitted = movement
        ? fitStation(needsAt(block.id, index, station, movement, to))
        : { option: AS_PLANNED, from: 'planned' as const, why: null, conflicts: [] }
      return { block: block.id, station: index, ...fitted }
    })
  })
}
