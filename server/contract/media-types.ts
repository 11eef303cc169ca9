/**
 * What a coach may show of an option, known by its first bytes: names and headers are whatever somebody wrote.
 * The signatures are those of the MIME Sniffing standard (WHATWG, sections 6.1 and 6.2) and of each format's own
 * specification, named beside them.
 */

export type MediaKind = 'clip' | 'picture'
export type MediaContentType =
  'video/mp4' | 'video/webm' | 'image/jpeg' | 'image/png' | 'image/webp'

export interface MediaType {
  kind: MediaKind
  contentType: MediaContentType
}

/** Most bytes of each kind, and of a clip's still. */
export const MOST_BYTES = { clip: 60_000_000, picture: 8_000_000, poster: 1_000_000 } as const

/** As many of a file's first bytes as any signature needs: WebM's header is under 100 as a rule. */
export const HEAD_BYTES = 1_024

const KIND_WORD = { clip: 'A clip', picture: 'A picture', poster: 'A clip’s still' } as const

export const WRONG_TYPE =
  'This is no file that every browser shows. Choose a clip as MP4 or WebM, or a picture as JPEG, PNG or WebP.'

/** What to say of a file that is too large. `bytes`: its length. */
export function tooLargeText(what: keyof typeof MOST_BYTES, bytes: number): string {
  // Rounded up, so that a file just over the limit is never said to be as long as the limit.
  const megabytes = Math.ceil(bytes / 100_000) / 10
  const way = what === 'clip' ? 'Shorten it, or export it smaller' : 'Export it smaller'
  return `${KIND_WORD[what]} may have ${MOST_BYTES[what] / 1_000_000} MB at most, and this has ${megabytes} MB. ${way}.`
}

/** The type that a file's first bytes tell; null for any that is not taken. */
export function mediaTypeOf(head: Uint8Array): MediaType | null {
  // ISO/IEC 10918-1, annex B: start of image (FF D8), then the first byte of the next marker.
  if (startsWith(head, [0xff, 0xd8, 0xff])) return { kind: 'picture', contentType: 'image/jpeg' }
  // PNG (W3C), 5.2: 89 'PNG' CR LF 1A LF.
  if (startsWith(head, [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])) {
    return { kind: 'picture', contentType: 'image/png' }
  }
  // RFC 9649, 2.4: 'RIFF', four bytes of length, 'WEBP', and a first chunk whose name begins with 'VP8'.
  if (text(head, 0, 4) === 'RIFF' && text(head, 8, 7) === 'WEBPVP8') {
    return { kind: 'picture', contentType: 'image/webp' }
  }
  if (isMp4(head)) return { kind: 'clip', contentType: 'video/mp4' }
  if (isWebm(head)) return { kind: 'clip', contentType: 'video/webm' }
  return null
}

function startsWith(head: Uint8Array, signature: readonly number[]): boolean {
  return signature.every((byte, index) => head[index] === byte)
}

function text(head: Uint8Array, from: number, length: number): string {
  return String.fromCharCode(...head.subarray(from, from + length))
}

/**
 * Brands of the registry of the MP4 registration authority that say 'a film as MP4'. HEIC and AVIF pictures,
 * M4A sound and QuickTime films are files of the same build with other brands, and not what browsers play.
 */
const MP4_BRAND = /^(?:mp4[12]|iso[m2-9a-c]|avc1|M4V[ HP]|dash|cmfc|MSNV)$/
const OTHER_BRAND = /^(?:he[iv][a-z]|mif[12]|msf1|avi[fs]|M4[ABP] |qt {2})$/

/** ISO/IEC 14496-12, 4.3: a box 'ftyp' at the start, with the major brand and those it is compatible with. */
function isMp4(head: Uint8Array): boolean {
  if (text(head, 4, 4) !== 'ftyp') return false
  const size = numberOf(head.subarray(0, 4))
  const major = text(head, 8, 4)
  // A size that is no multiple of four, or too short for a brand, is no box of this kind (MIME Sniffing, 6.2.1).
  if (size < 16 || size % 4 !== 0 || OTHER_BRAND.test(major)) return false
  if (MP4_BRAND.test(major)) return true
  for (let at = 16; at + 4 <= Math.min(size, head.length); at += 4) {
    if (MP4_BRAND.test(text(head, at, 4))) return true
  }
  return false
}

const EBML_ID = [0x1a, 0x45, 0xdf, 0xa3]
const DOC_TYPE_ID = 0x4282

/** RFC 8794, 11.2: an EBML header, whose element DocType (42 82) says 'webm'; 'matroska' is another format. */
function isWebm(head: Uint8Array): boolean {
  if (!startsWith(head, EBML_ID)) return false
  const size = variable(head, EBML_ID.length, false)
  if (!size) return false
  const end = Math.min(size.next + size.value, head.length)
  for (let at = size.next; at < end;) {
    const id = variable(head, at, true)
    const length = id && variable(head, id.next, false)
    if (!length) return false
    // A text may be filled up with zeros (RFC 8794, 7.4).
    if (id.value === DOC_TYPE_ID) {
      return /^webm\0*$/.test(text(head, length.next, length.value))
    }
    at = length.next + length.value
  }
  return false
}

/**
 * A number whose first byte tells its length by its leading zeros (RFC 8794, 4): ids keep that marker, sizes
 * drop it. Null where it is cut off or longer than eight bytes.
 */
function variable(
  head: Uint8Array,
  at: number,
  keepsMarker: boolean,
): { value: number; next: number } | null {
  const first = head[at]
  if (first === undefined || first === 0) return null
  const length = Math.clz32(first) - 23
  if (at + length > head.length) return null
  const marker = 0x80 >> (length - 1)
  const bytes = [keepsMarker ? first : first & ~marker, ...head.subarray(at + 1, at + length)]
  return { value: numberOf(bytes), next: at + length }
}

function numberOf(bytes: Iterable<number>): number {
  let value = 0
  for (const byte of bytes) value = value * 256 + byte
  return value
}
