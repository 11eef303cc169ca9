import { describe, expect, test } from 'vitest'
import {
  HEAD_BYTES,
  mediaTypeOf,
  MOST_BYTES,
  tooLargeText,
  type MediaContentType,
} from '@/server/contract/media-types'

/** 'FF D8 ftyp …': hexadecimal bytes, and text in apostrophes. */
function bytes(written: string): Uint8Array {
  const parts = written.match(/'[^']*'|[0-9A-F]{2}/g) ?? []
  return Uint8Array.from(
    parts.flatMap((part) =>
      part.startsWith("'") ? [...Buffer.from(part.slice(1, -1), 'latin1')] : [parseInt(part, 16)],
    ),
  )
}

const MATROSKA_HEADER = (docType: string, size: string) =>
  `1A 45 DF A3 ${size} 42 86 81 01 42 F7 81 01 42 F2 81 04 42 F3 81 08 ${docType} 42 87 81 04 42 85 81 02`

const TAKEN: [what: string, head: string, type: MediaContentType][] = [
  // MIME Sniffing (WHATWG), table of 6.1 'Matching an image type pattern', as it is printed there.
  ['JPEG: FF D8 FF', 'FF D8 FF', 'image/jpeg'],
  ['PNG: 89 50 4E 47 0D 0A 1A 0A', '89 50 4E 47 0D 0A 1A 0A', 'image/png'],
  // RFC 9649, 2.5 to 2.7: the first chunk of the three kinds of file.
  ['WebP, lossy', "'RIFF' 24 00 00 00 'WEBPVP8 '", 'image/webp'],
  ['WebP, lossless', "'RIFF' 24 00 00 00 'WEBPVP8L'", 'image/webp'],
  ['WebP, extended', "'RIFF' 24 00 00 00 'WEBPVP8X'", 'image/webp'],
  // The first bytes that the common encoders write.
  [
    'MP4 of a telephone',
    "00 00 00 18 'ftypmp42' 00 00 00 00 'isommp42' 00 00 03 01 'moov'",
    'video/mp4',
  ],
  [
    'MP4 of an encoder',
    "00 00 00 20 'ftypisom' 00 00 02 00 'isomiso2avc1mp41' 00 00 00 08 'free'",
    'video/mp4',
  ],
  [
    'MP4 that only a compatible brand tells',
    "00 00 00 1C 'ftypXAVC' 01 00 1F FF 'XAVCmp42iso2'",
    'video/mp4',
  ],
  ['WebM of an encoder', MATROSKA_HEADER("42 82 84 'webm'", '9F'), 'video/webm'],
  [
    'WebM with its size in eight bytes',
    MATROSKA_HEADER("42 82 84 'webm'", '01 00 00 00 00 00 00 1F'),
    'video/webm',
  ],
  [
    'WebM whose type is filled up with zeros',
    MATROSKA_HEADER("42 82 88 'webm' 00 00 00 00", 'A3'),
    'video/webm',
  ],
]

const REFUSED: [what: string, head: string][] = [
  ['nothing', ''],
  ['text', "'<!doctype html><script>'"],
  ['SVG', '\'<svg xmlns="http://www.w3.org/2000/svg"/>\''],
  ['GIF', "'GIF89a'"],
  ['PDF', "'%PDF-1.7'"],
  ['half of the signature of PNG', '89 50 4E 47'],
  ['a sound in RIFF', "'RIFF' 24 00 00 00 'WAVEfmt '"],
  ['a film in RIFF', "'RIFF' 24 00 00 00 'AVI LIST'"],
  ['HEIC', "00 00 00 18 'ftypheic' 00 00 00 00 'mif1heic'"],
  ['AVIF, moving, that says it is like MP4', "00 00 00 1C 'ftypavis' 00 00 00 00 'msf1iso8avis'"],
  ['M4A', "00 00 00 18 'ftypM4A ' 00 00 02 00 'isommp42'"],
  ['QuickTime', "00 00 00 14 'ftypqt  ' 00 00 02 00 'qt  '"],
  ['ftyp elsewhere than at 4', "00 00 00 00 18 'ftypmp42' 00 00 00 00 'isommp42'"],
  ['a box too short for a brand', "00 00 00 08 'ftypmp42' 00 00 00 00 'isom'"],
  ['Matroska', MATROSKA_HEADER("42 82 88 'matroska'", 'A3')],
  ['EBML without a type', '1A 45 DF A3 84 42 86 81 01'],
  ['EBML that says webm elsewhere than in its type', "1A 45 DF A3 88 EC 84 'webm' 'webm'"],
  ['EBML cut short', '1A 45 DF A3'],
]

describe('a file', () => {
  test.each(TAKEN)('with the first bytes of %s is known by them', (_what, head, contentType) => {
    const kind = contentType.startsWith('video/') ? 'clip' : 'picture'
    expect(mediaTypeOf(bytes(head))).toEqual({ kind, contentType })
    // Whatever follows does not matter.
    const longer = new Uint8Array(HEAD_BYTES)
    longer.set(bytes(head))
    expect(mediaTypeOf(longer)).toEqual({ kind, contentType })
  })

  test.each(REFUSED)('that is %s is none that may be shown', (_what, head) => {
    expect(mediaTypeOf(bytes(head))).toBeNull()
  })

  test('of any bytes is read without an error', () => {
    let seed = 7
    const random = () => (seed = (seed * 48_271) % 2_147_483_647) & 0xff
    for (let round = 0; round < 2_000; round += 1) {
      const head = Uint8Array.from({ length: round % 64 }, random)
      if (round % 2 === 0) head.set([0x1a, 0x45, 0xdf, 0xa3].slice(0, head.length))
      expect(() => mediaTypeOf(head)).not.toThrow()
    }
  })
})

test('a file that is too large is told what may be, what it has and what to do', () => {
  expect(tooLargeText('clip', MOST_BYTES.clip + 1)).toBe(
    'A clip may have 60 MB at most, and this has 60.1 MB. Shorten it, or export it smaller.',
  )
  expect(tooLargeText('picture', 12_000_000)).toBe(
    'A picture may have 8 MB at most, and this has 12 MB. Export it smaller.',
  )
})
