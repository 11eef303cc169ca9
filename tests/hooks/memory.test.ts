import { IDBFactory } from 'fake-indexeddb'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { newId } from '@/hooks/player/ids'
import { forgetSentClasses, indexedMemory, safeMemory, volatileMemory } from '@/hooks/player/memory'
import type { KeptAttempt, KeptEvent, PlayerMemory } from '@/hooks/player/ports'

const DAY_MS = 86_400_000

const attempt = (attemptId: string, more: Partial<KeptAttempt> = {}): KeptAttempt => ({
  attemptId,
  membershipId: 'member-a',
  scheduledClassId: 'class-1',
  versionId: 'version',
  todayNote: null,
  settings: { waitAtBriefs: false, changeExtraMs: 0 },
  options: {},
  startedWallMs: 20 * DAY_MS,
  over: null,
  ...more,
})
const kept = (attemptId: string, seq: number, more: Partial<KeptEvent> = {}): KeptEvent => ({
  attemptId,
  membershipId: 'member-a',
  sent: false,
  event: { id: newId(), device: 'd', seq, classMs: 0, wallMs: 0, type: 'paused' },
  ...more,
})

beforeEach(() => {
  globalThis.indexedDB = new IDBFactory()
})

describe.each([
  ['IndexedDB', () => indexedMemory()],
  ['memory alone', () => volatileMemory()],
  ['IndexedDB with memory behind it', () => safeMemory(indexedMemory())],
  [
    'memory behind a storage that refuses all',
    () => safeMemory(indexedMemory(() => Promise.reject(new DOMException('no', 'SecurityError')))),
  ],
] as [string, () => PlayerMemory][])('%s', (_, make) => {
  it('gives back what it was given', async () => {
    const memory = make()
    await memory.keepAttempt(attempt('a', { startedWallMs: 1 * DAY_MS }))
    await memory.keepAttempt(attempt('b', { startedWallMs: 2 * DAY_MS, over: 'ended' }))
    await memory.keepAttempt(attempt('other', { membershipId: 'member-b' }))
    expect(await memory.latestAttempt('member-a', 'class-1')).toMatchObject({ attemptId: 'b' })
    expect(await memory.latestAttempt('member-a', 'class-2')).toBeNull()
    expect(await memory.attempt('b')).toMatchObject({ over: 'ended' })
    expect(await memory.attempt('none')).toBeNull()
    await memory.keepAlive({ attemptId: 'a', place: null, wallMs: 7 })
    expect(await memory.alive('a')).toEqual({ attemptId: 'a', place: null, wallMs: 7 })
    expect(await memory.alive('b')).toBeNull()
  })

  it('knows what waits to be sent, by member and attempt, in order', async () => {
    const memory = make()
    await memory.keepAttempt(attempt('a'))
    await memory.keepAttempt(attempt('x', { membershipId: 'member-b' }))
    const events = [kept('a', 2), kept('a', 1), kept('a', 3)]
    await memory.keepEvents(events)
    await memory.keepEvents([kept('x', 1, { membershipId: 'member-b' })])
    const waiting = await memory.unsent('member-a')
    expect(waiting.map((one) => one.attempt.attemptId)).toEqual(['a'])
    const [second, first] = events
    await memory.markSent('a', [second?.event.id ?? '', first?.event.id ?? ''])
    const [left] = await memory.unsent('member-a')
    expect(left?.events.map((event) => event.seq)).toEqual([3])
    expect(await memory.events('a')).toHaveLength(3)
  })
})

describe('storage that misbehaves', () => {
  it('a connection that the browser cut is opened again, and the write kept', async () => {
    const memory = indexedMemory()
    await memory.keepAttempt(attempt('a'))
    const opened: { close(): void }[] = []
    const original = IDBFactory.prototype.open
    const spy = vi.spyOn(IDBFactory.prototype, 'open').mockImplementation(function (
      this: IDBFactory,
      ...args
    ) {
      const request = original.apply(this, args)
      request.addEventListener('success', () => opened.push(request.result))
      return request
    })
    const fresh = indexedMemory()
    await fresh.attempt('a')
    for (const one of opened) one.close()
    await fresh.keepEvents([kept('a', 1)])
    expect(await fresh.events('a')).toHaveLength(1)
    expect(opened).toHaveLength(2)
    spy.mockRestore()
  })

  it('a storage that never answers holds nobody up for longer than 3 s, and only once', async () => {
    vi.useFakeTimers()
    const memory = safeMemory(indexedMemory(() => new Promise(() => undefined)))
    const first = memory.latestAttempt('member-a', 'class-1')
    await vi.advanceTimersByTimeAsync(3_000)
    expect(await first).toBeNull()
    expect(await memory.preferences('member-a')).toBeNull()
    await memory.keepEvents([kept('a', 1)])
    expect(await memory.events('a')).toHaveLength(1)
    expect(memory.isDurable).toBe(false)
    vi.useRealTimers()
  })

  it('what an earlier page left is still sent where storage is full now', async () => {
    await indexedMemory().keepAttempt(attempt('old'))
    await indexedMemory().keepEvents([kept('old', 1)])
    const full = indexedMemory()
    const memory = safeMemory({
      ...full,
      isDurable: true,
      keepEvents: () => Promise.reject(new DOMException('No room', 'QuotaExceededError')),
    })
    await memory.keepAttempt(attempt('new'))
    await memory.keepEvents([kept('new', 1)])
    const waiting = await memory.unsent('member-a')
    expect(waiting.map((one) => one.attempt.attemptId).sort()).toEqual(['new', 'old'])
  })
})

describe('what is forgotten', () => {
  it('at sign-out all that the server has; what was not sent waits for its own member', async () => {
    const memory = indexedMemory()
    await memory.keepAttempt(attempt('sent', { todayNote: 'sore knee' }))
    await memory.keepEvents([kept('sent', 1, { sent: true })])
    await memory.keepAlive({ attemptId: 'sent', place: null, wallMs: 1 })
    await memory.keepAttempt(attempt('waiting'))
    await memory.keepEvents([kept('waiting', 1), kept('waiting', 2, { sent: true })])
    await forgetSentClasses()
    expect(await memory.attempt('sent')).toBeNull()
    expect(await memory.events('sent')).toEqual([])
    expect(await memory.alive('sent')).toBeNull()
    expect(await memory.events('waiting')).toHaveLength(2)
    expect(await memory.unsent('member-b')).toEqual([])
    expect((await memory.unsent('member-a')).map((one) => one.attempt.attemptId)).toEqual([
      'waiting',
    ])
  })

  it('sent classes of more than 14 days ago, when a new one begins', async () => {
    const memory = indexedMemory()
    await memory.keepAttempt(attempt('old', { startedWallMs: 5 * DAY_MS }))
    await memory.keepAttempt(attempt('old-unsent', { startedWallMs: 5 * DAY_MS }))
    await memory.keepEvents([kept('old-unsent', 1)])
    await memory.keepAttempt(attempt('recent', { startedWallMs: 7 * DAY_MS }))
    await memory.keepAttempt(attempt('new', { startedWallMs: 20 * DAY_MS }))
    await vi.waitFor(async () => expect(await memory.attempt('old')).toBeNull())
    expect(await memory.attempt('old-unsent')).not.toBeNull()
    expect(await memory.attempt('recent')).not.toBeNull()
  })
})
