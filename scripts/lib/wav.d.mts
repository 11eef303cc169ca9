/** A WAV file of 16 bit, mono; samples are -1 to 1, `rate` of them a second. */
export function wavOf(samples: Float64Array, rate: number): Buffer
/** Throws for any other kind of file. */
export function readWav(file: Buffer): { samples: Float64Array; rate: number }
