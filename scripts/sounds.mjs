/**
 * Makes the sounds of the player (`npm run sounds`, or into a folder that is given): every one is computed here, from sines that die
 * away, and told apart by rhythm as well as by height. 44.1 kHz, 16 bit, mono.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const RATE = 44_100
const PEAK = 0.89

/** Partials [ratio, level, seconds until a tenth] of a struck thing at `hertz`. */
function strike(hertz, seconds, partials, attackSeconds = 0.002) {
  const samples = new Float64Array(Math.round(seconds * RATE))
  for (const [ratio, level, decay] of partials) {
    for (let index = 0; index < samples.length; index += 1) {
      const time = index / RATE
      const swell = Math.min(1, time / attackSeconds)
      samples[index] +=
        level * swell * 10 ** (-time / decay) * Math.sin(2 * Math.PI * hertz * ratio * time)
    }
  }
  return samples
}

const wood = (hertz, seconds = 0.16) =>
  strike(hertz, seconds, [
    [1, 1, 0.07],
    [2.71, 0.35, 0.03],
    [5.2, 0.12, 0.015],
  ])
const bell = (hertz, seconds) =>
  strike(
    hertz,
    seconds,
    [
      [1, 1, seconds * 0.55],
      [2, 0.45, seconds * 0.4],
      [2.76, 0.3, seconds * 0.22],
      [5.4, 0.12, seconds * 0.1],
    ],
    0.004,
  )
const soft = (hertz, seconds = 0.3) =>
  strike(
    hertz,
    seconds,
    [
      [1, 1, 0.2],
      [2, 0.15, 0.1],
    ],
    0.02,
  )

/** Several sounds in one, each at its own second. */
function sequence(parts) {
  const length = Math.max(...parts.map(([at, one]) => Math.round(at * RATE) + one.length))
  const samples = new Float64Array(length)
  for (const [at, one] of parts) {
    const offset = Math.round(at * RATE)
    one.forEach((value, index) => {
      samples[offset + index] += value
    })
  }
  return samples
}

const SOUNDS = {
  knock: wood(620),
  bell: bell(880, 1.1),
  'bell-low': bell(440, 1.3),
  half: sequence([
    [0, soft(660)],
    [0.22, soft(660)],
  ]),
  logged: strike(
    1_400,
    0.07,
    [
      [1, 1, 0.02],
      [1.5, 0.3, 0.012],
    ],
    0.001,
  ),
  'call-60': sequence([[0, soft(520, 0.7)]]),
  'call-30': sequence([
    [0, wood(900, 0.12)],
    [0.14, wood(900, 0.12)],
    [0.28, wood(900, 0.12)],
  ]),
  'call-10': sequence([
    [0, wood(1_050, 0.12)],
    [0.12, wood(780, 0.14)],
  ]),
}

/** The loudest 50 ms at the same power for all, peaks below full, both ends at zero. */
function finished(samples) {
  const windowLength = Math.round(0.05 * RATE)
  let most = 0
  for (let from = 0; from < samples.length; from += windowLength >> 1) {
    let power = 0
    const part = samples.subarray(from, from + windowLength)
    for (const value of part) power += value * value
    most = Math.max(most, Math.sqrt(power / windowLength))
  }
  const scaled = samples.map((value) => (value * 0.22) / most)
  const peak = scaled.reduce((high, value) => Math.max(high, Math.abs(value)), 0)
  const fade = Math.round(0.006 * RATE)
  return scaled.map((value, index) => {
    const edge = Math.min(1, (samples.length - 1 - index) / fade)
    return index === 0 ? 0 : value * edge * Math.min(1, PEAK / peak)
  })
}

function wav(samples) {
  const data = Buffer.alloc(44 + samples.length * 2)
  data.write('RIFF', 0)
  data.writeUInt32LE(36 + samples.length * 2, 4)
  data.write('WAVEfmt ', 8)
  data.writeUInt32LE(16, 16)
  data.writeUInt16LE(1, 20)
  data.writeUInt16LE(1, 22)
  data.writeUInt32LE(RATE, 24)
  data.writeUInt32LE(RATE * 2, 28)
  data.writeUInt16LE(2, 32)
  data.writeUInt16LE(16, 34)
  data.write('data', 36)
  data.writeUInt32LE(samples.length * 2, 40)
  samples.forEach((value, index) => data.writeInt16LE(Math.round(value * 32_767), 44 + index * 2))
  return data
}

const folder = process.argv[2] ?? fileURLToPath(new URL('../public/sounds/', import.meta.url))
mkdirSync(folder, { recursive: true })
for (const [name, samples] of Object.entries(SOUNDS)) {
  writeFileSync(join(folder, `${name}.wav`), wav(finished(samples)))
}
console.log(`${Object.keys(SOUNDS).length} sounds are in ${folder}.`)
