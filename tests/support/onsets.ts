/**
 * Onsets of a recording by spectral flux: the summed rise of log magnitudes from one short spectrum to
 * the next, and the peaks of it above a moving median (Bello et al. 2005, 'A tutorial on onset detection
 * in music signals', IEEE Transactions on Speech and Audio Processing 13(5), sections III and IV). The
 * spectra are fft.js's.
 */
import FFT from 'fft.js'

const SIZE = 512
const HOP = 96
/** Frames on either side of the moving median. */
const AROUND = 20
/** A peak is the highest of its neighbourhood: seconds. */
const APART_SECONDS = 0.05
const LEAST_RISE = 12

/** Instants in seconds at which something begins to sound. */
export function onsetsOf(samples: Float64Array, rate: number): number[] {
  const fft = new FFT(SIZE)
  const window = Float64Array.from(
    { length: SIZE },
    (_, at) => 0.5 - 0.5 * Math.cos((2 * Math.PI * at) / SIZE),
  )
  const flux: number[] = []
  let before: number[] = []
  const spectrum: number[] = fft.createComplexArray()
  for (let from = -SIZE; from < samples.length; from += HOP) {
    const part = Array.from(
      { length: SIZE },
      (_, at) => (samples[from + at] ?? 0) * (window[at] ?? 0),
    )
    fft.realTransform(spectrum, part)
    const levels = Array.from({ length: SIZE / 2 }, (_, bin) =>
      Math.log1p(1_000 * Math.hypot(spectrum[2 * bin] ?? 0, spectrum[2 * bin + 1] ?? 0)),
    )
    flux.push(levels.reduce((sum, level, bin) => sum + Math.max(0, level - (before[bin] ?? 0)), 0))
    before = levels
  }
  const apart = Math.round((APART_SECONDS * rate) / HOP)
  return flux.flatMap((rise, index) => {
    const around = flux.slice(Math.max(0, index - apart), index + apart + 1)
    const isPeak = rise === Math.max(...around) && flux.lastIndexOf(rise, index + apart) === index
    if (!isPeak) return []
    const near = flux.slice(Math.max(0, index - AROUND), index + AROUND + 1).sort((a, b) => a - b)
    const median = near[near.length >> 1] ?? 0
    if (rise < median * 2 + LEAST_RISE) return []
    // A frame hears what comes in at its end, where its window is still low: about a third before it.
    return [(-SIZE + index * HOP + SIZE * 0.7) / rate]
  })
}
