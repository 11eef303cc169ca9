import 'server-only'
/**
 * Object storage by S3's protocol, for whole files that no row should hold: S3_ENDPOINT, S3_BUCKET, S3_REGION,
 * S3_ACCESS_KEY_ID and S3_SECRET_ACCESS_KEY name it. Without them nothing can be kept, and it says so.
 */
import { Readable } from 'node:stream'
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  NoSuchKey,
  NotFound,
  S3Client,
  S3ServiceException,
} from '@aws-sdk/client-s3'
import { Upload } from '@aws-sdk/lib-storage'
import { AppError } from '@/server/contract/errors'

/** Bytes from the first to the last of them, both counted from 0 and both included. */
export interface ByteRange {
  first: number
  last: number
}

const NOT_SET =
  'Clips and pictures cannot be kept here yet: whoever runs Floorside has to name an object store (S3_ENDPOINT and its companions).'
const NOT_REACHED =
  'The store of clips and pictures cannot be reached just now. Nothing was changed: try again in a moment.'
const NOT_THERE = 'This clip or picture is not there any more. Load the page anew.'

interface Store {
  client: S3Client
  bucket: string
  settings: string
}
// Development reloads modules; the connections outlive them.
const kept = globalThis as typeof globalThis & { floorsideStore?: Store }

function store(): Store {
  const { S3_ENDPOINT, S3_BUCKET, S3_REGION, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY } = process.env
  if (!S3_ENDPOINT || !S3_BUCKET || !S3_REGION || !S3_ACCESS_KEY_ID || !S3_SECRET_ACCESS_KEY) {
    throw new AppError('unavailable', NOT_SET)
  }
  const settings = [S3_ENDPOINT, S3_BUCKET, S3_REGION, S3_ACCESS_KEY_ID].join(' ')
  if (kept.floorsideStore?.settings === settings) return kept.floorsideStore
  kept.floorsideStore?.client.destroy()
  // The lock file holds the SDK: which Node its later versions need is no news for whoever serves a gym.
  process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED ??= 'true'
  const client = new S3Client({
    endpoint: S3_ENDPOINT,
    region: S3_REGION,
    credentials: { accessKeyId: S3_ACCESS_KEY_ID, secretAccessKey: S3_SECRET_ACCESS_KEY },
    forcePathStyle: true,
    maxAttempts: 2,
    // Checksums are sent in a framing of the body that not every store of this protocol reads.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    // A store that fell silent must not leave people waiting.
    requestHandler: { connectionTimeout: 3_000, socketTimeout: 15_000 },
  })
  kept.floorsideStore = { client, bucket: S3_BUCKET, settings }
  return kept.floorsideStore
}

/** What the store answered, as words for the person; our own errors, and those of a body, pass unchanged. */
function told(error: unknown): unknown {
  if (error instanceof NoSuchKey || error instanceof NotFound) {
    return new AppError('not-found', NOT_THERE)
  }
  if (error instanceof S3ServiceException) {
    const status = error.$metadata.httpStatusCode
    if (status === 404) return new AppError('not-found', NOT_THERE)
    // A refusal (a wrong key, no such bucket) is for the log; the rest passes by itself.
    return status !== undefined && status < 500 && status !== 429
      ? error
      : new AppError('unavailable', NOT_REACHED)
  }
  return isConnectionError(error) ? new AppError('unavailable', NOT_REACHED) : error
}

const CONNECTION_CODES = /^(?:ECONN|EPIPE|ENOTFOUND|EAI_|ETIMEDOUT|EHOSTUNREACH|ENETUNREACH)/
function isConnectionError(error: unknown): boolean {
  if (!(error instanceof Error)) return false
  return (
    error.name === 'TimeoutError' || ('code' in error && CONNECTION_CODES.test(`${error.code}`))
  )
}

async function asking<T>(work: (one: Store) => Promise<T>): Promise<T> {
  try {
    return await work(store())
  } catch (error) {
    throw told(error)
  }
}

/**
 * Stores `chunks`, which must come to `bytes` in all and may throw: then nothing is stored, and that error is
 * thrown. Throws `unavailable` without a store or where it does not answer.
 */
export function putObject(
  key: string,
  chunks: AsyncIterable<Uint8Array>,
  { bytes, contentType }: { bytes: number; contentType: string },
): Promise<void> {
  return asking(async ({ client, bucket }) => {
    const upload = new Upload({
      client,
      params: {
        Bucket: bucket,
        Key: key,
        Body: Readable.from(chunks, { objectMode: false }),
        ContentLength: bytes,
        ContentType: contentType,
      },
      // Each holds a part of 5 MB in memory.
      queueSize: 2,
    })
    await upload.done()
  })
}

/** An object, or a range of it, as a stream; whoever does not read it to its end cancels it. Throws `not-found`. */
export function getObject(key: string, range?: ByteRange): Promise<ReadableStream<Uint8Array>> {
  return asking(async ({ client, bucket }) => {
    const { Body } = await client.send(
      new GetObjectCommand({
        Bucket: bucket,
        Key: key,
        ...(range ? { Range: `bytes=${range.first}-${range.last}` } : {}),
      }),
    )
    if (!(Body instanceof Readable)) throw new Error('The store answered without a body.')
    return webStream(Body)
  })
}

/** Node's own conversion closes a stream that was cancelled meanwhile, and that error reaches nobody. */
function webStream(body: Readable): ReadableStream<Uint8Array> {
  const chunks: AsyncIterator<Uint8Array> = body[Symbol.asyncIterator]()
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        const next = await chunks.next()
        if (next.done) controller.close()
        else controller.enqueue(next.value)
      },
      cancel() {
        body.destroy()
      },
    },
    { highWaterMark: 0 },
  )
}

/** Removes an object; one that is not there is removed already. */
export function deleteObject(key: string): Promise<void> {
  return asking(async ({ client, bucket }) => {
    await client.send(new DeleteObjectCommand({ Bucket: bucket, Key: key }))
  })
}

/** What is stored under a key; null where nothing is. */
export async function headObject(
  key: string,
): Promise<{ bytes: number; contentType: string } | null> {
  try {
    return await asking(async ({ client, bucket }) => {
      const found = await client.send(new HeadObjectCommand({ Bucket: bucket, Key: key }))
      return { bytes: found.ContentLength ?? 0, contentType: found.ContentType ?? '' }
    })
  } catch (error) {
    if (error instanceof AppError && error.code === 'not-found') return null
    throw error
  }
}
