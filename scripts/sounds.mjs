/**
 * Makes the sounds of the player (`npm run sounds`, or into a folder that is given): every one is computed here, from sines that die
 * away. Equally loud by ITU-R BS.1770. 48 kHz, 16 bit, mono.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { wavOf } from './lib/wav.mjs'

const RATE = 48_000
/** Between samples a wave may rise above them; this leaves room to -1 dB. */
const PEAK = 0.84

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
  return edged(samples)
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
    0.008,
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

/** Told apart by how many strokes there are, how far apart, and how long they ring; height comes on top. */
const SOUNDS = {
  // The count: one dry stroke.
  knock: wood(620),
  // Work begins: one long ring.
  bell: bell(880, 1.1),
  // Work ends: two slow strokes.
  'bell-low': sequence([
    [0, bell(440, 0.7)],
    [0.42, bell(440, 1)],
  ]),
  // A rest ends: a quick pair and one that rings.
  'rest-end': sequence([
    [0, wood(740, 0.11)],
    [0.11, wood(740, 0.11)],
    [0.33, bell(740, 0.8)],
  ]),
  // Half-way: a soft double.
  half: sequence([
    [0, soft(660, 0.2)],
    [0.22, soft(660)],
  ]),
  // A round is logged: a click.
  logged: strike(
    1_400,
    0.07,
    [
      [1, 1, 0.02],
      [1.5, 0.3, 0.012],
    ],
    0.001,
  ),
  // The longer there is to go, the more strokes.
  'call-60': strokes(520, 4, 0.17),
  'call-30': strokes(900, 3, 0.14),
  'call-10': strokes(1_050, 2, 0.12),
}

function strokes(hertz, count, everySeconds) {
  return sequence(
    Array.from({ length: count }, (_, index) => [index * everySeconds, wood(hertz, 0.13)]),
  )
}

/** What a logged round is softer by than what must be heard: loudness units. */
const SOFTER = { logged: 3 }

/** The K-weighting of ITU-R BS.1770 at 48 kHz: two filters one after the other. */
const K_WEIGHTING = [
  {
    b: [1.53512485958697, -2.69169618940638, 1.19839281085285],
    a: [1, -1.69065929318241, 0.73248077421585],
  },
  { b: [1, -2, 1], a: [1, -1.99004745483398, 0.99007225036621] },
]

function filtered(samples, { b, a }) {
  const out = new Float64Array(samples.length)
  for (let index = 0; index < samples.length; index += 1) {
    out[index] =
      b[0] * samples[index] +
      b[1] * (samples[index - 1] ?? 0) +
      b[2] * (samples[index - 2] ?? 0) -
      a[1] * (out[index - 1] ?? 0) -
      a[2] * (out[index - 2] ?? 0)
  }
  return out
}

/** The loudest 400 ms (momentary loudness of BS.1770), silence around a shorter sound: LUFS. */
function loudness(samples) {
  const window = Math.round(0.4 * RATE)
  const padded = new Float64Array(samples.length + 2 * window)
  padded.set(samples, window)
  const weighted = K_WEIGHTING.reduce(filtered, padded)
  let power = 0
  let most = 0
  for (let index = 0; index < weighted.length; index += 1) {
    power += weighted[index] ** 2 - (weighted[index - window] ?? 0) ** 2
    most = Math.max(most, power)
  }
  return -0.691 + 10 * Math.log10(most / window)
}

const peakOf = (samples) => samples.reduce((high, value) => Math.max(high, Math.abs(value)), 0)
const scaled = (samples, by) => samples.map((value) => value * by)

/** Both ends at zero, so that nothing clicks. */
function edged(samples) {
  const fade = Math.round(0.006 * RATE)
  return samples.map((value, index) =>
    index === 0 ? 0 : value * Math.min(1, (samples.length - 1 - index) / fade),
  )
}

/** All equally loud, as loud as the one that reaches full level first allows. */
function levelled(sounds) {
  const full = Object.entries(sounds).map(([name, samples]) => {
    return [name, scaled(samples, PEAK / peakOf(samples))]
  })
  const wanted = Math.min(...full.map(([name, one]) => loudness(one) + (SOFTER[name] ?? 0)))
  return full.map(([name, one]) => {
    const target = wanted - (SOFTER[name] ?? 0)
    return [name, scaled(one, 10 ** ((target - loudness(one)) / 20))]
  })
}

const folder = process.argv[2] ?? fileURLToPath(new URL('../public/sounds/', import.meta.url))
mkdirSync(folder, { recursive: true })
for (const [name, samples] of levelled(SOUNDS)) {
  writeFileSync(join(folder, `${name}.wav`), wavOf(samples, RATE))
}
console.log(`${Object.keys(SOUNDS).length} sounds are in ${folder}.`)
