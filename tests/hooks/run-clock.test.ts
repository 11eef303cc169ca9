import { describe, expect, it } from 'vitest'
import { createRunClock } from '@/hooks/player/run-clock'

function clockAt(nowMs = 1_000, wallMs = 1_780_000_000_000) {
  const at = { nowMs, wallMs }
  const clock = createRunClock({ now: () => at.nowMs, wall: () => at.wallMs })
  return {
    clock,
    pass(monotonicMs: number, computerMs: number) {
      at.nowMs += monotonicMs
      at.wallMs += computerMs
      return clock.wake()
    },
  }
}

describe('the clock of a run', () => {
  it.each([
    ['an ordinary wake', 50, 50, 'steady', 50],
    ['a slow machine', 4_000, 4_000, 'steady', 4_000],
    ['a stall of exactly 30 s', 30_000, 30_000, 'steady', 30_000],
    ['the clock set right by a second', 50, 1_050, 'steady', 50],
    ['the clock set back by an hour', 50, 50 - 3_600_000, 'clock-changed', 50],
    ['the clock set back by ten seconds', 50, -9_950, 'clock-changed', 50],
    ['the clock set on by 20 s', 50, 20_050, 'clock-changed', 50],
    ['a frozen tab of 31 s', 31_000, 31_000, 'gap', 31_000],
    ['a computer asleep for ten minutes', 50, 600_050, 'gap', 600_050],
    ['asleep and frozen, each under 30 s', 20_000, 40_000, 'gap', 40_000],
    ['frozen for a minute while the clock was set back', 60_000, -540_000, 'gap', 60_000],
  ] as const)('takes %s for what it is', (_, monotonicMs, computerMs, type, awayMs) => {
    const { clock, pass } = clockAt()
    const before = clock.now()
    const wake = pass(monotonicMs, computerMs)
    expect(wake.type).toBe(type)
    if (wake.type === 'gap') {
      expect(wake).toMatchObject({ lastAliveMs: before, awayMs })
      expect(clock.now() - wake.lastAliveMs).toBe(awayMs)
    } else expect(clock.now() - before).toBe(awayMs)
  })

  it('never goes back, whatever the computer’s clock does', () => {
    const { clock, pass } = clockAt()
    let last = clock.now()
    for (const jump of [-5_000_000, 40_000, -31_000, 10, 86_400_000, -86_400_000]) {
      pass(50, jump)
      expect(clock.now()).toBeGreaterThan(last)
      last = clock.now()
    }
  })

  it('says when sounds are due on the clock that did not sleep', () => {
    const { clock, pass } = clockAt(1_000)
    pass(50, 100_050)
    expect(clock.now()).toBe(101_050)
    expect(clock.toMonotonic(101_500)).toBe(1_500)
  })

  it('tells of one jump once', () => {
    const { pass } = clockAt()
    expect(pass(50, -60_000).type).toBe('clock-changed')
    expect(pass(50, 50).type).toBe('steady')
  })
})
