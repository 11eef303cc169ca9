import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'

const FOLDER = 'public/sounds'
const RATE = 44_100
const names = readdirSync(FOLDER).filter((name) => name.endsWith('.wav'))

function samplesOf(name: string): Float64Array {
  const file = readFileSync(join(FOLDER, name))
  expect(file.toString('latin1', 0, 4) + file.toString('latin1', 8, 16)).toBe('RIFFWAVEfmt ')
  expect([file.readUInt16LE(22), file.readUInt32LE(24), file.readUInt16LE(34)]).toEqual([
    1,
    RATE,
    16,
  ])
  const count = file.readUInt32LE(40) / 2
  return Float64Array.from(
    { length: count },
    (_, index) => file.readInt16LE(44 + 2 * index) / 32_768,
  )
}

const rms = (part: Float64Array) =>
  Math.sqrt(part.reduce((sum, value) => sum + value * value, 0) / part.length)

function loudest(samples: Float64Array): number {
  const length = Math.round(0.05 * RATE)
  let most = 0
  for (let from = 0; from < samples.length; from += length >> 2) {
    const part = samples.subarray(from, from + length)
    if (part.length === length) most = Math.max(most, rms(part))
  }
  return most
}

/** Beginnings of strokes: where the level of 10 ms is four times that of the 20 ms before. */
function strokes(samples: Float64Array): number {
  const step = Math.round(0.01 * RATE)
  const levels = Array.from({ length: Math.floor(samples.length / step) }, (_, index) =>
    rms(samples.subarray(index * step, (index + 1) * step)),
  )
  const peak = Math.max(...levels)
  let count = 0
  let quietFor = 10
  levels.forEach((level, index) => {
    const before = Math.max(levels[index - 1] ?? 0, levels[index - 2] ?? 0)
    const rises = level > 0.25 * peak && level > 1.6 * before && quietFor > 5
    quietFor = rises ? 0 : quietFor + 1
    if (rises) count += 1
  })
  return count
}

describe('the sounds of the player', () => {
  it('are what the script of the project makes, to the byte', () => {
    const folder = mkdtempSync(join(tmpdir(), 'floorside-sounds-'))
    execFileSync('node', ['scripts/sounds.mjs', folder])
    expect(readdirSync(folder).sort()).toEqual([...names].sort())
    for (const name of names) {
      expect(readFileSync(join(folder, name)).equals(readFileSync(join(FOLDER, name)))).toBe(true)
    }
    rmSync(folder, { recursive: true })
  })

  it.each(names)(
    '%s begins and ends at zero, so that nothing clicks, and is never clipped',
    (name) => {
      const samples = samplesOf(name)
      expect(samples[0]).toBe(0)
      expect(samples.at(-1)).toBeCloseTo(0, 3)
      const peak = samples.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
      expect(peak).toBeLessThan(0.9)
      expect(peak).toBeGreaterThan(0.2)
    },
  )

  it('are equally loud within 3 dB in their loudest 50 ms', () => {
    const levels = names.map((name) => 20 * Math.log10(loudest(samplesOf(name))))
    expect(Math.max(...levels) - Math.min(...levels)).toBeLessThan(3)
  })

  it('are told apart by rhythm: one stroke, two or three', () => {
    expect(Object.fromEntries(names.map((name) => [name, strokes(samplesOf(name))]))).toEqual({
      'bell-low.wav': 1,
      'bell.wav': 1,
      'call-10.wav': 2,
      'call-30.wav': 3,
      'call-60.wav': 1,
      'half.wav': 2,
      'knock.wav': 1,
      'logged.wav': 1,
    })
  })

  it('of the count are over before the next second', () => {
    for (const name of ['knock.wav', 'logged.wav', 'half.wav', 'call-10.wav', 'call-30.wav']) {
      expect(samplesOf(name).length / RATE).toBeLessThan(0.9)
    }
  })
})
