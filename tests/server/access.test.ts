import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { v7 } from 'uuid'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { eq } from 'drizzle-orm'
import { hurtHolds } from '@/db/schema/hurt-holds'
import { memberships } from '@/db/schema/memberships'
import { movements } from '@/db/schema/movements'
import type { Viewer } from '@/server/contract/viewer'
import { AppError, ERROR_STATUS } from '@/server/contract/errors'
import { HEALTH_QUESTIONS } from '@/server/engine/fit/screening'
import { AS_PLANNED } from '@/server/engine/spec/names'
import { startFakeS3, type FakeS3 } from '@/scripts/lib/fake-s3.mjs'
import {
  ACTIONS,
  HANDLERS,
  PAGES,
  VISITORS,
  type Outcome,
  type Visitor,
} from '../support/access-table'
import { makeTestDatabase, type TestDatabase } from '../support/database'
import { makeGym, NOW, stamped, type TestGym } from '../support/gym'
import { movementForm } from '../support/library-form'

let test: TestDatabase
let token: string | null = null
let site = 'same-origin'

vi.mock('@/db/client', async (original) => ({
  ...(await original<object>()),
  database: () => test.db,
  databaseSql: () => test.sql,
}))
vi.mock('next/headers', () => ({
  cookies: async () => ({
    get: () => (token === null ? undefined : { name: 'floorside', value: token }),
    set: () => undefined,
  }),
  headers: async () => new Headers({ 'sec-fetch-site': site, 'x-forwarded-for': '192.0.2.1' }),
}))
vi.mock('next/cache', () => ({ refresh: () => undefined }))
// Fonts and styles are the bundler's; a page's own modules are what is asked here.
vi.mock('@/components/player/player', () => ({ Player: () => null }))

let gym: TestGym
let attemptId: string
let holdId: string
let slug: string
let store: FakeS3
let mediaId: string
const objects = mkdtempSync(join(tmpdir(), 'floorside-objects-'))
const people = new Map<Visitor, Viewer>()
const tokens = new Map<Visitor, string | null>()

beforeAll(async () => {
  // The clock of the pages stands at the fixture's noon; sessions are made by the same clock.
  vi.useFakeTimers({ toFake: ['Date'], now: NOW })
  test = await makeTestDatabase()
  gym = await makeGym(test.db, 'First gym')
  const second = await makeGym(test.db, 'Second gym')
  const [content] = gym.version.movements
  if (!content) throw new Error('no movement')
  slug = content.slug
  await test.db
    .insert(movements)
    .values({ id: v7(), gymId: gym.gymId, slug, content, builtIn: true })
  people.set('member', await gym.person('Member', ['member']))
  people.set('other-member', await gym.person('Other', ['member']))
  people.set('coach', await gym.person('Coach', ['coach']))
  people.set('other-coach', await second.person('Coach elsewhere', ['coach']))
  people.set('owner', await gym.person('Owner', ['owner']))
  people.set('deactivated', await gym.person('Gone', ['member', 'coach', 'owner']))
  const { recordEvents } = await import('@/server/data/attempts')
  attemptId = v7()
  const member = people.get('member')
  if (!member) throw new Error('no member')
  await recordEvents(
    member,
    {
      attemptId,
      now: NOW,
      input: {
        scheduledClassId: gym.scheduledClassId,
        versionId: gym.versionId,
        events: stamped([
          { type: 'started', classMs: 0, version: gym.versionId, counting: 'press', options: [] },
          { type: 'hurt', classMs: 5_000, where: 'knee' },
        ]),
      },
    },
    test.db,
  )
  const [hold] = await test.db.select().from(hurtHolds)
  holdId = hold?.id ?? ''
  store = await startFakeS3({ folder: objects })
  for (const [name, value] of Object.entries(store.env)) vi.stubEnv(name, value)
  mediaId = await clipWithStill()
})
beforeEach(async () => {
  const { startSession } = await import('@/server/auth/lucia')
  for (const visitor of VISITORS) {
    const person = people.get(visitor)
    tokens.set(
      visitor,
      person ? await startSession(person.personId, { gymId: null, userAgent: '' }) : null,
    )
  }
  await test.db
    .update(memberships)
    .set({ deactivatedAt: NOW })
    .where(eq(memberships.id, people.get('deactivated')?.membershipId ?? ''))
})
afterAll(async () => {
  vi.useRealTimers()
  vi.unstubAllEnvs()
  await store.close()
  rmSync(objects, { recursive: true, force: true })
  await test.end()
})

/** A clip of the movement's planned option with its still, for whoever may look at them. */
async function clipWithStill(): Promise<string> {
  const { setMedia, setPoster } = await import('@/server/data/media')
  const { putObject } = await import('@/server/storage/objects')
  const coach = people.get('coach')
  if (!coach) throw new Error('no coach')
  const id = v7()
  const name = { movement: slug, option: AS_PLANNED, mediaId: id }
  const type = { kind: 'clip', contentType: 'video/mp4' } as const
  const [storageKey, posterKey] = [`media/${id}`, `media/${id}/still`]
  for (const key of [storageKey, posterKey]) {
    const chunks = (async function* () {
      yield Buffer.from('some')
    })()
    await putObject(key, chunks, { bytes: 4, contentType: type.contentType })
  }
  await setMedia(coach, { ...name, type, bytes: 4, storageKey, now: NOW }, test.db)
  await setPoster(coach, { ...name, posterKey }, test.db)
  return id
}

/** What each handler is sent that changes something. */
function bodyFor(what: string): { type: string; body?: BodyInit; length?: number } {
  if (what.startsWith('PUT')) {
    const jpeg = Uint8Array.from([0xff, 0xd8, 0xff, 0xe0])
    return { type: 'image/jpeg', body: jpeg, length: jpeg.length }
  }
  const type = 'application/json'
  if (!what.startsWith('POST')) return { type }
  const body = JSON.stringify({
    scheduledClassId: gym.scheduledClassId,
    versionId: gym.versionId,
    events: stamped([{ type: 'paused', classMs: 9_000 }], 'device-a', 3),
  })
  return { type, body }
}

/** What Next's own redirect and notFound throw, and our errors, as outcomes. */
function thrown(error: unknown): Outcome {
  const digest =
    typeof error === 'object' && error !== null && 'digest' in error ? String(error.digest) : ''
  if (digest.startsWith('NEXT_REDIRECT')) return digest.includes('/sign-in') ? 'sign-in' : 'on'
  if (digest.startsWith('NEXT_HTTP_ERROR_FALLBACK;404')) return '404'
  if (error instanceof AppError) return String(ERROR_STATUS[error.code]) as Outcome
  throw error
}

const ids = () => ({
  scheduledClassId: gym.scheduledClassId,
  classId: gym.classId,
  attemptId,
  slug,
  option: AS_PLANNED,
})

function files(folder: string, name: string): string[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((file) => file.split('/').at(-1) === name)
    .map((file) => join(folder, file))
}
/** The address of a file under app/: groups in brackets are no part of it. */
const addressOf = (file: string): string =>
  `/${file
    .split('/')
    .slice(1, -1)
    .filter((part) => !part.startsWith('('))
    .join('/')}`

const pageFiles = new Map(files('app', 'page.tsx').map((file) => [addressOf(file), file]))
const handlerFiles = new Map<string, string>(
  files('app', 'route.ts').flatMap((file) =>
    [
      ...readFileSync(file, 'utf8').matchAll(
        /export (?:const|async function|function) (GET|POST|PUT|PATCH|DELETE)\b/g,
      ),
    ].map(([, method]) => [`${method} ${addressOf(file)}`, file] as const),
  ),
)
const actionFiles = new Map<string, string>(
  readdirSync('server/actions')
    .filter((file) => readFileSync(`server/actions/${file}`, 'utf8').startsWith("'use server'"))
    .flatMap((file) =>
      [
        ...readFileSync(`server/actions/${file}`, 'utf8').matchAll(/export async function (\w+)/g),
      ].map(
        ([, name]) => [`${file.replace('.ts', '')}/${name}`, `server/actions/${file}`] as const,
      ),
    ),
)

describe('the table', () => {
  it('has a row for every page, handler and action, and no row for what is gone', () => {
    expect([...pageFiles.keys()].sort()).toEqual(Object.keys(PAGES).sort())
    expect([...handlerFiles.keys()].sort()).toEqual(Object.keys(HANDLERS).sort())
    expect([...actionFiles.keys()].sort()).toEqual(Object.keys(ACTIONS).sort())
  })
})

const everybody = <T extends string>(rows: Record<string, Record<Visitor, T>>) =>
  Object.entries(rows).flatMap(([what, row]) =>
    VISITORS.map((visitor): [string, Visitor, T] => [what, visitor, row[visitor]]),
  )

describe('pages', () => {
  it.each(everybody(PAGES))('%s by %s: %s', async (address, visitor, expected) => {
    token = tokens.get(visitor) ?? null
    const { default: page } = (await import(
      /* @vite-ignore */ `../../${pageFiles.get(address)}`
    )) as {
      default: (props: object) => unknown
    }
    const props = { params: Promise.resolve(ids()), searchParams: Promise.resolve({}) }
    const outcome = await Promise.resolve()
      .then(() => page(props))
      .then(() => 'ok' as Outcome, thrown)
    expect(outcome).toBe(expected)
  })
})

describe('route handlers', () => {
  it.each(everybody(HANDLERS))('%s by %s: %s', async (what, visitor, expected) => {
    token = tokens.get(visitor) ?? null
    const [method = 'GET', address = ''] = what.split(' ')
    const routes = (await import(
      /* @vite-ignore */ `../../${handlerFiles.get(what) ?? ''}`
    )) as Record<string, (request: Request, context: object) => Promise<Response>>
    const ending = new AbortController()
    const url = `http://gym.example${address.replace('[attemptId]', attemptId).replace('[scheduledClassId]', gym.scheduledClassId)}?boards=${gym.scheduledClassId}${what.startsWith('PUT') ? `&v=${mediaId}` : ''}`
    const { type, body, length } = bodyFor(what)
    const answer = await routes[method]?.(
      new Request(url, {
        method,
        signal: ending.signal,
        headers: {
          'sec-fetch-site': 'same-origin',
          'content-type': type,
          ...(length === undefined ? {} : { 'content-length': String(length) }),
        },
        ...(body === undefined ? {} : { body }),
      }),
      { params: Promise.resolve(ids()) },
    )
    ending.abort()
    await answer?.body?.cancel().catch(() => undefined)
    expect(answer?.ok ? 'ok' : String(answer?.status)).toBe(expected)
  })

  it('refuse a change from another site, without an origin, or that is no JSON', async () => {
    token = tokens.get('member') ?? null
    const { POST } = await import('@/app/api/v1/attempts/[attemptId]/events/route')
    const send = (headers: Record<string, string>) =>
      POST(new Request('http://gym.example/x', { method: 'POST', headers, body: '{}' }), {
        params: Promise.resolve({ attemptId }),
      })
    const json = { 'content-type': 'application/json', host: 'gym.example' }
    expect((await send({ ...json, 'sec-fetch-site': 'cross-site' })).status).toBe(403)
    expect((await send({ ...json, origin: 'http://evil.example' })).status).toBe(403)
    expect((await send(json)).status).toBe(403)
    expect(
      (await send({ 'sec-fetch-site': 'same-origin', 'content-type': 'text/plain' })).status,
    ).toBe(400)
  })

  it('answer a body over 1 MB with 413 and malformed JSON with 400, in words', async () => {
    token = tokens.get('member') ?? null
    const { POST } = await import('@/app/api/v1/attempts/[attemptId]/events/route')
    const send = (body: string) =>
      POST(
        new Request('http://gym.example/x', {
          method: 'POST',
          headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' },
          body,
        }),
        { params: Promise.resolve({ attemptId }) },
      )
    expect((await send(`"${'x'.repeat(1_000_001)}"`)).status).toBe(413)
    const malformed = await send('{"events":')
    expect(malformed.status).toBe(400)
    expect(((await malformed.json()) as { error: { message: string } }).error.message).toMatch(
      /JSON/,
    )
  })
})

function formFor(action: string): FormData {
  if (action === 'library/saveMovement') return movementForm({ slug, over: 'on' })
  const form = new FormData()
  const fields: Record<string, Record<string, string>> = {
    'account/signIn': { email: people.get('member')?.email ?? '', password: 'wrong' },
    'account/changePassword': {
      current: 'wrong',
      wanted: 'harbour wall lamp',
      again: 'harbour wall lamp',
    },
    'account/switchGym': { gymId: gym.gymId },
    'health/saveHealthAnswers': Object.fromEntries(
      HEALTH_QUESTIONS.map((question) => [question, 'no']),
    ),
    'health/clearHurtHold': { holdId, as: 'coach' },
    'kit/saveOwnKit': { dumbbell: '2' },
    'library/archiveMovement': { slug },
    'library/bringBackMovement': { slug },
    // The built-in itself is what stands there: nothing is removed, by whoever may ask.
    'library/backToBuiltIn': { slug, basedOn: 'seen before' },
    'fit/saveFit': { note: 'knee' },
    'fit/saveOptionRule': {
      membershipId: people.get('member')?.membershipId ?? '',
      movement: 'goblet-squat',
      option: 'as-planned',
    },
    'planned-classes/importCues': {
      classId: gym.classId,
      basedOn: gym.versionId,
      block: gym.version.spec.blocks[0]?.id ?? '',
      timesFrom: 'block',
      captions: 'WEBVTT\n\n00:05.000 --> 00:07.000\nShoulders down',
    },
  }
  for (const [name, value] of Object.entries(fields[action] ?? {})) form.set(name, value)
  return form
}

describe('actions', () => {
  it.each(everybody(ACTIONS))('%s by %s: %s', async (what, visitor, expected) => {
    token = tokens.get(visitor) ?? null
    const actions = (await import(
      /* @vite-ignore */ `../../${actionFiles.get(what) ?? ''}`
    )) as Record<string, (...args: unknown[]) => Promise<{ ok: boolean } | undefined>>
    const name = what.split('/')[1] ?? ''
    const form = formFor(what)
    const call = ['signOut', 'signOutEverywhere'].includes(name)
      ? actions[name]?.()
      : name === 'switchGym'
        ? actions[name]?.(form)
        : actions[name]?.(null, form)
    const outcome = await call?.then(
      (result): Outcome => (result === undefined || result.ok ? 'ok' : 'refused'),
      thrown,
    )
    expect(outcome).toBe(expected)
  })
})

describe('actions from another site', () => {
  it.each(Object.keys(ACTIONS))('%s does nothing', async (what) => {
    token = tokens.get('member') ?? null
    site = 'cross-site'
    try {
      const actions = (await import(
        /* @vite-ignore */ `../../${actionFiles.get(what) ?? ''}`
      )) as Record<string, (...args: unknown[]) => Promise<{ ok: boolean; message?: string }>>
      const name = what.split('/')[1] ?? ''
      const form = formFor(what)
      const call = name === 'switchGym' ? actions[name]?.(form) : actions[name]?.(null, form)
      const message = await call?.then(
        (result) => (result.ok ? 'done' : result.message),
        (error: unknown) => (error instanceof AppError ? error.message : 'something else'),
      )
      expect(message).toMatch(/own pages/)
    } finally {
      site = 'same-origin'
    }
  })
})
