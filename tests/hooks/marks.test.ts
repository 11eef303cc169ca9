import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { markText } from '@/hooks/player/mark-text'
import { createRunner } from '@/hooks/player/runner'
import { markSound, type SoundName } from '@/server/engine/timeline/mark-sound'
import { apply, marksAhead, newRun, positionAt } from '@/server/engine/timeline/run'
import { compile } from '@/server/engine/timeline/compile'
import type { Run } from '@/server/engine/timeline/run-types'
import { playerFixture } from '../support/player-fixture'

const { version, versionId } = playerFixture()
const START_MS = 10_000

function started(): Run {
  const run = newRun(version, versionId, { waitAtBriefs: false, changeExtraMs: 0 })
  return apply(run, { type: 'start', versionId, counting: 'press', options: [] }, START_MS).run
}

/** Every sound of the class with its instant, by key. */
function planned(run: Run) {
  return marksAhead(run, START_MS, 10_800_000).flatMap((mark) => {
    const name = markSound(mark, run.timeline.segments[mark.segmentIndex]?.kind)
    return name ? [{ key: `${name}@${mark.dueAtMs}`, dueAtMs: mark.dueAtMs }] : []
  })
}

function heard(isReady: (atMs: number) => boolean = () => true) {
  const sounds: { key: string; atMs: number; askedAtMs: number; isCalledOff: boolean }[] = []
  let nowMs = START_MS
  const runner = createRunner(
    version,
    {
      schedule(name: SoundName, atMs: number) {
        if (!isReady(nowMs)) return null
        const one = { key: `${name}@${atMs}`, atMs, askedAtMs: nowMs, isCalledOff: false }
        sounds.push(one)
        return () => {
          one.isCalledOff = true
        }
      },
    },
    { toMonotonic: (atMs) => atMs },
  )
  runner.begin(START_MS)
  return {
    runner,
    wake(run: Run, atMs: number) {
      nowMs = atMs
      runner.sound(run, atMs)
    },
    sounding: () => sounds.filter((one) => !one.isCalledOff),
  }
}

describe('marks of a class that runs', () => {
  const run = started()
  const all = planned(run)
  const endMs = START_MS + 1_980_000 + 60_000

  it('sound each exactly once and ahead of time while the ticker keeps its 50 ms', () => {
    const { wake, sounding } = heard()
    for (let now = START_MS; now < endMs; now += 50) wake(run, now)
    expect(sounding().map((one) => one.key)).toEqual(all.map((one) => one.key))
    expect(all.length).toBeGreaterThan(100)
    for (const one of sounding()) expect(one.askedAtMs).toBeLessThanOrEqual(one.atMs)
  })

  it('under random stalls of up to 30 s sound never twice, never over 250 ms late, and drift by nothing', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.oneof(
            { weight: 30, arbitrary: fc.integer({ min: 10, max: 120 }) },
            {
              weight: 1,
              arbitrary: fc.integer({ min: 200, max: 30_000 }),
            },
          ),
          { minLength: 200, maxLength: 2_000 },
        ),
        (steps) => {
          const { wake, sounding } = heard()
          const wakes = [START_MS]
          for (const step of steps) wakes.push((wakes.at(-1) ?? START_MS) + step)
          for (const now of wakes) {
            wake(run, now)
            const position = positionAt(run, now)
            if (position.phase === 'segment' && position.segmentIndex < 7) {
              // Before the first brief class time is the time since the start, to the millisecond.
              expect(position.classMs).toBe(now - START_MS)
            }
          }
          const keys = sounding().map((one) => one.key)
          expect(new Set(keys).size).toBe(keys.length)
          for (const one of sounding()) expect(one.askedAtMs - one.atMs).toBeLessThanOrEqual(250)
          // What a wake came for in time is heard: nothing is missed but what a stall swallowed.
          const lastMs = wakes.at(-1) ?? START_MS
          const swallowed = (dueAtMs: number) =>
            (wakes.find((now) => now >= dueAtMs) ?? Infinity) - dueAtMs > 250
          const expected = all.filter((one) => one.dueAtMs <= lastMs && !swallowed(one.dueAtMs))
          expect(keys).toEqual(expect.arrayContaining(expected.map((one) => one.key)))
        },
      ),
      { numRuns: 40, seed: 20261201 },
    )
  })

  it('wait for sound that is blocked and are dropped, not piled up, when it comes', () => {
    const firstMs = all[0]?.dueAtMs ?? 0
    const { wake, sounding } = heard((now) => now >= START_MS + 31_000)
    for (let now = START_MS; now < START_MS + 60_000; now += 50) wake(run, now)
    expect(firstMs).toBe(START_MS)
    const atUnlock = sounding().filter((one) => one.atMs < START_MS + 31_000)
    expect(atUnlock.length).toBeLessThanOrEqual(1)
    for (const one of sounding()) expect(one.askedAtMs - one.atMs).toBeLessThanOrEqual(250)
    const later = all.filter(
      (one) => one.dueAtMs >= START_MS + 31_000 && one.dueAtMs < START_MS + 60_000,
    )
    expect(sounding().map((one) => one.key)).toEqual(
      expect.arrayContaining(later.map((one) => one.key)),
    )
  })

  it('keep the first bell where sound comes within a quarter of a second of the start', () => {
    const { wake, sounding } = heard((now) => now >= START_MS + 150)
    for (let now = START_MS; now < START_MS + 500; now += 50) wake(run, now)
    expect(sounding().map((one) => one.key)).toEqual([`bell@${START_MS}`])
  })

  it('are called off by a pause and sound once after it', () => {
    const { runner, wake, sounding } = heard()
    const beepMs = all.find((one) => one.key.startsWith('knock'))?.dueAtMs ?? 0
    for (let now = START_MS; now <= beepMs - 100; now += 50) wake(run, now)
    expect(sounding().at(-1)?.atMs).toBe(beepMs)
    const paused = apply(run, { type: 'pause' }, beepMs - 80).run
    runner.changed(beepMs - 80)
    expect(sounding().some((one) => one.atMs === beepMs)).toBe(false)
    for (let now = beepMs - 80; now < beepMs + 5_000; now += 50) wake(paused, now)
    const on = apply(paused, { type: 'resume' }, beepMs + 5_000).run
    runner.changed(beepMs + 5_000)
    for (let now = beepMs + 5_000; now < beepMs + 5_600; now += 50) wake(on, now)
    expect(sounding().filter((one) => one.atMs > beepMs - 1)).toEqual([
      expect.objectContaining({ atMs: beepMs + 5_080 }),
    ])
  })
})

describe('what marks say and sound', () => {
  it.each([
    [{ atMs: 0, what: 'call', left: 60 }, '1 minute', 'call-60'],
    [{ atMs: 0, what: 'call', left: 30 }, '30 seconds', 'call-30'],
    [{ atMs: 0, what: 'call', left: 10 }, '10 seconds', 'call-10'],
    [{ atMs: 0, what: 'call', left: 90, half: true }, 'Half-way', null],
    [{ atMs: 0, what: 'beep', sound: 'short' }, null, 'knock'],
    [{ atMs: 0, what: 'beep', sound: 'double' }, null, 'half'],
    [{ atMs: 0, what: 'beep', sound: 'start' }, null, 'bell'],
    [{ atMs: 0, what: 'beep', sound: 'end' }, null, 'bell-low'],
    [{ atMs: 0, what: 'cue', block: 'row-and-lunge', id: 'c2' }, 'Breathe out as you pull', null],
    [{ atMs: 0, what: 'next', block: 'rest-1' }, 'Next: rest', null],
    [{ atMs: 0, what: 'next', block: 'every-minute', round: 1, station: 1 }, 'Next: Push-up', null],
  ] as const)('%o', (mark, text, sound) => {
    expect(markText(version, compile(version).segments, mark)).toBe(text)
    expect(markSound(mark, 'work')).toBe(sound)
  })

  it('the end of a rest has a sound of its own, whatever comes after it', () => {
    expect(markSound({ atMs: 0, what: 'beep', sound: 'start' }, 'rest')).toBe('rest-end')
    expect(markSound({ atMs: 0, what: 'beep', sound: 'end' }, 'rest')).toBe('rest-end')
    expect(markSound({ atMs: 0, what: 'beep', sound: 'start' }, 'count-in')).toBe('bell')
  })
})
