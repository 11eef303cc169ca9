/**
 * The clock of a run and what it notices between two wakes. It never goes back; the time that the
 * monotonic clock stood still while the computer slept is added to it.
 */
import { GAP_MS } from '@/server/engine/timeline/run-types'
import type { PlayerPorts } from './ports'
import type { PlayerState } from './types'

/** Clocks of computers are set right by a second or so now and then; that is nothing to speak of. */
const CLOCK_SLACK_MS = 2_000

/** What lies between this wake and the one before. */
export type Wake =
  | { type: 'steady' }
  /** The computer's clock was set back, or on by less than a gap: the class goes on unaffected. */
  | { type: 'clock-changed' }
  /** No sign of life from `lastAliveMs`, on this clock, for `awayMs`. */
  | {
      type: 'gap'
      lastAliveMs: number
      awayMs: number
      reason: NonNullable<PlayerState['gap']>['reason']
    }

export interface RunClock {
  /** Whole milliseconds. */
  now(): number
  /** The same instant on the clock that sounds are scheduled by. */
  toMonotonic(atMs: number): number
  /** The class runs from now: what lay before is no gap. */
  restart(): void
  wake(): Wake
}

export function createRunClock(ports: Pick<PlayerPorts, 'now' | 'wall'>): RunClock {
  let asleepMs = 0
  let last = sample()
  function sample() {
    return { nowMs: Math.round(ports.now()), wallMs: ports.wall() }
  }
  return {
    now: () => Math.round(ports.now()) + asleepMs,
    toMonotonic: (atMs) => atMs - asleepMs,
    restart() {
      last = sample()
    },
    wake() {
      const before = last
      last = sample()
      const passedMs = last.nowMs - before.nowMs
      const driftMs = last.wallMs - before.wallMs - passedMs
      const lastAliveMs = before.nowMs + asleepMs
      const isAhead = driftMs > CLOCK_SLACK_MS
      if (isAhead && passedMs + driftMs > GAP_MS) {
        // Asleep with a clock that stood, or the clock was set on: they cannot be told apart, so ask.
        asleepMs += driftMs
        return { type: 'gap', lastAliveMs, awayMs: passedMs + driftMs, reason: 'clock-changed' }
      }
      if (passedMs > GAP_MS) {
        return { type: 'gap', lastAliveMs, awayMs: passedMs, reason: 'away' }
      }
      return Math.abs(driftMs) > CLOCK_SLACK_MS ? { type: 'clock-changed' } : { type: 'steady' }
    },
  }
}
