/** Sounds laid over one another at their instants, as the player's audio clock would start them. */

export interface Placed {
  /** Milliseconds from the start of the recording. */
  atMs: number
  samples: Float64Array
}

/** One channel at `rate`, as long as the last sound needs; each begins at the sample nearest to its instant. */
export function mixed(placed: readonly Placed[], rate: number): Float64Array {
  const starts = placed.map((one) => Math.round((one.atMs / 1_000) * rate))
  const length = Math.max(0, ...placed.map((one, at) => (starts[at] ?? 0) + one.samples.length))
  const out = new Float64Array(length)
  placed.forEach((one, at) => {
    const from = starts[at] ?? 0
    one.samples.forEach((value, index) => {
      out[from + index] = (out[from + index] ?? 0) + value
    })
  })
  // Where two sound at once the sum may pass full level: all of it is turned down alike.
  const peak = out.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  return peak > 1 ? out.map((value) => value / peak) : out
}
