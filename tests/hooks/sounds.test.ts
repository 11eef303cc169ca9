import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import FFT from 'fft.js'
import { describe, expect, it } from 'vitest'
import { SOUND_NAMES, type SoundName } from '@/server/engine/timeline/mark-sound'
import { LOUDNESS_RATE, loudnessOf, mostMomentary, truePeak } from '../support/loudness'
import { readWav } from '@/scripts/lib/wav.mjs'
import { onsetsOf } from '../support/onsets'

const FOLDER = 'public/sounds'
const fileOf = (name: SoundName) => readWav(readFileSync(join(FOLDER, `${name}.wav`)))
const samplesOf = (name: SoundName) => fileOf(name).samples

/** What each is meant to be: its main frequency in hertz, its length in seconds, when its strokes begin. */
const MEANT: Record<SoundName, { hertz: number; seconds: number; strokes: number[] }> = {
  knock: { hertz: 620, seconds: 0.16, strokes: [0] },
  bell: { hertz: 880, seconds: 1.1, strokes: [0] },
  'bell-low': { hertz: 440, seconds: 1.42, strokes: [0, 0.42] },
  'rest-end': { hertz: 740, seconds: 1.13, strokes: [0, 0.11, 0.33] },
  half: { hertz: 660, seconds: 0.52, strokes: [0, 0.22] },
  logged: { hertz: 1_400, seconds: 0.07, strokes: [0] },
  'call-60': { hertz: 520, seconds: 0.64, strokes: [0, 0.17, 0.34, 0.51] },
  'call-30': { hertz: 900, seconds: 0.41, strokes: [0, 0.14, 0.28] },
  'call-10': { hertz: 1_050, seconds: 0.25, strokes: [0, 0.12] },
}

/** The strongest frequency, by fft.js over the whole sound with silence behind it: hertz. */
function mainHertz(samples: Float64Array): number {
  const size = 131_072
  const fft = new FFT(size)
  const spectrum = fft.createComplexArray()
  fft.realTransform(
    spectrum,
    Array.from({ length: size }, (_, at) => samples[at] ?? 0),
  )
  let best = 0
  let most = 0
  for (let bin = 1; bin < size / 2; bin += 1) {
    const level = Math.hypot(spectrum[2 * bin] ?? 0, spectrum[2 * bin + 1] ?? 0)
    if (level > most) [best, most] = [bin, level]
  }
  return (best * LOUDNESS_RATE) / size
}

const ratio = (one: number, other: number) => Math.max(one, other) / Math.min(one, other)

/** As it is heard, not as it was meant: seconds between strokes, and until the last tenth of the peak has died away. */
function rhythmOf(samples: Float64Array): { gaps: number[]; ring: number } {
  const onsets = onsetsOf(samples, LOUDNESS_RATE)
  const peak = samples.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  return {
    gaps: onsets.slice(1).map((at, index) => at - (onsets[index] ?? 0)),
    ring: samples.findLastIndex((value) => Math.abs(value) > peak / 10) / LOUDNESS_RATE,
  }
}

const sine = (hertz: number, peak: number) =>
  Float64Array.from(
    { length: LOUDNESS_RATE * 3 },
    (_, at) => peak * Math.sin((2 * Math.PI * hertz * at) / LOUDNESS_RATE),
  )

describe('the measure of loudness', () => {
  it('gives what ITU-R BS.1770 annex 1 says of a full sine of 997 Hz in one channel: -3.01 LKFS', () => {
    expect(loudnessOf([sine(997, 1)])).toBeCloseTo(-3.01, 1)
  })
  it('gives what EBU Tech 3341, case 1, says of 1 kHz at -23 dBFS in both channels: -23.0 LUFS', () => {
    const one = sine(1_000, 10 ** (-23 / 20))
    expect(Math.abs(loudnessOf([one, one]) + 23)).toBeLessThan(0.1)
  })
})

describe('the sounds of the player', () => {
  it('are what the script of the project makes, to the byte', () => {
    const folder = mkdtempSync(join(tmpdir(), 'floorside-sounds-'))
    execFileSync('node', ['scripts/sounds.mjs', folder])
    const names = readdirSync(FOLDER).sort()
    expect(readdirSync(folder).sort()).toEqual(names)
    expect(names).toEqual(SOUND_NAMES.map((name) => `${name}.wav`).sort())
    for (const name of names) {
      expect(readFileSync(join(folder, name)).equals(readFileSync(join(FOLDER, name)))).toBe(true)
    }
    rmSync(folder, { recursive: true })
  })

  it.each(SOUND_NAMES)('%s begins and ends at zero, and rises to -1 dBTP at most', (name) => {
    const samples = samplesOf(name)
    expect(samples[0]).toBe(0)
    expect(samples.at(-1)).toBe(0)
    expect(truePeak(samples)).toBeLessThanOrEqual(-1)
  })

  it('are equally loud within 1 LU, the click of a logged round 3 LU softer (momentary, BS.1770)', () => {
    const levels = SOUND_NAMES.map((name) => ({ name, lufs: mostMomentary(samplesOf(name)) }))
    const loud = levels.filter((one) => one.name !== 'logged').map((one) => one.lufs)
    expect(Math.max(...loud) - Math.min(...loud)).toBeLessThan(1)
    const click = levels.find((one) => one.name === 'logged')?.lufs ?? 0
    expect(Math.min(...loud) - click).toBeGreaterThan(2)
    expect(Math.max(...loud) - click).toBeLessThan(4)
  })

  it.each(SOUND_NAMES)('%s has the height and the length that it is meant to have', (name) => {
    const { rate, samples } = fileOf(name)
    expect(rate).toBe(LOUDNESS_RATE)
    expect(Math.abs(mainHertz(samples) / MEANT[name].hertz - 1)).toBeLessThan(0.02)
    expect(samples.length / rate).toBeCloseTo(MEANT[name].seconds, 2)
  })

  it.each(SOUND_NAMES)('%s has its strokes where they are meant to be', (name) => {
    const onsets = onsetsOf(samplesOf(name), LOUDNESS_RATE)
    expect(onsets).toHaveLength(MEANT[name].strokes.length)
    for (const [index, at] of MEANT[name].strokes.entries()) {
      expect(Math.abs((onsets[index] ?? 0) - at)).toBeLessThan(0.01)
    }
  })

  it('are told apart without hearing height: by strokes, by the time between them, or by how long they ring', () => {
    const all = SOUND_NAMES.map((name) => ({ name, ...rhythmOf(samplesOf(name)) }))
    for (const [index, a] of all.entries()) {
      for (const b of all.slice(index + 1)) {
        const isOther =
          a.gaps.length !== b.gaps.length ||
          a.gaps.some((gap, at) => ratio(gap, b.gaps[at] ?? 0) > 1.2) ||
          ratio(a.ring, b.ring) > 2
        expect(isOther, `${a.name} and ${b.name}`).toBe(true)
      }
    }
  })

  it('of the count are over before the next second', () => {
    for (const name of ['knock', 'logged', 'half', 'call-60', 'call-30', 'call-10'] as const) {
      expect(samplesOf(name).length / LOUDNESS_RATE).toBeLessThan(0.9)
    }
  })
})
