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

/**
 * The events in their order, each id once. It does not depend on the order of arrival: of two that
 * share an id the earlier in the order counts. What has no usable `seq` or `id` is left out.
 */
export function inOrder<T extends Ordered>(events: readonly T[]): T[] {
  const usable: T[] = []
  // What a database gives is in order already; sorting it again would be half the work of a fold.
  let isSorted = true
  for (const event of events) {
    if (!isUsable(event)) continue
    const before = usable.at(-1)
    if (before && before.seq >= event.seq && compare(before, event) > 0) isSorted = false
    usable.push(event)
  }
  if (!isSorted) usable.sort(compare)
  const seen = new Set<string>()
  const once: T[] = []
  for (const event of usable) {
    if (seen.has(event.id)) continue
    seen.add(event.id)
    once.push(event)
  }
  return once
}

function isUsable(event: Ordered | null | undefined): boolean {
  return (
    typeof event === 'object' &&
    event !== null &&
    typeof event.id === 'string' &&
    Number.isFinite(event.seq)
  )
}
