/** Which options a station offers, with its own order, reps and sides over the library's. */
import type { Movement, MovementOption } from './movement'
import type { AnyStation } from './schema'

/**
 * Options of `station` in its order: those it names, with their own reps and sides, else all of the
 * library's. The planned one is always among them. Empty where the movement is unknown.
 */
export function optionsOf(station: AnyStation, movement: Movement | undefined): MovementOption[] {
  const library = movement?.options ?? []
  if (!station.options) return library
  const named = station.options.flatMap((use) => {
    const option = library.find((one) => one.option === use.option)
    if (!option) return []
    return [
      {
        ...option,
        ...(use.reps === undefined ? {} : { reps: use.reps }),
        ...(use.sides === undefined ? {} : { sides: use.sides }),
      },
    ]
  })
  if (named.some((one) => one.level === 'as-planned')) return named
  const planned = library.find((one) => one.level === 'as-planned')
  if (!planned) return named
  const firstHarder = named.findIndex((one) => one.level === 'harder')
  const at = firstHarder < 0 ? named.length : firstHarder
  return [...named.slice(0, at), planned, ...named.slice(at)]
}
