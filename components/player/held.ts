/** Stations that stay easier: after 'this hurts', until member and coach have cleared it. */
import type { HurtHold, PlayerData } from '@/server/contract/classes'
import { easierFor, HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import type { FittedStation } from '@/server/engine/fit/fit'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { StationView } from './scene'

const isOpenHold = (hold: HurtHold) => hold.memberClearedAt === null || hold.coachClearedAt === null

/** What the class was fitted with at this station. */
export function fittedOf(data: PlayerData, view: StationView): FittedStation | null {
  return data.fitted.find((one) => one.block === view.block && one.station === view.index) ?? null
}

/** The hold from an earlier class that this station is under, or null. */
export function holdOn(data: PlayerData, view: StationView): HurtHold | null {
  const { movement } = view
  // A coach's own rule stands over a hold.
  if (!movement || fittedOf(data, view)?.from === 'coach') return null
  return (
    data.holds.find(
      (hold) =>
        isOpenHold(hold) &&
        movement.joints.some((joint) => joint === hold.place) &&
        easierFor(hold.place, view.station, movement) !== null,
    ) ?? null
  )
}

/**
 * Why a station's other options are shut, in a few words, or null: held since an earlier class, or
 * the easier option was taken in this one because it hurt.
 */
export function heldReason(
  data: PlayerData,
  events: readonly ClassEvent[],
  view: StationView,
): string | null {
  const hold = holdOn(data, view)
  if (hold) return `held: ${HURT_PLACE_TEXT[hold.place].toLowerCase()}`
  if (!view.movement || view.option?.level !== 'easier') return null
  for (const event of events) {
    if (event.type !== 'hurt' || event.block !== view.block) continue
    if (easierFor(event.where, view.station, view.movement)?.option === view.option.option) {
      return `held: ${HURT_PLACE_TEXT[event.where].toLowerCase()}`
    }
  }
  return null
}
