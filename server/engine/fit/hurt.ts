/** 'This hurts': which option spares the place, in class and until member and coach have cleared it. */
import type { Movement, MovementOption, Reason } from '../spec/movement'
import { AS_PLANNED } from '../spec/names'
import { optionsOf } from '../spec/options'
import type { AnyStation } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { HurtPlace } from '../tally/events'

export const HURT_PLACE_TEXT: Readonly<Record<HurtPlace, string>> = {
  knee: 'Knee',
  hip: 'Hip',
  'ankle-or-foot': 'Ankle or foot',
  'lower-back': 'Lower back',
  neck: 'Neck',
  shoulder: 'Shoulder',
  elbow: 'Elbow',
  wrist: 'Wrist',
  elsewhere: 'Somewhere else',
}

/** Reasons that an option may answer, the best first. The library has no reason of its own for an elbow. */
function reasonsFor(place: HurtPlace): Reason[] {
  if (place === 'elsewhere') return []
  if (place === 'elbow') return ['load-too-heavy', 'wrist', 'shoulder']
  return [place]
}

/**
 * The option to offer at once where `place` hurts: one that answers it, an easier one before others,
 * else the easiest there is, in the order of the station. Null where the movement has nothing easier:
 * then only leaving it out helps. A harder option is never offered.
 */
export function easierFor(
  place: HurtPlace,
  station: AnyStation,
  movement: Movement | undefined,
): MovementOption | null {
  const options = optionsOf(station, movement).filter(
    (one) => one.option !== AS_PLANNED && one.level !== 'harder',
  )
  for (const reason of reasonsFor(place)) {
    const answering = options.filter((one) => one.reasons.includes(reason))
    const found = answering.find((one) => one.level === 'easier') ?? answering[0]
    if (found) return found
  }
  return options.find((one) => one.level === 'easier') ?? null
}

/**
 * Options to start a class with while places are held: for every station whose movement loads one of
 * them, the option that spares it. 'Somewhere else' names no joint, so nothing is fitted for it.
 */
export function optionsForHolds(
  version: PublishedVersion,
  held: readonly HurtPlace[],
): { block: string; station: number; option: string; place: HurtPlace }[] {
  return version.spec.blocks.flatMap((block) => {
    const stations = block.format.type === 'rest' ? [] : block.format.stations
    return stations.flatMap((station, index) => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      const place = held.find((one) => movement?.joints.some((joint) => joint === one))
      const option = place ? easierFor(place, station, movement) : null
      return place && option
        ? [{ block: block.id, station: index, option: option.option, place }]
        : []
    })
  })
}
