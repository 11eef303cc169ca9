/** Figures that stand on a lane: which of them have room, and where. Pure. */

export interface WantedPlace {
  figure: string
  /** Where it would stand, and how wide it is, in one unit. */
  centre: number
  width: number
  /** Those of a low rank give way first. */
  rank: number
}
export interface Placed extends WantedPlace {
  left: number
}

/**
 * Stands the figures side by side in their order, near where they belong, without touching. Where
 * there is no room for all, the last of each block goes first.
 * @returns none overlapping, all within 0 and `room`
 */
export function placeFigures(wanted: readonly WantedPlace[], room: number, gap: number): Placed[] {
  let chosen = wanted.filter((each) => each.width <= room)
  const total = () => chosen.reduce((sum, each) => sum + each.width + gap, -gap)
  while (chosen.length > 1 && total() > room) {
    const least = Math.min(...chosen.map((each) => each.rank))
    const last = chosen.map((each) => each.rank).lastIndexOf(least)
    chosen = chosen.filter((_, index) => index !== last)
  }
  const placed: Placed[] = []
  let from = 0
  for (const each of chosen) {
    const left = Math.max(from, each.centre - each.width / 2)
    placed.push({ ...each, left })
    from = left + each.width + gap
  }
  let until = room
  for (let index = placed.length - 1; index >= 0; index -= 1) {
    const each = placed[index]
    if (!each) continue
    each.left = Math.min(each.left, until - each.width)
    until = each.left - gap
  }
  return placed
}
