import { describe, expect, it } from 'vitest'
import { nearestInDirection, type Box } from '@/components/player/arrow-focus'

const box = (left: number, top: number, width = 100, height = 50): Box => ({
  left,
  top,
  right: left + width,
  bottom: top + height,
})
// The player's own plan: a wide key, three below it, three options on the right.
const log = box(50, 500, 500, 100)
const rest = box(50, 620, 200)
const hurts = box(260, 620, 150)
const stop = box(420, 620, 130)
const easier = box(1000, 250, 400, 60)
const planned = box(1000, 310, 400, 60)
const harder = box(1000, 370, 400, 60)
const all = [log, rest, hurts, stop, easier, planned, harder]
const go = (from: Box, direction: 'left' | 'right' | 'up' | 'down') => {
  const others = all.filter((each) => each !== from)
  return others[nearestInDirection(from, others, direction)] ?? null
}

describe('arrow keys on a television', () => {
  it('go to the neighbour that lies in their direction', () => {
    expect(go(rest, 'right')).toBe(hurts)
    expect(go(hurts, 'right')).toBe(stop)
    expect(go(stop, 'left')).toBe(hurts)
    expect(go(planned, 'up')).toBe(easier)
    expect(go(planned, 'down')).toBe(harder)
    expect(go(hurts, 'up')).toBe(log)
    expect(go(log, 'right')).toBe(harder)
  })

  it('stay where nothing lies in their direction', () => {
    expect(go(rest, 'left')).toBeNull()
    expect(go(stop, 'down')).toBeNull()
  })

  it('reach every control from every other', () => {
    for (const from of all) {
      const reached = new Set([from])
      for (const each of reached) {
        for (const direction of ['left', 'right', 'up', 'down'] as const) {
          const next = go(each, direction)
          if (next) reached.add(next)
        }
      }
      expect(reached.size).toBe(all.length)
    }
  })
})
