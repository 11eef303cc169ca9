import { hash, verify } from '@node-rs/argon2'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { memberships } from '@/db/schema/memberships'
import { signInSessions } from '@/db/schema/sign-in-sessions'
import { signInThrottles } from '@/db/schema/sign-in-throttles'
import { AppError } from '@/server/contract/errors'
import { safeNext } from '@/server/contract/forms'
import { passwordProblem } from '@/server/contract/passwords'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, type TestGym } from '../support/gym'

let test: TestDatabase
let gym: TestGym
const PASSWORD = 'quiet harbour lantern'

// The pool of the process is the test's own database.
vi.mock('@/db/client', async (original) => ({
  ...(await original<object>()),
  database: () => test.db,
  databaseSql: () => test.sql,
}))
// The real one, watched.
vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<{ verify: typeof verify }>()
  return { ...real, verify: vi.fn(real.verify) }
})
vi.mock('next/headers', () => ({ cookies: vi.fn(), headers: vi.fn() }))

beforeAll(async () => {
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'Gym')
})
afterAll(() => test.end())

// Cheap figures: these tests are about who gets in, not about how long a hash takes.
const cheap = (password: string) => hash(password, { memoryCost: 256, timeCost: 1, parallelism: 1 })
async function somebody(name = 'Somebody') {
  return gym.person(name, ['member'], { passwordHash: await cheap(PASSWORD) })
}
const signIn = async (
  email: string,
  password: string,
  more: { address?: string; now?: Date } = {},
) => {
  const { checkSignIn } = await import('@/server/auth/sign-in')
  return checkSignIn(test.db, { email, password, address: '192.0.2.1', now: NOW, ...more })
}
const refusal = (work: Promise<unknown>) =>
  work.then(
    () => null,
    (error: unknown) =>
      error instanceof AppError ? { code: error.code, message: error.message } : error,
  )

describe('sign-in', () => {
  it('lets the right person in, whatever the case of the e-mail', async () => {
    const viewer = await somebody()
    expect(await signIn(viewer.email.toUpperCase(), PASSWORD)).toEqual({
      personId: viewer.personId,
    })
  })

  it('says the same of an unknown address, a wrong password and a deactivated person', async () => {
    const viewer = await somebody()
    const gone = await somebody('Gone')
    await test.db
      .update(memberships)
      .set({ deactivatedAt: NOW })
      .where(eq(memberships.id, gone.membershipId))
    const answers = await Promise.all([
      refusal(signIn('nobody@example.org', PASSWORD, { address: '192.0.2.10' })),
      refusal(signIn(viewer.email, 'wrong', { address: '192.0.2.11' })),
      refusal(signIn(gone.email, PASSWORD, { address: '192.0.2.12' })),
    ])
    expect(answers[0]).toMatchObject({ code: 'bad-input' })
    expect(answers[1]).toEqual(answers[0])
    expect(answers[2]).toEqual(answers[0])
  })

  it('does the work of a hash for an unknown address too, with the same figures', async () => {
    const { verifyPassword } = await import('@/server/auth/passwords')
    const verifying = vi.mocked(verify)
    verifying.mockClear()
    await refusal(signIn('nobody-at-all@example.org', 'wrong', { address: '192.0.2.20' }))
    expect(await verifyPassword(null, 'wrong')).toBe(false)
    const against = verifying.mock.calls.map(([passwordHash]) => String(passwordHash))
    expect(against).toHaveLength(2)
    for (const one of against) expect(one).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
  })

  it('delays after failures, doubling, per account and address, and lets in again after the wait', async () => {
    const viewer = await somebody('Throttled')
    const at = (seconds: number) => new Date(NOW.getTime() + seconds * 1_000)
    for (let tries = 0; tries < 3; tries += 1) {
      expect(await refusal(signIn(viewer.email, 'wrong', { now: at(tries) }))).toMatchObject({
        code: 'bad-input',
      })
    }
    // The third failure holds for a second, even with the right password.
    expect(await refusal(signIn(viewer.email, PASSWORD, { now: at(2.5) }))).toMatchObject({
      code: 'too-many',
    })
    expect(await refusal(signIn(viewer.email, 'wrong', { now: at(4) }))).toMatchObject({
      code: 'bad-input',
    })
    // The fourth holds for two.
    expect(await refusal(signIn(viewer.email, PASSWORD, { now: at(5.5) }))).toMatchObject({
      code: 'too-many',
    })
    expect(await signIn(viewer.email, PASSWORD, { now: at(7) })).toEqual({
      personId: viewer.personId,
    })
  })

  it('lets no more guesses through when they all come at once', async () => {
    const viewer = await somebody('All at once')
    const tries = await Promise.all(
      Array.from({ length: 40 }, (_, at) =>
        refusal(signIn(viewer.email, `guess ${at}`, { address: '192.0.2.40' })),
      ),
    )
    const codes = tries.map((one) => (one instanceof Error ? one : (one as { code: string }).code))
    expect(codes.filter((code) => code === 'bad-input')).toHaveLength(3)
    expect(codes.filter((code) => code === 'too-many')).toHaveLength(37)
  })

  it('forgives what came before a right password, for the account and not for the address', async () => {
    const viewer = await somebody('Forgetful')
    const address = '198.51.100.20'
    for (let round = 0; round < 8; round += 1) {
      const now = new Date(NOW.getTime() + round * 60_000)
      for (let tries = 0; tries < 2; tries += 1)
        await refusal(signIn(viewer.email, 'wrong', { address, now }))
      expect(await signIn(viewer.email, PASSWORD, { address, now })).toBeTruthy()
    }
    const rows = await test.db.select().from(signInThrottles)
    const failures = (kind: string) =>
      rows.filter((row) => row.key.startsWith(kind)).map((row) => row.failures)
    expect(failures('address:')).toContain(16)
    expect(failures('address:')).not.toContain(24)
    // Two failures, eight times over, and still none that costs a delay.
    await refusal(signIn(viewer.email, 'wrong', { address: '198.51.100.21' }))
    expect(await signIn(viewer.email, PASSWORD, { address: '198.51.100.21' })).toBeTruthy()
  })

  it('sweeps away what is long past', async () => {
    await test.db.insert(signInThrottles).values({
      key: 'account:long-past',
      failures: 3,
      lastFailureAt: new Date(NOW.getTime() - 7_200_000),
      blockedUntil: new Date(NOW.getTime() - 7_200_000),
    })
    await refusal(signIn('nobody@example.org', 'wrong', { address: '192.0.2.77' }))
    const rows = await test.db
      .select()
      .from(signInThrottles)
      .where(eq(signInThrottles.key, 'account:long-past'))
    expect(rows).toEqual([])
  })

  it('holds an address that tries many accounts', async () => {
    const address = '198.51.100.7'
    for (let tries = 0; tries < 21; tries += 1) {
      await refusal(signIn(`nobody-${tries}@example.org`, 'wrong', { address }))
    }
    const viewer = await somebody('Neighbour')
    expect(await refusal(signIn(viewer.email, PASSWORD, { address }))).toMatchObject({
      code: 'too-many',
    })
    expect(await signIn(viewer.email, PASSWORD, { address: '198.51.100.8' })).toBeTruthy()
  })

  it('never locks an account for good', async () => {
    const { delaySeconds } = await import('@/server/auth/throttle')
    expect(delaySeconds('account', 1_000)).toBeLessThanOrEqual(60)
    expect(delaySeconds('both', 1_000)).toBeLessThanOrEqual(300)
  })
})

describe('sessions', () => {
  it('keep a digest of the token, never the token', async () => {
    const { startSession, readSession } = await import('@/server/auth/lucia')
    const viewer = await somebody('Digest')
    const token = await startSession(viewer.personId, { gymId: null, userAgent: 'test' })
    const rows = await test.db
      .select()
      .from(signInSessions)
      .where(eq(signInSessions.userId, viewer.personId))
    expect(JSON.stringify(rows)).not.toContain(token)
    expect((await readSession(token))?.personId).toBe(viewer.personId)
    expect(await readSession(rows[0]?.id ?? '')).toBeNull()
  })

  it('end at their absolute limit however much they are used', async () => {
    const { startSession, readSession } = await import('@/server/auth/lucia')
    const viewer = await somebody('Absolute')
    const token = await startSession(viewer.personId, { gymId: null, userAgent: '' })
    const in31Days = new Date(Date.now() + 31 * 86_400_000)
    expect(await readSession(token, in31Days)).toBeNull()
    expect(await readSession(token)).toBeNull()
  })

  it('end with sign-out everywhere, and all others with a new password', async () => {
    const { startSession, readSession, endSessions, digestOf } = await import('@/server/auth/lucia')
    const { changeOwnPassword } = await import('@/server/data/people')
    const viewer = await somebody('Everywhere')
    const start = () => startSession(viewer.personId, { gymId: null, userAgent: '' })
    const [here, there] = [await start(), await start()]
    await changeOwnPassword(
      viewer,
      { passwordHash: await cheap('another one'), keepSessionId: digestOf(here) },
      test.db,
    )
    expect(await readSession(here)).not.toBeNull()
    expect(await readSession(there)).toBeNull()
    await endSessions(viewer.personId)
    expect(await readSession(here)).toBeNull()
  })

  it('stand for nobody once the person is deactivated', async () => {
    const { startSession } = await import('@/server/auth/lucia')
    const { sessionOf } = await import('@/server/auth/viewer')
    const viewer = await somebody('Deactivated')
    const token = await startSession(viewer.personId, { gymId: null, userAgent: '' })
    expect((await sessionOf(token))?.viewer.membershipId).toBe(viewer.membershipId)
    await test.db
      .update(memberships)
      .set({ deactivatedAt: NOW })
      .where(eq(memberships.id, viewer.membershipId))
    expect(await sessionOf(token)).toBeNull()
  })

  it('stand in the gym that was switched to, for somebody in several', async () => {
    const { startSession, digestOf, setSessionGym } = await import('@/server/auth/lucia')
    const { sessionOf } = await import('@/server/auth/viewer')
    const second = await makeGym(test.db, 'Second gym')
    const viewer = await somebody('In two gyms')
    await test.db.insert(memberships).values({
      id: `${viewer.membershipId}-2`,
      gymId: second.gymId,
      personId: viewer.personId,
      roles: ['coach'],
    })
    const token = await startSession(viewer.personId, { gymId: null, userAgent: '' })
    await setSessionGym(digestOf(token), second.gymId)
    const session = await sessionOf(token)
    expect(session?.viewer.gymId).toBe(second.gymId)
    expect(session?.viewer.roles).toEqual(['coach'])
    expect(session?.viewer.gyms).toHaveLength(2)
  })
})

describe('passwords', () => {
  it.each(['short', 'Password1', 'aaaaaaaaaa', 'x'.repeat(257)])('refuse %s', (password) => {
    expect(passwordProblem(password)).not.toBeNull()
  })
  it.each(['quiet harbour lantern', 'ünïcödé-sätze', 'x1'.repeat(32), ' spaces count '])(
    'take %s',
    (password) => {
      expect(passwordProblem(password)).toBeNull()
    },
  )
  it('are kept as argon2id with at least 19 MiB and two passes (OWASP, Password Storage)', async () => {
    const { hashPassword } = await import('@/server/auth/passwords')
    expect(await hashPassword('anything at all')).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
  })
})

describe('the page that follows a sign-in', () => {
  it.each(['//evil.example', 'https://evil.example', '/\\evil.example', '/a\nb', '', 'today'])(
    'is never %s',
    (next) => {
      expect(safeNext(next)).toBeNull()
    },
  )
  it('is a path of the product', () => {
    expect(safeNext('/board/1?sort=name')).toBe('/board/1?sort=name')
  })
})
