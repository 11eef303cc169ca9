/** WAV files of 16 bit, mono: what the sounds of the player are kept as. */

/** @param {Float64Array} samples -1 to 1 @param {number} rate samples a second */
export function wavOf(samples, rate) {
  const data = Buffer.alloc(44 + samples.length * 2)
  data.write('RIFF', 0)
  data.writeUInt32LE(36 + samples.length * 2, 4)
  data.write('WAVEfmt ', 8)
  data.writeUInt32LE(16, 16)
  data.writeUInt16LE(1, 20)
  data.writeUInt16LE(1, 22)
  data.writeUInt32LE(rate, 24)
  data.writeUInt32LE(rate * 2, 28)
  data.writeUInt16LE(2, 32)
  data.writeUInt16LE(16, 34)
  data.write('data', 36)
  data.writeUInt32LE(samples.length * 2, 40)
  samples.forEach((value, index) => data.writeInt16LE(Math.round(value * 32_767), 44 + index * 2))
  return data
}

/** The samples (-1 to 1) and the rate of a file that `wavOf` made. @param {Buffer} file */
export function readWav(file) {
  const head = file.toString('latin1', 0, 4) + file.toString('latin1', 8, 16)
  if (head !== 'RIFFWAVEfmt ' || file.readUInt16LE(22) !== 1 || file.readUInt16LE(34) !== 16) {
    throw new Error('This is no WAV file of 16 bit, mono.')
  }
  const samples = new Float64Array(file.readUInt32LE(40) / 2)
  samples.forEach((_, at) => {
    samples[at] = file.readInt16LE(44 + 2 * at) / 32_768
  })
  return { rate: file.readUInt32LE(24), samples }
}
