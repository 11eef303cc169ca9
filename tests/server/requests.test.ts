import { createServer, connect, type AddressInfo, type Socket } from 'node:net'
import { hash } from '@node-rs/argon2'
import { eq } from 'drizzle-orm'
import { v7 } from 'uuid'
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest'
import { openDatabase } from '@/db/client'
import { attemptEvents } from '@/db/schema/attempt-events'
import { attempts } from '@/db/schema/attempts'
import { memberships } from '@/db/schema/memberships'
import { signInSessions } from '@/db/schema/sign-in-sessions'
import type { ErrorBody } from '@/server/contract/errors'
import type { Viewer } from '@/server/contract/viewer'
import type { ClassEvent } from '@/server/engine/tally/events'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, stamped, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
let member: Viewer
/** What the process uses; a test may put another in its place. */
let pool: Pick<TestDatabase, 'db' | 'sql'>
let token = ''
let cookie: { value: string; options: Record<string, unknown> } | null = null

vi.mock('@/db/client', async (original) => ({
  ...(await original<object>()),
  database: () => pool.db,
  databaseSql: () => pool.sql,
}))
vi.mock('next/headers', () => ({
  cookies: async () => ({
    get: () => (token === '' ? undefined : { name: 'floorside', value: token }),
    set: (_name: string, value: string, options: Record<string, unknown>) => {
      cookie = { value, options }
    },
  }),
  headers: async () => new Headers({ 'sec-fetch-site': 'same-origin' }),
}))

const PASSWORD = 'quiet harbour lantern'
async function signedIn(viewer: Viewer, gymId: string | null = null) {
  const { startSession } = await import('@/server/auth/lucia')
  token = await startSession(viewer.personId, { gymId, userAgent: '' })
}

beforeAll(async () => {
  test = await makeTestDatabase()
  pool = test
  gym = await makeGym(test.db, 'Gym')
  member = await gym.person('Member', ['member'], {
    passwordHash: await hash(PASSWORD, { memoryCost: 256, timeCost: 1, parallelism: 1 }),
  })
})
afterEach(() => {
  pool = test
  vi.restoreAllMocks()
})
afterAll(() => test.end())

const start = (more: { versionId?: string; note?: string } = {}): ClassEvent[] =>
  stamped([
    {
      type: 'started',
      classMs: 0,
      version: more.versionId ?? gym.versionId,
      counting: 'press',
      options: [],
    },
    { type: 'rated', classMs: 9_000, rpe: 4, note: more.note ?? 'Felt good' },
  ])

async function send(
  attemptId: string,
  body: BodyInit,
): Promise<{ status: number; body: ErrorBody & { stored?: string[] } }> {
  const { POST } = await import('@/app/api/v1/attempts/[attemptId]/events/route')
  const answer = await POST(
    new Request(`http://gym.example/api/v1/attempts/${attemptId}/events`, {
      method: 'POST',
      headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' },
      body,
      duplex: 'half',
    } as RequestInit),
    { params: Promise.resolve({ attemptId }) },
  )
  return { status: answer.status, body: (await answer.json()) as ErrorBody & { stored?: string[] } }
}
const batch = (events: ClassEvent[], more: object = {}) =>
  JSON.stringify({
    scheduledClassId: gym.scheduledClassId,
    versionId: gym.versionId,
    todayNote: null,
    events,
    ...more,
  })

describe('the events route', () => {
  it('reads a body of unknown length no further than 1 MB', async () => {
    await signedIn(member)
    let sent = 0
    const endless = new ReadableStream<Uint8Array>({
      pull(controller) {
        sent += 1
        controller.enqueue(new Uint8Array(100_000).fill(32))
      },
    })
    expect((await send(v7(), endless)).status).toBe(413)
    expect(sent).toBeLessThan(20)
  })

  it.each([
    ['a NUL', 'before\u0000after', 'beforeafter'],
    ['half a character', 'before\ud83dafter', 'beforeafter'],
    ['whole ones outside the first plane', 'tired 😮‍💨', 'tired 😮‍💨'],
  ])('keeps a note with %s, without what cannot be stored', async (_name, note, kept) => {
    await signedIn(member)
    const attemptId = v7()
    expect((await send(attemptId, batch(start({ note }), { todayNote: note }))).status).toBe(200)
    const rows = await test.db
      .select()
      .from(attemptEvents)
      .where(eq(attemptEvents.attemptId, attemptId))
    expect(rows.map((row) => row.content).find((event) => event.type === 'rated')).toMatchObject({
      note: kept,
    })
    const [attempt] = await test.db.select().from(attempts).where(eq(attempts.id, attemptId))
    expect(attempt?.todayNote).toBe(kept)
  })

  it('answers an id that cannot be stored as one that is not there', async () => {
    await signedIn(member)
    const { GET } = await import('@/app/api/v1/attempts/[attemptId]/route')
    const answer = await GET(new Request('http://gym.example/x'), {
      params: Promise.resolve({ attemptId: 'a\u0000b' }),
    })
    expect(answer.status).toBe(404)
  })

  it('records in the gym that the class belongs to, though the person has switched to another', async () => {
    const second = await makeGym(test.db, 'Second gym')
    await test.db.insert(memberships).values({
      id: v7(),
      gymId: second.gymId,
      personId: member.personId,
      roles: ['member'],
    })
    await signedIn(member, second.gymId)
    const attemptId = v7()
    expect((await send(attemptId, batch(start()))).status).toBe(200)
    const [attempt] = await test.db.select().from(attempts).where(eq(attempts.id, attemptId))
    expect(attempt).toMatchObject({ gymId: gym.gymId, membershipId: member.membershipId })
    // Third parties' gyms stay closed.
    const third = await makeGym(test.db, 'Third gym')
    const sent = batch(start({ versionId: third.versionId }), {
      scheduledClassId: third.scheduledClassId,
      versionId: third.versionId,
    })
    expect((await send(v7(), sent)).status).toBe(404)
  })
})

describe('a database that does not answer', () => {
  /** Takes connections and passes everything on, until it holds still, as a dead network does. */
  async function passage() {
    let isStill = false
    const sockets = new Set<Socket>()
    const target = new URL(test.url)
    const server = createServer((near) => {
      const far = connect(Number(target.port || 5432), target.hostname)
      for (const [from, to] of [
        [near, far],
        [far, near],
      ] as const) {
        sockets.add(from)
        from.on('data', (data) => {
          if (!isStill) to.write(data)
        })
        from.on('error', () => undefined)
        from.on('close', () => to.destroy())
      }
    })
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const url = new URL(test.url)
    url.hostname = '127.0.0.1'
    url.port = String((server.address() as AddressInfo).port)
    return {
      url: url.toString(),
      holdStill: () => void (isStill = true),
      end: () => {
        sockets.forEach((socket) => socket.destroy())
        server.close()
      },
    }
  }

  it('is told as 503 within six seconds, also where the session is read', async () => {
    await signedIn(member)
    const way = await passage()
    const through = openDatabase(way.url, 4)
    pool = through
    try {
      const { viewerOf } = await import('@/server/auth/viewer')
      // The connection stands before the network dies.
      const { checkDatabase } = await import('@/server/data/health-check')
      await checkDatabase(through.db)
      way.holdStill()
      const from = performance.now()
      const [reading, session] = await Promise.allSettled([
        checkDatabase(through.db),
        viewerOf(through.db, member.personId, null),
      ])
      expect(performance.now() - from).toBeLessThan(6_000)
      for (const one of [reading, session])
        expect(one).toMatchObject({ status: 'rejected', reason: { code: 'unavailable' } })
    } finally {
      way.end()
      await through.sql.end({ timeout: 0 })
    }
  })

  it('is told as 503 at once where nobody listens, by handlers and actions alike', async () => {
    const gone = openDatabase('postgres://nobody@127.0.0.1:1/none', 1)
    pool = gone
    const answer = await send(v7(), batch(start()))
    expect(answer.status).toBe(503)
    expect(answer.body.error.code).toBe('unavailable')
    expect(answer.body.error.message).toMatch(/what you did is kept/)
    await gone.sql.end({ timeout: 0 })
  })
})

describe('an error that nobody foresaw', () => {
  it('shows an id and logs it, with nothing of what was typed', async () => {
    await signedIn(member)
    const logged: string[] = []
    vi.spyOn(console, 'error').mockImplementation((line: string) => void logged.push(line))
    const { timed } = await import('@/db/deadline')
    const { handler } = await import('@/server/http/handler')
    const failing = handler(async () => {
      await timed(() =>
        test.db.insert(attempts).values({
          id: v7(),
          gymId: 'no such gym',
          membershipId: member.membershipId,
          scheduledClassId: gym.scheduledClassId,
          versionId: gym.versionId,
          todayNote: 'my knee is swollen',
        }),
      )()
      return new Response()
    })
    const answer = await failing(new Request('http://gym.example/api/x?token=secret'), {
      params: Promise.resolve({}),
    })
    const { error } = (await answer.json()) as ErrorBody
    expect(answer.status).toBe(500)
    expect(logged).toHaveLength(1)
    expect(logged[0]).toContain(error.id)
    expect(logged[0]).toContain('23503')
    expect(`${logged[0]}${JSON.stringify(error)}`).not.toMatch(/swollen|secret|Failed query/)
  })

  it('carries no parameters of a query, whoever prints it', async () => {
    const { timed } = await import('@/db/deadline')
    const failing = timed(
      () => test.db.execute(`select 'my knee is swollen'::integer` as never) as Promise<unknown>,
    )
    const error = await failing().then(
      () => null,
      (reason: unknown) => reason,
    )
    expect(error).toBeInstanceOf(Error)
    expect(`${String(error)} ${(error as Error).stack}`).not.toMatch(/swollen/)
    expect((error as Error).cause).toBeUndefined()
  })
})

describe('changing the password', () => {
  const form = (fields: Record<string, string>) => {
    const made = new FormData()
    for (const [name, value] of Object.entries(fields)) made.set(name, value)
    return made
  }
  const wanted = 'three gulls on a crane'

  it('gives this browser a new token, ends every other session, and takes the new one alone', async () => {
    const { readSession } = await import('@/server/auth/lucia')
    const { changePassword } = await import('@/server/actions/account')
    await signedIn(member)
    const elsewhere = token
    await signedIn(member)
    const before = token
    const result = await changePassword(null, form({ current: PASSWORD, wanted, again: wanted }))
    expect(result).toEqual({ ok: true, value: undefined })
    const made = cookie?.value ?? ''
    expect(made).not.toBe(before)
    expect(await readSession(elsewhere)).toBeNull()
    expect(await readSession(before)).toBeNull()
    expect((await readSession(made))?.personId).toBe(member.personId)
    const { checkSignIn } = await import('@/server/auth/sign-in')
    const tried = (password: string) =>
      checkSignIn(test.db, { email: member.email, password, address: 'new', now: new Date() })
    await expect(tried(PASSWORD)).rejects.toMatchObject({ code: 'bad-input' })
    await expect(tried(wanted)).resolves.toEqual({ personId: member.personId })
  })

  it('writes a cookie that scripts and other sites cannot use, and `__Host-` behind HTTPS', async () => {
    const { sessionCookieName, writeSessionCookie } = await import('@/server/auth/cookie')
    await writeSessionCookie('token')
    expect(cookie?.options).toMatchObject({
      httpOnly: true,
      sameSite: 'lax',
      path: '/',
      secure: false,
    })
    vi.stubEnv('APP_ORIGIN', 'https://floor.example')
    await writeSessionCookie('token')
    // draft-ietf-httpbis-rfc6265bis, 4.1.3.2: `__Host-` needs Secure, Path=/ and no Domain.
    expect(sessionCookieName()).toBe('__Host-floorside')
    expect(cookie?.options).toMatchObject({
      httpOnly: true,
      sameSite: 'lax',
      path: '/',
      secure: true,
    })
    expect(cookie?.options).not.toHaveProperty('domain')
    vi.unstubAllEnvs()
  })

  it('cannot be used to guess the present one', async () => {
    const { changePassword } = await import('@/server/actions/account')
    const guessed = await gym.person('Guessed', ['member'], {
      passwordHash: await hash(PASSWORD, { memoryCost: 256, timeCost: 1, parallelism: 1 }),
    })
    await signedIn(guessed)
    const messages: string[] = []
    for (let tries = 0; tries < 4; tries += 1) {
      const result = await changePassword(
        null,
        form({ current: `guess ${tries}`, wanted, again: wanted }),
      )
      messages.push(result.ok ? 'changed' : result.message)
    }
    expect(messages.at(-1)).toMatch(/Too many tries/)
    const rows = await test.db
      .select()
      .from(signInSessions)
      .where(eq(signInSessions.userId, guessed.personId))
    expect(rows).toHaveLength(1)
  })

  it('takes the same password however a keyboard composes it', async () => {
    const { hashPassword, verifyPassword } = await import('@/server/auth/passwords')
    const kept = await hashPassword('caf\u00e9 by the quay')
    expect(await verifyPassword(kept, 'cafe\u0301 by the quay')).toBe(true)
    expect(await verifyPassword(kept, 'cafe by the quay')).toBe(false)
  })
})
