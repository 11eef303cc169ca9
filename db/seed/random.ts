/** Seeded randomness, so that the demo gym is the same at every seeding. mulberry32, public domain. */
export interface Random {
  /** From 0 up to, not including, 1. */
  next(): number
  chance(share: number): boolean
  between(low: number, high: number): number
  /** Around 1, most within ± spread. */
  wobble(spread: number): number
  pick<T>(items: readonly [T, ...T[]]): T
  bytes(count: number): Uint8Array
}

export function seededRandom(seed: number): Random {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
  return {
    next,
    chance: (share) => next() < share,
    between: (low, high) => low + next() * (high - low),
    wobble: (spread) => 1 + (next() + next() + next() - 1.5) * spread,
    pick: (items) => items[Math.floor(next() * items.length)] ?? items[0],
    bytes: (count) => Uint8Array.from({ length: count }, () => Math.floor(next() * 256)),
  }
}
