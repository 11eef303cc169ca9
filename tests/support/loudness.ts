/**
 * Loudness by ITU-R BS.1770, to check sounds with: nothing of the script that makes them is used. The
 * K-weighting's coefficients at 48 kHz are those of the recommendation's tables (from memory, then
 * checked in the test against the two calibration signals of BS.1770 annex 1 and EBU Tech 3341).
 */

export const LOUDNESS_RATE = 48_000

interface Biquad {
  b0: number
  b1: number
  b2: number
  a1: number
  a2: number
}
const HEAD: Biquad = {
  b0: 1.53512485958697,
  b1: -2.69169618940638,
  b2: 1.19839281085285,
  a1: -1.69065929318241,
  a2: 0.73248077421585,
}
const LOW_CUT: Biquad = { b0: 1, b1: -2, b2: 1, a1: -1.99004745483398, a2: 0.99007225036621 }

function biquad(input: Float64Array, { b0, b1, b2, a1, a2 }: Biquad): Float64Array {
  // Direct form I, state by state.
  let [x1, x2, y1, y2] = [0, 0, 0, 0]
  return input.map((x) => {
    const y = b0 * x + b1 * x1 + b2 * x2 - a1 * y1 - a2 * y2
    ;[x2, x1, y2, y1] = [x1, x, y1, y]
    return y
  })
}

/** Loudness of the whole of a signal, a `Float64Array` a front channel, ungated: LUFS. */
export function loudnessOf(channels: readonly Float64Array[]): number {
  const power = channels.reduce((sum, channel) => {
    const weighted = biquad(biquad(channel, HEAD), LOW_CUT)
    return sum + weighted.reduce((squares, value) => squares + value * value, 0) / weighted.length
  }, 0)
  return -0.691 + 10 * Math.log10(power)
}

/** The loudest momentary value (400 ms, here moved on by 10 ms); what is shorter has silence around it. */
export function mostMomentary(samples: Float64Array): number {
  const window = Math.round(0.4 * LOUDNESS_RATE)
  const padded = new Float64Array(samples.length + 2 * window)
  padded.set(samples, window)
  const weighted = biquad(biquad(padded, HEAD), LOW_CUT)
  let most = -Infinity
  for (let from = 0; from + window <= weighted.length; from += LOUDNESS_RATE / 100) {
    const part = weighted.subarray(from, from + window)
    const power = part.reduce((sum, value) => sum + value * value, 0) / window
    if (power > 0) most = Math.max(most, -0.691 + 10 * Math.log10(power))
  }
  return most
}

/** Peak between the samples, of a wave four times oversampled with a windowed sinc: dB of full scale. */
export function truePeak(samples: Float64Array): number {
  const taps = 24
  let peak = 0
  for (let index = 0; index < samples.length; index += 1) {
    for (let phase = 0; phase < 4; phase += 1) {
      const offset = phase / 4
      let value = 0
      for (let tap = -taps; tap <= taps; tap += 1) {
        const distance = tap - offset
        const sinc = distance === 0 ? 1 : Math.sin(Math.PI * distance) / (Math.PI * distance)
        const hann = 0.5 + 0.5 * Math.cos((Math.PI * distance) / (taps + 1))
        value += (samples[index + tap] ?? 0) * sinc * hann
      }
      peak = Math.max(peak, Math.abs(value))
    }
  }
  return 20 * Math.log10(peak)
}
