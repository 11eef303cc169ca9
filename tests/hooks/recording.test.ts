/** A block's beeps as a file, heard by a detector that knows nothing of the plan or of the mixing. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { readWav } from '@/scripts/lib/wav.mjs'
import { recordingCommand, recordingOf, soundsOfBlock } from '@/scripts/recording-command'
import { block, versionOf } from '../engine/classes'
import { onsetsOf } from '../support/onsets'

const version = versionOf([
  block('before', { type: 'rest', seconds: 20 }),
  block(
    'pieces',
    {
      type: 'intervals',
      rounds: 2,
      stations: [{ movement: 'goblet-squat', work: 20, rest: 12 }],
    },
    { countIn: 5, brief: 'Two short pieces.' },
  ),
  // Long enough for half-way, and for every call beside it.
  block('long', {
    type: 'intervals',
    rounds: 1,
    stations: [{ movement: 'goblet-squat', work: 140, rest: 0 }],
  }),
])

/** Further strokes of a sound, in milliseconds after its first (scripts/sounds.mjs). */
const INNER: Record<string, number[]> = {
  'bell-low': [420],
  'rest-end': [110, 330],
  half: [220],
  'call-60': [170, 340, 510],
  'call-30': [140, 280],
  'call-10': [120],
}

describe('the recording of a block', () => {
  // By the table of marks: count-in of 5 s (3, 2, 1, start), work of 20 s (10 s call, 3, 2, 1, end),
  // rest of 12 s (3, 2, 1, start), work of 20 s again.
  const planned = [
    2_000, 3_000, 4_000, 5_000, 15_000, 22_000, 23_000, 24_000, 25_000, 34_000, 35_000, 36_000,
    37_000, 47_000, 54_000, 55_000, 56_000, 57_000,
  ]

  it('holds every sound of the plan, from the block’s own start', () => {
    const sounds = soundsOfBlock(version, 'pieces')
    expect(sounds.map((one) => one.atMs)).toEqual(planned)
    expect(sounds.map((one) => one.sound).slice(3, 5)).toEqual(['bell', 'call-10'])
    expect(sounds.filter((one) => one.sound === 'rest-end')).toHaveLength(1)
  })

  it('begins with the bell where a brief leads straight into work, as the player does', () => {
    const straight = versionOf([
      block(
        'b',
        { type: 'holds', stations: [{ movement: 'goblet-squat', seconds: 8 }] },
        { brief: 'Hold.', countIn: 0 },
      ),
      block(
        'after',
        { type: 'holds', stations: [{ movement: 'goblet-squat', seconds: 5 }] },
        { countIn: 0 },
      ),
    ])
    expect(soundsOfBlock(straight, 'b')[0]).toEqual({ atMs: 0, sound: 'bell' })
    expect(soundsOfBlock(straight, 'after').filter((one) => one.atMs === 0)).toEqual([
      { atMs: 0, sound: 'bell' },
    ])
  })

  it('holds half-way and each call of a long piece', () => {
    // Count-in of 5 s (3, 2, 1, start), work of 140 s (half, 60 s, 30 s and 10 s calls, 5 to 1, end).
    const sounds = soundsOfBlock(version, 'long').filter((one) => one.sound !== 'knock')
    expect(sounds).toEqual([
      { atMs: 5_000, sound: 'bell' },
      { atMs: 75_000, sound: 'half' },
      { atMs: 85_000, sound: 'call-60' },
      { atMs: 115_000, sound: 'call-30' },
      { atMs: 135_000, sound: 'call-10' },
      { atMs: 145_000, sound: 'bell-low' },
    ])
  })

  it.each([
    ['pieces', 0, 24],
    // From shortly before half-way: a minute of silence first would only take long to listen to.
    ['long', 70_000, 18],
  ])(
    'sounds each of %s (from %i ms) within 10 ms of plan, and nothing else, as a detector of onsets hears it',
    (id, fromMs, strokes) => {
      const sounds = soundsOfBlock(version, id)
        .filter((one) => one.atMs >= fromMs)
        .map((one) => ({ ...one, atMs: one.atMs - fromMs }))
      const { rate, samples } = readWav(recordingOf(sounds, 'public/sounds'))
      const heard = onsetsOf(samples, rate).map((at) => at * 1_000)
      const expected = sounds
        .flatMap(({ atMs, sound }) => [atMs, ...(INNER[sound] ?? []).map((more) => atMs + more)])
        .sort((a, b) => a - b)
      expect(heard).toHaveLength(strokes)
      expect(expected).toHaveLength(strokes)
      const off = heard.map((at, index) => Math.abs(at - (expected[index] ?? Infinity)))
      expect(Math.max(...off)).toBeLessThan(10)
    },
  )

  it('is written by one command, which says what it placed, or what is wrong with the call', () => {
    const folder = mkdtempSync(join(tmpdir(), 'floorside-recording-'))
    const [spec, out] = [join(folder, 'class.json'), join(folder, 'beeps.wav')]
    writeFileSync(spec, JSON.stringify(version))
    const { code, text } = recordingCommand([spec, '--block', 'pieces', '--out', out])
    expect(code).toBe(0)
    expect(JSON.parse(text)).toHaveLength(planned.length)
    expect(readWav(readFileSync(out)).samples.length / 48_000).toBeCloseTo(57 + 1.42, 1)
    expect(recordingCommand([spec, '--block', 'none', '--out', out]).code).toBe(2)
    expect(recordingCommand([spec]).code).toBe(2)
    expect(recordingCommand(['missing.json', '--block', 'a', '--out', out]).code).toBe(2)
    writeFileSync(spec, JSON.stringify({ spec: 1 }))
    expect(recordingCommand([spec, '--block', 'pieces', '--out', out]).code).toBe(1)
    rmSync(folder, { recursive: true })
  })
})
