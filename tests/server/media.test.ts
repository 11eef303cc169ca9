import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { auditEntries } from '@/db/schema/audit-entries'
import { memberships } from '@/db/schema/memberships'
import { movementMedia } from '@/db/schema/movement-media'
import { movements } from '@/db/schema/movements'
import type { ErrorBody } from '@/server/contract/errors'
import type { OptionMedia } from '@/server/contract/media'
import { MOST_BYTES } from '@/server/contract/media-types'
import type { Viewer } from '@/server/contract/viewer'
import { mediaOf } from '@/server/data/media'
import { startFakeS3, type FakeS3 } from '@/scripts/lib/fake-s3.mjs'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, type TestGym } from '../support/gym'

let test: TestDatabase
let token = ''

vi.mock('@/db/client', async (original) => ({
  ...(await original<object>()),
  database: () => test.db,
  databaseSql: () => test.sql,
}))
vi.mock('next/headers', () => ({
  cookies: async () => ({
    get: () => (token === '' ? undefined : { name: 'floorside', value: token }),
    set: () => undefined,
  }),
  headers: async () => new Headers({ 'sec-fetch-site': 'same-origin' }),
}))

const folder = mkdtempSync(join(tmpdir(), 'floorside-objects-'))
let store: FakeS3
let gym: TestGym
let second: TestGym
let coach: Viewer
let member: Viewer
let elsewhere: Viewer
let movement: string
let option: string

async function signIn(viewer: Viewer | null, gymId: string | null = null): Promise<void> {
  const { startSession } = await import('@/server/auth/lucia')
  token = viewer ? await startSession(viewer.personId, { gymId, userAgent: '' }) : ''
}

beforeAll(async () => {
  store = await startFakeS3({ folder })
  for (const [name, value] of Object.entries(store.env)) vi.stubEnv(name, value)
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
  second = await makeGym(test.db, 'Second gym')
  const content = gym.version.movements.find((one) => one.options.length > 1)
  if (!content) throw new Error('no movement with options')
  movement = content.slug
  option = content.options[0]?.option ?? ''
  for (const { gymId } of [gym, second]) {
    await test.db
      .insert(movements)
      .values({ id: v7(), gymId, slug: content.slug, content, builtIn: true })
  }
  coach = await gym.person('Coach', ['coach'])
  member = await gym.person('Member', ['member'])
  elsewhere = await second.person('Coach elsewhere', ['coach'])
})
beforeEach(() => signIn(coach))
afterEach(async () => {
  vi.restoreAllMocks()
  await test.db.delete(movementMedia)
  await test.db.delete(auditEntries)
  for (const name of objects()) rmSync(join(folder, 'floorside', name))
})
afterAll(async () => {
  vi.unstubAllEnvs()
  await store.close()
  rmSync(folder, { recursive: true, force: true })
  await test.end()
})

/** Names of everything that is stored, and of what is on its way. */
function objects(): string[] {
  try {
    return readdirSync(join(folder, 'floorside'))
  } catch {
    return []
  }
}
const halves = (): string[] => readdirSync(join(folder, '.parts'))
/** The files of all objects, without their facts. */
const stored = () => objects().filter((name) => !name.endsWith('.json'))
const bytesOf = (name: string) => readFileSync(join(folder, 'floorside', name))

/** `length` bytes that begin as `head` and are all different enough to tell a range from another. */
function file(head: number[] | string, length: number): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(length)
  for (let at = 0; at < length; at += 1) bytes[at] = (at * 31 + (at >> 8)) & 0xff
  bytes.set(typeof head === 'string' ? Buffer.from(head, 'latin1') : head)
  return bytes
}
const JPEG = [0xff, 0xd8, 0xff, 0xe0]
const PNG = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]
const WEBP = 'RIFF\x24\x00\x00\x00WEBPVP8 '
const MP4 = '\x00\x00\x00\x18ftypmp42\x00\x00\x00\x00isommp42'
const WEBM = '\x1a\x45\xdf\xa3\x9f\x42\x86\x81\x01\x42\x82\x84webm'

interface Sent {
  option?: string
  type?: string
  length?: number | null
  headers?: Record<string, string>
  signal?: AbortSignal
  query?: string
  part?: 'media' | 'poster'
}
type Answer = { status: number; body: OptionMedia & ErrorBody }

const routeOf = (part: 'media' | 'poster') =>
  part === 'media'
    ? import('@/app/api/v1/movements/[slug]/options/[option]/media/route')
    : import('@/app/api/v1/movements/[slug]/options/[option]/media/poster/route')
const context = (to: string) => ({ params: Promise.resolve({ slug: movement, option: to }) })
const address = (query: string) => `http://gym.example/api/v1/media${query}`

async function put(
  body: Uint8Array<ArrayBuffer> | ReadableStream<Uint8Array>,
  { type = 'application/octet-stream', length, headers = {}, ...more }: Sent = {},
): Promise<Answer> {
  const promised = length === undefined && body instanceof Uint8Array ? body.byteLength : length
  const { PUT } = await routeOf(more.part ?? 'media')
  const answer = await PUT(
    new Request(address(more.query ?? ''), {
      method: 'PUT',
      headers: {
        'sec-fetch-site': 'same-origin',
        'content-type': type,
        ...(promised == null ? {} : { 'content-length': String(promised) }),
        ...headers,
      },
      body,
      duplex: 'half',
      ...(more.signal ? { signal: more.signal } : {}),
    } as RequestInit),
    context(more.option ?? option),
  )
  return { status: answer.status, body: (await answer.json()) as OptionMedia & ErrorBody }
}

async function get(
  { url }: { url: string },
  headers: Record<string, string> = {},
  part: 'media' | 'poster' = 'media',
): Promise<{ status: number; headers: Headers; bytes: Buffer }> {
  const { GET } = await routeOf(part)
  const request = new Request(new URL(url, 'http://gym.example'), { headers })
  const answer = await GET(request, context(option))
  return {
    status: answer.status,
    headers: answer.headers,
    bytes: Buffer.from(await answer.arrayBuffer()),
  }
}

async function remove(): Promise<number> {
  const { DELETE } = await import('@/app/api/v1/movements/[slug]/options/[option]/media/route')
  const headers = { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' }
  const request = new Request(address(''), { method: 'DELETE', headers })
  return (await DELETE(request, context(option))).status
}

const rows = () => test.db.select().from(movementMedia)
const actions = async () =>
  (await test.db.select().from(auditEntries).orderBy(auditEntries.id)).map((one) => one.action)

describe('a file that a coach sends', () => {
  it.each([
    ['JPEG', JPEG, 'picture', 'image/jpeg'],
    ['PNG', PNG, 'picture', 'image/png'],
    ['WebP', WEBP, 'picture', 'image/webp'],
    ['MP4', MP4, 'clip', 'video/mp4'],
    ['WebM', WEBM, 'clip', 'video/webm'],
  ] as const)(
    'is kept as %s where its bytes say so, whatever its header says',
    async (_name, head, kind, contentType) => {
      const sent = file(typeof head === 'string' ? head : [...head], 5_000)
      const { status, body } = await put(sent, { type: 'text/html' })
      expect(status).toBe(200)
      expect(body).toMatchObject({ kind, contentType, bytes: 5_000, posterUrl: null })
      expect(stored()).toHaveLength(1)
      expect(Buffer.compare(bytesOf(stored()[0] ?? ''), sent)).toBe(0)
      const got = await get(body)
      expect(got.headers.get('content-type')).toBe(contentType)
      expect(Buffer.compare(got.bytes, sent)).toBe(0)
      expect(await mediaOf(member, { movements: [movement] }, test.db)).toEqual({
        [`${movement}/${option}`]: body,
      })
      const [audit] = await test.db.select().from(auditEntries)
      expect(audit).toMatchObject({
        action: 'media.added',
        personId: coach.personId,
        subject: `${movement}/${option}`,
        detail: { mediaId: body.mediaId, kind, bytes: 5_000 },
      })
    },
  )

  it('is refused in words where its bytes are of no such kind, though its header lies', async () => {
    const { status, body } = await put(file('<!doctype html><script>', 900), { type: 'image/jpeg' })
    expect(status).toBe(400)
    expect(body.error.message).toMatch(/MP4 or WebM, or a picture as JPEG, PNG or WebP/)
    expect([objects(), halves(), await rows()]).toEqual([[], [], []])
  })

  it('is stored in parts where it is longer than one, and comes back byte for byte', async () => {
    const sent = file(MP4, 12_000_001)
    // In pieces as a network hands them on, none of which ends where a part does.
    let at = 0
    const pieces = new ReadableStream<Uint8Array>({
      pull(controller) {
        if (at >= sent.length) return controller.close()
        controller.enqueue(sent.subarray(at, at + 65_521))
        at += 65_521
      },
    })
    const { status, body } = await put(pieces, { length: sent.length })
    expect(status).toBe(200)
    expect(Buffer.compare((await get(body)).bytes, sent)).toBe(0)
    expect(halves()).toEqual([])
  })

  it.each([
    ['a clip', MP4, MOST_BYTES.clip + 1, /clip may have 60 MB at most, and this has 60\.1 MB/],
    ['a picture', JPEG, MOST_BYTES.picture + 1, /picture may have 8 MB at most/],
  ])(
    'is refused with 413 and words where it is %s over its limit',
    async (_n, head, length, said) => {
      const { status, body } = await put(file(head, length))
      expect(status).toBe(413)
      expect(body.error.message).toMatch(said)
      expect([objects(), halves(), await rows()]).toEqual([[], [], []])
    },
  )

  it('may be as long as its limit', async () => {
    expect((await put(file(PNG, MOST_BYTES.picture))).status).toBe(200)
  })

  it.each([
    ['a short file', 4_000],
    ['a file of several parts', 11_000_000],
  ])('leaves nothing behind where %s ends before its length', async (_name, length) => {
    const { status, body } = await put(file(MP4, length), { length: length + 1 })
    expect(status).toBe(400)
    expect(body.error.message).toMatch(/arrived cut short, so nothing was stored/)
    expect([objects(), halves(), await rows(), await actions()]).toEqual([[], [], [], []])
  })

  it('leaves nothing behind where it goes past its length', async () => {
    expect((await put(file(MP4, 4_000), { length: 3_999 })).status).toBe(400)
    expect([objects(), halves(), await rows()]).toEqual([[], [], []])
  })

  it.each(['breaks', 'is given up'])(
    'leaves nothing behind where it %s on its way',
    async (how) => {
      const giving = new AbortController()
      let pieces = 0
      const body = new ReadableStream<Uint8Array>({
        async pull(controller) {
          pieces += 1
          if (pieces === 1) controller.enqueue(file(MP4, 6_000_000))
          else if (how === 'breaks') controller.error(new Error('aborted'))
          else {
            giving.abort()
            // As a connection that was closed: nothing comes any more, and no end.
            await new Promise(() => undefined)
          }
        },
      })
      const { status } = await put(body, { length: 20_000_000, signal: giving.signal })
      expect(status).toBe(400)
      expect([objects(), halves(), await rows()]).toEqual([[], [], []])
    },
  )

  it('must say its length, and have one', async () => {
    expect((await put(file(PNG, 100), { length: null })).status).toBe(400)
    expect((await put(new Uint8Array(0))).status).toBe(400)
    expect(objects()).toEqual([])
  })

  it('is refused from another site, and where it does not say from where', async () => {
    const foreign = { headers: { 'sec-fetch-site': 'cross-site' } }
    expect((await put(file(PNG, 100), foreign)).status).toBe(403)
    expect(objects()).toEqual([])
  })

  it('takes the place of what was there, whose object goes once the row is changed', async () => {
    const first = await put(file(JPEG, 2_000))
    const next = await put(file(WEBM, 3_000))
    expect(next.body.mediaId).not.toBe(first.body.mediaId)
    expect(stored()).toHaveLength(1)
    expect((await rows()).map((row) => row.id)).toEqual([next.body.mediaId])
    expect((await get(next.body)).bytes).toHaveLength(3_000)
    // Nobody goes on with the bytes of another file in the middle of one.
    expect((await get(first.body, { range: 'bytes=1000-' })).status).toBe(404)
    expect(await actions()).toEqual(['media.added', 'media.replaced'])
  })

  it('keeps what was there where the new one is refused', async () => {
    const { body } = await put(file(JPEG, 2_000))
    await put(file('nothing', 2_000))
    await put(file(MP4, 2_000), { length: 5_000 })
    expect((await get(body)).bytes).toHaveLength(2_000)
    expect(stored()).toHaveLength(1)
  })

  it('leaves one row and one object where two coaches send at once', async () => {
    const answers = await Promise.all([1, 2, 3, 4].map((n) => put(file(PNG, 1_000 + n))))
    expect(answers.map((one) => one.status)).toEqual([200, 200, 200, 200])
    const [row, ...more] = await rows()
    expect(more).toEqual([])
    expect(stored()).toEqual([encodeURIComponent(row?.storageKey ?? '')])
  })

  it('is told that there is no store where none is named, and none that answers where it is gone', async () => {
    vi.stubEnv('S3_ENDPOINT', '')
    const unnamed = await put(file(PNG, 500))
    expect([unnamed.status, unnamed.body.error.message]).toEqual([
      503,
      expect.stringMatching(/cannot be kept here yet/),
    ])
    vi.stubEnv('S3_ENDPOINT', 'http://127.0.0.1:9')
    const gone = await put(file(PNG, 500))
    expect([gone.status, gone.body.error.message]).toEqual([
      503,
      expect.stringMatching(/cannot be reached just now/),
    ])
    vi.stubEnv('S3_ENDPOINT', store.env.S3_ENDPOINT)
    expect(await rows()).toEqual([])
  })
})

describe('who may', () => {
  it('put or remove is a coach of the gym: not a member, nor another gym’s coach without the movement', async () => {
    const { body } = await put(file(JPEG, 2_000))
    await signIn(member)
    expect((await put(file(PNG, 300))).status).toBe(404)
    expect(await remove()).toBe(404)
    await signIn(null)
    expect((await put(file(PNG, 300))).status).toBe(401)
    await signIn(coach)
    expect((await put(file(PNG, 300), { option: 'no-such-option' })).status).toBe(404)
    expect((await get(body)).bytes).toHaveLength(2_000)
    expect(stored()).toHaveLength(1)
  })

  it('look is everybody of the gym who is signed in, and nobody of another', async () => {
    const { body } = await put(file(JPEG, 2_000))
    await signIn(member)
    expect((await get(body)).status).toBe(200)
    await signIn(elsewhere)
    expect((await get(body)).status).toBe(404)
    expect((await get({ url: address('') })).status).toBe(404)
    expect(await mediaOf(elsewhere, { movements: [movement] }, test.db)).toEqual({})
    await signIn(null)
    expect((await get(body)).status).toBe(401)
  })

  it('change the same option of two gyms do not meet', async () => {
    const ours = await put(file(JPEG, 2_000))
    await signIn(elsewhere)
    const theirs = await put(file(PNG, 700))
    expect(theirs.status).toBe(200)
    expect(await remove()).toBe(200)
    await signIn(coach)
    expect((await get(ours.body)).bytes).toHaveLength(2_000)
  })

  it('look goes on where somebody of both gyms has since switched to the other', async () => {
    const { body } = await put(file(JPEG, 2_000))
    await test.db.insert(memberships).values({
      id: v7(),
      gymId: second.gymId,
      personId: member.personId,
      roles: ['member'],
      group: null,
    })
    await signIn(member, second.gymId)
    expect((await get(body)).status).toBe(200)
    await test.db
      .update(memberships)
      .set({ deactivatedAt: NOW })
      .where(eq(memberships.id, member.membershipId))
    expect((await get(body)).status).toBe(404)
    await test.db
      .update(memberships)
      .set({ deactivatedAt: null })
      .where(eq(memberships.id, member.membershipId))
  })
})

describe('what is sent out', () => {
  // RFC 9110, 14.1.2, whose examples are of a file of 10,000 bytes.
  it.each([
    ['bytes=0-499', 0, 499],
    ['bytes=500-999', 500, 999],
    ['bytes=-500', 9_500, 9_999],
    ['bytes=9500-', 9_500, 9_999],
    ['bytes=0-0', 0, 0],
    ['bytes=9000-20000', 9_000, 9_999],
    ['bytes=-20000', 0, 9_999],
  ])('is the range %s alone, with 206', async (range, first, last) => {
    const sent = file(MP4, 10_000)
    const { body } = await put(sent)
    const got = await get(body, { range })
    expect(got.status).toBe(206)
    expect(got.headers.get('content-range')).toBe(`bytes ${first}-${last}/10000`)
    expect(got.headers.get('content-length')).toBe(String(last - first + 1))
    expect(Buffer.compare(got.bytes, sent.subarray(first, last + 1))).toBe(0)
  })

  it.each(['bytes=0-0,-1', 'bytes=500-100', 'lines=1-2', 'bytes=-', 'bytes=x-'])(
    'is the whole where %s is asked for, which is no single range',
    async (range) => {
      const { body } = await put(file(MP4, 10_000))
      const got = await get(body, { range })
      expect([got.status, got.bytes.length]).toEqual([200, 10_000])
    },
  )

  it.each(['bytes=10000-', 'bytes=-0'])('is nothing, with 416, outside: %s', async (range) => {
    const { body } = await put(file(MP4, 10_000))
    const got = await get(body, { range })
    expect([got.status, got.headers.get('content-range')]).toEqual([416, 'bytes */10000'])
  })

  it('may be kept for good under its version’s address, and is asked about without one', async () => {
    const { body } = await put(file(PNG, 2_000))
    const kept = await get(body)
    expect(kept.headers.get('cache-control')).toBe('private, max-age=31536000, immutable')
    expect(kept.headers.get('etag')).toBe(`"${body.mediaId}"`)
    const present = await get({ url: address('') })
    expect([present.status, present.headers.get('cache-control')]).toEqual([
      200,
      'private, no-cache',
    ])
    const again = await get({ url: address('') }, { 'if-none-match': `"${body.mediaId}"` })
    expect([again.status, again.bytes.length]).toEqual([304, 0])
    const other = await get(body, { 'if-range': '"another"', range: 'bytes=0-9' })
    expect([other.status, other.bytes.length]).toEqual([200, 2_000])
  })

  it('may be left in the middle', async () => {
    const { body } = await put(file(MP4, 9_000_000))
    const { GET } = await routeOf('media')
    const answer = await GET(new Request(new URL(body.url, 'http://gym.example')), context(option))
    const reader = answer.body?.getReader()
    await reader?.read()
    await reader?.cancel()
    expect((await get(body)).bytes).toHaveLength(9_000_000)
  })
})

describe('the still of a clip', () => {
  const setStill = (of: OptionMedia, still: Uint8Array<ArrayBuffer>) =>
    put(still, { part: 'poster', query: `?v=${of.mediaId}`, type: 'image/jpeg' })

  it('is a JPEG beside it, and goes with it', async () => {
    const clip = await put(file(MP4, 4_000))
    const first = await setStill(clip.body, file(JPEG, 900))
    expect(first.status).toBe(200)
    expect(first.body).toEqual({ ...clip.body, posterUrl: expect.stringContaining('/poster?v=') })
    await signIn(member)
    const got = await get({ url: first.body.posterUrl ?? '' }, {}, 'poster')
    expect([got.status, got.bytes.length]).toEqual([200, 900])
    expect(got.headers.get('content-type')).toBe('image/jpeg')
    expect(got.headers.get('cache-control')).toMatch(/immutable/)
    await signIn(coach)
    const second = await setStill(clip.body, file(JPEG, 800))
    expect(second.body.posterUrl).not.toBe(first.body.posterUrl)
    expect(stored()).toHaveLength(2)
    expect(await remove()).toBe(200)
    expect(stored()).toEqual([])
    expect(await actions()).toEqual([
      'media.added',
      'media.still-set',
      'media.still-set',
      'media.removed',
    ])
  })

  it('is refused where it is no JPEG, too large, of a picture, or of a clip that is gone', async () => {
    const clip = await put(file(MP4, 4_000))
    expect((await setStill(clip.body, file(PNG, 900))).status).toBe(400)
    expect((await setStill(clip.body, file(JPEG, MOST_BYTES.poster + 1))).status).toBe(413)
    await signIn(member)
    expect((await setStill(clip.body, file(JPEG, 900))).status).toBe(404)
    await signIn(coach)
    const picture = await put(file(PNG, 600))
    expect((await setStill(clip.body, file(JPEG, 900))).status).toBe(409)
    expect((await setStill(picture.body, file(JPEG, 900))).status).toBe(400)
    expect(stored()).toHaveLength(1)
    expect((await rows())[0]?.posterKey).toBeNull()
  })
})

describe('removing', () => {
  it('takes row and objects, leaves an audit row, and changes nothing a second time', async () => {
    const { body } = await put(file(JPEG, 2_000))
    expect(await remove()).toBe(200)
    expect([objects(), await rows()]).toEqual([[], []])
    expect((await get(body)).status).toBe(404)
    expect(await remove()).toBe(200)
    expect(await actions()).toEqual(['media.added', 'media.removed'])
  })
})
