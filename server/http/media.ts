import 'server-only'
/** Clips and pictures on their way in and out: checked by their bytes, counted, and sent by range. */
import { randomUUID } from 'node:crypto'
import { AppError } from '@/server/contract/errors'
import {
  HEAD_BYTES,
  mediaTypeOf,
  MOST_BYTES,
  tooLargeText,
  WRONG_TYPE,
  type MediaType,
} from '@/server/contract/media-types'
import type { MediaObject } from '@/server/data/media'
import {
  deleteObject,
  getObject,
  headObject,
  putObject,
  type ByteRange,
} from '@/server/storage/objects'
import { logError } from './log'

const CUT_SHORT =
  'The file arrived cut short, so nothing was stored. Check your connection and send it again.'
/** A sender that is silent for so long has gone, though nobody said so. */
const SILENCE_MS = 30_000

type Reader = ReadableStreamDefaultReader<Uint8Array>

/** What one upload may be. `still`: the JPEG of a clip. */
type Wanted = 'any' | 'still'

/**
 * Stores a request's body under `key`, once its first bytes say that it may be: whole, or not at all. Throws
 * `bad-input` for any other file and for one cut short, `too-large` over the limit of its kind.
 */
export async function storeBody(
  request: Request,
  key: string,
  wanted: Wanted,
): Promise<{ type: MediaType; bytes: number }> {
  const bytes = lengthOf(request)
  // What cannot fit is told before any of it is read.
  const most = wanted === 'still' ? 'poster' : 'clip'
  if (bytes > MOST_BYTES[most]) throw new AppError('too-large', tooLargeText(most, bytes))
  const reader = request.body?.getReader()
  if (!reader) throw new AppError('bad-input', CUT_SHORT)
  try {
    const { head, rest } = await headOf(readWhole(reader, request.signal, bytes))
    const type = mediaTypeOf(head)
    if (!type) throw new AppError('bad-input', WRONG_TYPE)
    if (wanted === 'still' && type.contentType !== 'image/jpeg') {
      throw new AppError('bad-input', 'The still of a clip is a JPEG.')
    }
    if (wanted === 'any' && bytes > MOST_BYTES[type.kind]) {
      throw new AppError('too-large', tooLargeText(type.kind, bytes))
    }
    await putObject(key, rest(), { bytes, contentType: type.contentType })
    const stored = await headObject(key)
    if (stored?.bytes !== bytes) {
      await discard([key])
      throw new AppError('bad-input', CUT_SHORT)
    }
    return { type, bytes }
  } catch (error) {
    // A browser that is still sending does not read an answer: it is let finish first.
    await drain(reader, request.signal)
    throw error
  }
}

/** The length that was promised; what arrives is held against it. */
function lengthOf(request: Request): number {
  const header = request.headers.get('content-length') ?? ''
  if (!/^\d{1,15}$/.test(header)) {
    throw new AppError('bad-input', 'Say how long the file is (content-length).')
  }
  const bytes = Number(header)
  if (bytes === 0) throw new AppError('bad-input', 'The file is empty. Choose another one.')
  return bytes
}

/** The body's chunks; throws where it ends before its length, goes past it, breaks off or falls silent. */
async function* readWhole(
  reader: Reader,
  signal: AbortSignal,
  bytes: number,
): AsyncGenerator<Uint8Array, void> {
  let read = 0
  for (;;) {
    const next = await nextOf(reader, signal)
    if (next.done) break
    read += next.value.byteLength
    if (read > bytes) break
    yield next.value
  }
  if (read !== bytes) throw new AppError('bad-input', CUT_SHORT)
}

function nextOf(
  reader: Reader,
  signal: AbortSignal,
): Promise<ReadableStreamReadResult<Uint8Array>> {
  return new Promise((resolve, reject) => {
    const cut = () => reject(new AppError('bad-input', CUT_SHORT))
    const timer = setTimeout(cut, SILENCE_MS)
    signal.addEventListener('abort', cut)
    reader
      .read()
      .then(resolve, cut)
      .finally(() => {
        clearTimeout(timer)
        signal.removeEventListener('abort', cut)
      })
    if (signal.aborted) cut()
  })
}

/** As many first bytes as a signature needs, and the whole from them on. */
async function headOf(
  chunks: AsyncGenerator<Uint8Array, void>,
): Promise<{ head: Uint8Array; rest: () => AsyncGenerator<Uint8Array, void> }> {
  const first: Uint8Array[] = []
  let length = 0
  while (length < HEAD_BYTES) {
    const next = await chunks.next()
    if (next.done) break
    first.push(next.value)
    length += next.value.byteLength
  }
  return {
    head: Buffer.concat(first).subarray(0, HEAD_BYTES),
    async *rest() {
      yield* first
      yield* chunks
    },
  }
}

/** HTTP itself ends a body at the length that was promised, which is none too long. */
async function drain(reader: Reader, signal: AbortSignal): Promise<void> {
  try {
    while (!(await nextOf(reader, signal)).done);
  } catch {
    // It broke off: there is nobody to answer.
  }
}

/** Removes objects that no row names. One that stays costs room and harms nobody, so it is only logged. */
export async function discard(keys: readonly string[]): Promise<void> {
  for (const key of keys) {
    try {
      await deleteObject(key)
    } catch (error) {
      logError(randomUUID(), 'storage: an object that nothing names stayed', error)
    }
  }
}

/**
 * Writes the row for an object just stored, and removes what it took the place of. Where the row is refused the
 * object goes; where the database fell silent the row may have been written, and an object too many is better
 * than a clip that is not there.
 */
export async function named<T extends { unused: string[] }>(
  key: string,
  write: () => Promise<T>,
): Promise<T> {
  let result: T
  try {
    result = await write()
  } catch (error) {
    if (!(error instanceof AppError && error.code === 'unavailable')) await discard([key])
    throw error
  }
  await discard(result.unused)
  return result
}

// ---------------------------------------------------------------------------------------------
// Out

/**
 * An object as an answer: whole, one range of it (RFC 9110, 14), or 'not modified'. With its version in the
 * address it never changes there, and the browser of whoever is signed in may keep it.
 */
export async function sendObject(
  request: Request,
  { key, contentType, bytes, version }: MediaObject,
): Promise<Response> {
  const etag = `"${version}"`
  const isVersioned = new URL(request.url).searchParams.has('v')
  const headers = new Headers({
    etag,
    'cache-control': isVersioned ? 'private, max-age=31536000, immutable' : 'private, no-cache',
    // Whoever signs in after somebody else on one browser asks anew.
    vary: 'cookie',
    'accept-ranges': 'bytes',
  })
  if (holds(request.headers.get('if-none-match'), etag)) {
    return new Response(null, { status: 304, headers })
  }
  const size = bytes ?? (await headObject(key))?.bytes
  if (size === undefined) throw new AppError('not-found', 'This still is not there any more.')
  headers.set('content-type', contentType)
  headers.set('content-disposition', 'inline')
  const condition = request.headers.get('if-range')
  const asked = condition === null || condition === etag ? request.headers.get('range') : null
  const range = rangeOf(asked, size)
  if (range === 'outside') {
    headers.set('content-range', `bytes */${size}`)
    headers.set('cache-control', 'no-store')
    return new Response(null, { status: 416, headers })
  }
  headers.set('content-length', String(range ? range.last - range.first + 1 : size))
  if (range) headers.set('content-range', `bytes ${range.first}-${range.last}/${size}`)
  const body = request.method === 'HEAD' ? null : await getObject(key, range ?? undefined)
  return new Response(body, { status: range ? 206 : 200, headers })
}

function holds(header: string | null, etag: string): boolean {
  const tags = header?.split(',').map((tag) => tag.trim().replace(/^W\//, '')) ?? []
  return tags.includes(etag) || tags.includes('*')
}

/** One range of bytes; null for none, several or what cannot be read: then the whole is sent, as one may. */
function rangeOf(header: string | null, size: number): ByteRange | 'outside' | null {
  const [, from, to] = /^bytes=(\d{0,15})-(\d{0,15})$/.exec(header?.trim() ?? '') ?? []
  if (from === undefined || to === undefined || (from === '' && to === '')) return null
  if (from === '') {
    const length = Math.min(Number(to), size)
    return length === 0 ? 'outside' : { first: size - length, last: size - 1 }
  }
  const first = Number(from)
  if (to !== '' && Number(to) < first) return null
  if (first >= size) return 'outside'
  return { first, last: to === '' ? size - 1 : Math.min(Number(to), size - 1) }
}
