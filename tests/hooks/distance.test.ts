import { readFileSync } from 'node:fs'
import { brotliDecompressSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { CAP_ARC_MINUTES, CAP_RATIO, distanceTextPx, heightMm } from '@/hooks/player/distance'

describe('text that is read from a distance', () => {
  // shared/reference/screen-legibility.json, heights_mm: h = 2·d·tan(θ/2), the rule of ISO 9241-3 as
  // quoted by IBM's Healthy Computing page and of NUREG-0700 rev. 2, 1.3.1-4.
  it.each([
    [0.4, 22, 2.56],
    [1, 20, 5.82],
    [2, 16, 9.31],
    [2, 22, 12.8],
    [2.63, 22, 16.83],
    [3, 24, 20.94],
    [3.5, 22, 22.4],
    [4, 45, 52.36],
  ])('at %f m, %f minutes of arc are %f mm high', (metres, arcMinutes, mm) => {
    expect(heightMm(metres, arcMinutes)).toBeCloseTo(mm, 2)
  })

  // Same file, tv_table: cap height in px of a 1920 × 1080 picture at 22 minutes of arc,
  // given to 0.1 px from rounded millimetres, so 0.06 off at most.
  it.each([
    [32, 2, 34.7],
    [40, 2.63, 36.5],
    [43, 2, 25.8],
    [43, 3, 38.7],
    [50, 4, 44.4],
    [55, 3, 30.3],
    [65, 2.63, 22.4],
    [75, 4, 29.6],
  ])('on a %f-inch set at %f m capitals are %f px high', (diagonalInches, distanceMetres, px) => {
    const size = distanceTextPx({ diagonalInches, distanceMetres, widthPx: 1920, heightPx: 1080 })
    expect(CAP_ARC_MINUTES).toBe(22)
    expect(Math.abs(size * CAP_RATIO - px)).toBeLessThanOrEqual(0.06)
  })

  it('keeps its height in millimetres where the browser counts fewer pixels to the screen', () => {
    const screen = { diagonalInches: 14, distanceMetres: 2 }
    const plain = distanceTextPx({ ...screen, widthPx: 1920, heightPx: 1080 })
    const scaled = distanceTextPx({ ...screen, widthPx: 1280, heightPx: 720 })
    expect(scaled / plain).toBeCloseTo(2 / 3, 10)
  })

  it('takes the height of capitals from the font that is shipped (OS/2 sCapHeight ÷ head unitsPerEm)', () => {
    const font = new Uint8Array(readFileSync('public/fonts/atkinson-hyperlegible-next-latin.woff2'))
    const tables = woff2Tables(font)
    const os2 = tables('OS/2')
    const head = tables('head')
    expect(os2.getInt16(88) / head.getUint16(18)).toBeCloseTo(CAP_RATIO, 2)
  })
})

/** Tables of a WOFF2 file that are stored as they are (W3C WOFF File Format 2.0, 4.1 and 5). */
function woff2Tables(file: Uint8Array): (tag: string) => DataView {
  const known =
    'cmap head hhea hmtx maxp name OS/2 post cvt_ fpgm glyf loca prep CFF_ VORG EBDT EBLC gasp hdmx kern LTSH PCLT VDMX vhea vmtx BASE GDEF GPOS GSUB EBSC JSTF MATH CBDT CBLC COLR CPAL SVG_ sbix acnt avar bdat bloc bsln cvar fdsc feat fmtx fvar gvar hsty just lcar mort morx opbd prop trak Zapf Silf Glat Gloc Feat Sill'.split(
      ' ',
    )
  const view = new DataView(file.buffer, file.byteOffset, file.byteLength)
  let at = 48
  const base128 = () => {
    let value = 0
    for (;;) {
      const byte = view.getUint8(at)
      at += 1
      value = value * 128 + (byte & 0x7f)
      if (!(byte & 0x80)) return value
    }
  }
  const lengths: { tag: string; length: number }[] = []
  for (let table = view.getUint16(12); table > 0; table -= 1) {
    const flags = view.getUint8(at)
    at += 1
    let tag = known[flags & 0x3f] ?? ''
    if ((flags & 0x3f) === 63) {
      tag = String.fromCharCode(...file.subarray(at, at + 4))
      at += 4
    }
    const length = base128()
    const isOutline = tag === 'glyf' || tag === 'loca'
    const isTransformed = isOutline ? flags >> 6 === 0 : flags >> 6 !== 0
    lengths.push({ tag, length: isTransformed ? base128() : length })
  }
  const data = new Uint8Array(brotliDecompressSync(file.subarray(at, at + view.getUint32(20))))
  return (wanted) => {
    let offset = 0
    for (const { tag, length } of lengths) {
      if (tag === wanted) return new DataView(data.buffer, data.byteOffset + offset, length)
      offset += length
    }
    throw new Error(`The font has no table ${wanted}`)
  }
}
