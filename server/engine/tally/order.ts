/** The order of events: by `seq`, then `id`; one with an id already seen is the same event. */

interface Ordered {
  id: string
  seq: number
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}

/**
 * The events in their order, each id once. It does not depend on the order of arrival: of two that
 * share an id the earlier in the order counts. What has no usable `seq` or `id` is left out.
 */
export function inOrder<T extends Ordered>(events: readonly T[]): T[] {
  const usable = events.filter(
    (event) =>
      typeof event === 'object' &&
      event !== null &&
      typeof event.id === 'string' &&
      Number.isFinite(event.seq),
  )
  usable.sort(
    (a, b) =>
      a.seq - b.seq ||
      compareText(a.id, b.id) ||
      (a === b ? 0 : compareText(JSON.stringify(a), JSON.stringify(b))),
  )
  const seen = new Set<string>()
  return usable.filter((event) => !seen.has(event.id) && seen.add(event.id))
}
