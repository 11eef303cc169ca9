/**
 * An object store of this computer's own that speaks as much of S3's protocol as the product needs: objects put
 * whole or in parts, read whole or by range, asked for and removed. Path style, on loopback, for whoever runs
 * the product: signatures are not looked at.
 */
import { createHash, randomUUID } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { mkdir, readdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises'
import { createServer } from 'node:http'
import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'

const DAY_MS = 86_400_000

class Refusal extends Error {
  constructor(status, code, headers = {}) {
    super(code)
    this.status = status
    this.code = code
    this.headers = headers
  }
}

/**
 * Starts it on `folder`, at a free port or `port`. `env`: what the product is told to use it by. `close` ends it
 * and every answer that is under way.
 */
export async function startFakeS3({ folder, port = 0 }) {
  const parts = `${folder}/.parts`
  await mkdir(parts, { recursive: true })
  // Left behind by uploads that nobody finished; another command's may be under way.
  for (const name of await readdir(parts)) {
    const { mtimeMs } = await stat(`${parts}/${name}`)
    if (Date.now() - mtimeMs > DAY_MS)
      await rm(`${parts}/${name}`, { recursive: true, force: true })
  }
  const server = createServer((request, response) => {
    answer(folder, request, response).catch((error) => {
      if (response.headersSent || response.destroyed) return response.destroy()
      const refused = error instanceof Refusal ? error : new Refusal(500, 'InternalError')
      if (!(error instanceof Refusal)) console.error(error)
      response.writeHead(refused.status, { 'content-type': 'application/xml', ...refused.headers })
      const body = `<Error><Code>${refused.code}</Code><Message>${refused.code}</Message></Error>`
      response.end(request.method === 'HEAD' ? undefined : xml(body))
    })
  })
  await new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, '127.0.0.1', resolve)
  })
  return {
    env: {
      S3_ENDPOINT: `http://127.0.0.1:${server.address().port}`,
      S3_BUCKET: 'floorside',
      S3_REGION: 'local',
      S3_ACCESS_KEY_ID: 'local',
      S3_SECRET_ACCESS_KEY: 'local',
    },
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve())
        server.closeAllConnections()
      }),
  }
}

const xml = (body) => `<?xml version="1.0" encoding="UTF-8"?>\n${body}`

/** The file of an object; a key is one file name, whatever it holds. */
function fileOf(folder, bucket, key) {
  const name = encodeURIComponent(key).replaceAll('.', '%2E')
  if (!/^[a-z0-9][a-z0-9.-]{2,62}$/.test(bucket)) throw new Refusal(400, 'InvalidBucketName')
  if (name.length > 240) throw new Refusal(400, 'KeyTooLongError')
  return { bucketFolder: `${folder}/${bucket}`, path: `${folder}/${bucket}/${name}` }
}

async function answer(folder, request, response) {
  const { hostname, pathname, searchParams } = new URL(
    request.url,
    `http://${request.headers.host}`,
  )
  // A page elsewhere on the web whose name was made to lead here is not answered.
  if (hostname !== '127.0.0.1') throw new Refusal(403, 'AccessDenied')
  const [, bucket = '', rest = ''] = /^\/([^/]+)\/(.+)$/.exec(pathname) ?? []
  if (rest === '') throw new Refusal(501, 'NotImplemented')
  const object = fileOf(folder, bucket, decodeURIComponent(rest))
  const uploadId = searchParams.get('uploadId')
  if (uploadId !== null && !/^[0-9a-f-]{36}$/.test(uploadId)) throw new Refusal(404, 'NoSuchUpload')
  const upload = uploadId === null ? null : `${folder}/.parts/${uploadId}`
  switch (request.method) {
    case 'PUT':
      return upload
        ? putPart(upload, Number(searchParams.get('partNumber')), request, response)
        : putObject(folder, object, request, response)
    case 'POST':
      if (searchParams.has('uploads')) return beginUpload(folder, bucket, rest, request, response)
      if (upload) return completeUpload(upload, object, request, response)
      throw new Refusal(501, 'NotImplemented')
    case 'GET':
    case 'HEAD':
      return getObject(object, request, response)
    case 'DELETE':
      await (upload
        ? rm(upload, { recursive: true, force: true })
        : Promise.all([
            rm(object.path, { force: true }),
            rm(`${object.path}.json`, { force: true }),
          ]))
      return response.writeHead(204).end()
    default:
      throw new Refusal(405, 'MethodNotAllowed')
  }
}

/** The request's body into a file; gives its MD5, which is S3's tag. Throws where it ends before its length. */
async function store(request, path) {
  // The client is told to send bodies plainly; one that is cut into signed pieces would be kept with their frames.
  const isFramed = /aws-chunked/.test(request.headers['content-encoding'] ?? '')
  if (isFramed) throw new Refusal(501, 'NotImplemented')
  const digest = createHash('md5')
  let bytes = 0
  try {
    await pipeline(
      request,
      async function* (chunks) {
        for await (const chunk of chunks) {
          digest.update(chunk)
          bytes += chunk.length
          yield chunk
        }
      },
      createWriteStream(path),
    )
    const promised = request.headers['content-length']
    if (promised !== undefined && Number(promised) !== bytes)
      throw new Refusal(400, 'IncompleteBody')
  } catch (error) {
    await rm(path, { force: true })
    throw error.code === 'ECONNRESET' ? new Refusal(400, 'IncompleteBody') : error
  }
  return digest.digest('hex')
}

/** Puts a whole file in the object's place; the facts come first, so that no object is ever without. */
async function place(object, half, facts) {
  await mkdir(object.bucketFolder, { recursive: true })
  await writeFile(`${half}.json`, JSON.stringify(facts))
  await rename(`${half}.json`, `${object.path}.json`)
  await rename(half, object.path)
}

async function putObject(folder, object, request, response) {
  const half = `${folder}/.parts/${randomUUID()}`
  const tag = await store(request, half)
  await place(object, half, { contentType: request.headers['content-type'] ?? '', tag })
  response.writeHead(200, { etag: `"${tag}"` }).end()
}

async function beginUpload(folder, bucket, key, request, response) {
  const id = randomUUID()
  await mkdir(`${folder}/.parts/${id}`)
  await writeFile(
    `${folder}/.parts/${id}/facts.json`,
    JSON.stringify({ contentType: request.headers['content-type'] ?? '' }),
  )
  response.writeHead(200, { 'content-type': 'application/xml' })
  response.end(
    xml(
      `<InitiateMultipartUploadResult><Bucket>${bucket}</Bucket><Key>${key}</Key><UploadId>${id}</UploadId></InitiateMultipartUploadResult>`,
    ),
  )
}

async function factsOf(upload) {
  try {
    return JSON.parse(await readFile(`${upload}/facts.json`, 'utf8'))
  } catch {
    throw new Refusal(404, 'NoSuchUpload')
  }
}

async function putPart(upload, number, request, response) {
  await factsOf(upload)
  if (!Number.isInteger(number) || number < 1 || number > 10_000) {
    throw new Refusal(400, 'InvalidArgument')
  }
  const tag = await store(request, `${upload}/${number}`)
  response.writeHead(200, { etag: `"${tag}"` }).end()
}

async function completeUpload(upload, object, request, response) {
  const { contentType } = await factsOf(upload)
  const asked = Buffer.concat(await request.toArray()).toString('utf8')
  const numbers = [...asked.matchAll(/<PartNumber>(\d+)<\/PartNumber>/g)].map(([, one]) => one)
  if (numbers.length === 0) throw new Refusal(400, 'MalformedXML')
  const digest = createHash('md5')
  const whole = `${upload}/whole`
  await pipeline(
    Readable.from(
      (async function* () {
        for (const number of numbers) {
          for await (const chunk of createReadStream(`${upload}/${number}`)) {
            digest.update(chunk)
            yield chunk
          }
        }
      })(),
    ),
    createWriteStream(whole),
  ).catch(async (error) => {
    throw error.code === 'ENOENT' ? new Refusal(400, 'InvalidPart') : error
  })
  const tag = `${digest.digest('hex')}-${numbers.length}`
  await place(object, whole, { contentType, tag })
  await rm(upload, { recursive: true, force: true })
  response.writeHead(200, { 'content-type': 'application/xml' })
  response.end(
    xml(`<CompleteMultipartUploadResult><ETag>"${tag}"</ETag></CompleteMultipartUploadResult>`),
  )
}

/** RFC 9110, 14.1.2: one range of bytes; null for what is none and is then not looked at. */
function rangeOf(header, bytes) {
  const [, from, to] = /^bytes=(\d*)-(\d*)$/.exec(header ?? '') ?? []
  if (from === undefined || (from === '' && to === '')) return null
  const first = from === '' ? Math.max(0, bytes - Number(to)) : Number(from)
  const last = from === '' || to === '' ? bytes - 1 : Math.min(Number(to), bytes - 1)
  if (first > last) {
    throw new Refusal(416, 'InvalidRange', { 'content-range': `bytes */${bytes}` })
  }
  return { first, last }
}

async function getObject(object, request, response) {
  let facts
  let size
  try {
    facts = JSON.parse(await readFile(`${object.path}.json`, 'utf8'))
    size = (await stat(object.path)).size
  } catch {
    throw new Refusal(404, 'NoSuchKey')
  }
  const range = rangeOf(request.headers.range, size)
  response.writeHead(range ? 206 : 200, {
    'content-type': facts.contentType,
    'content-length': range ? range.last - range.first + 1 : size,
    'accept-ranges': 'bytes',
    etag: `"${facts.tag}"`,
    ...(range ? { 'content-range': `bytes ${range.first}-${range.last}/${size}` } : {}),
  })
  if (request.method === 'HEAD' || size === 0) return response.end()
  const file = createReadStream(object.path, range ? { start: range.first, end: range.last } : {})
  // Whoever asked may have gone.
  await pipeline(file, response).catch(() => undefined)
}
