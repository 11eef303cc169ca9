/** The order of events: by `seq`, then `id`; one with an id already seen is the same event. */

interface Ordered {
  id: string
  seq: number
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}

function compare(a: Ordered, b: Ordered): number {
  if (a.seq !== b.seq) return a.seq - b.seq
  if (a.id !== b.id) return compareText(a.id, b.id)
  return a === b ? 0 : compareText(JSON.stringify(a), JSON.stringify(b))
}

function isInOrder(events: readonly Ordered[]): boolean {
  return events.every((event, index) => {
    const before = events[index - 1]
    return before === undefined || compare(before, event) <= 0
  })
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
  // What a database gives is in order already; sorting it again would be half the work of a fold.
  if (!isInOrder(usable)) usable.sort(compare)
  const seen = new Set<string>()
  return usable.filter((event) => !seen.has(event.id) && seen.add(event.id))
}
