/** What survives a reload: IndexedDB, or memory alone where the browser refuses it. */
import { openDB, type DBSchema, type IDBPDatabase } from 'idb'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { KeptAlive, KeptAttempt, KeptEvent, PlayerMemory } from './ports'
import type { PlayerPreferences } from './types'

const DATABASE = 'floorside'
/** Sent attempts older than this are cleared away when a new one is kept. */
const FORGET_AFTER_MS = 14 * 86_400_000

interface Schema extends DBSchema {
  attempts: { key: string; value: KeptAttempt; indexes: { membership: string } }
  events: {
    key: [string, string]
    value: KeptEvent & { id: string; unsentOf?: string }
    /** `unsent` holds only what waits: the member's id is taken off once it is sent. */
    indexes: { attempt: string; unsent: string }
  }
  alive: { key: string; value: KeptAlive }
  preferences: { key: string; value: { membershipId: string; preferences: PlayerPreferences } }
}

function openOnce(): Promise<IDBPDatabase<Schema>> {
  return openDB<Schema>(DATABASE, 1, {
    upgrade(db) {
      db.createObjectStore('attempts', { keyPath: 'attemptId' }).createIndex(
        'membership',
        'membershipId',
      )
      const events = db.createObjectStore('events', { keyPath: ['attemptId', 'id'] })
      events.createIndex('attempt', 'attemptId')
      events.createIndex('unsent', 'unsentOf')
      db.createObjectStore('alive', { keyPath: 'attemptId' })
      db.createObjectStore('preferences', { keyPath: 'membershipId' })
    },
    blocking(_old, _new, event) {
      // Another tab wants a newer shape: let it through, this one opens again at its next use.
      ;(event.target as IDBDatabase).close()
    },
  })
}

/** Some browsers leave a request to open unanswered for ever. */
const OPEN_WITHIN_MS = 3_000

async function inTime<T>(work: Promise<T>): Promise<T> {
  let timer: ReturnType<typeof setTimeout> | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error('The storage does not answer.')), OPEN_WITHIN_MS)
  })
  try {
    return await Promise.race([work, late])
  } finally {
    clearTimeout(timer)
  }
}

/** IndexedDB with its connection opened again where the browser cut it; rejects where nothing can be kept. */
export function indexedMemory(
  openDatabase: () => Promise<IDBPDatabase<Schema>> = openOnce,
): PlayerMemory {
  let opening: Promise<IDBPDatabase<Schema>> | null = null
  /** Set while a request to open is late: nothing else waits for it as well. */
  let isUnanswered = false

  function open(): Promise<IDBPDatabase<Schema>> {
    if (isUnanswered) return Promise.reject(new Error('The storage does not answer.'))
    if (opening) return opening
    const asked = openDatabase()
    const answered = () => {
      isUnanswered = false
    }
    opening = inTime(asked).catch((error: unknown) => {
      opening = null
      isUnanswered = true
      asked.then(answered, answered)
      throw error
    })
    return opening
  }

  async function withDb<T>(work: (db: IDBPDatabase<Schema>) => Promise<T>): Promise<T> {
    const db = await open()
    try {
      return await work(db)
    } catch (error) {
      // Some browsers cut the connections of hidden tabs: once more on a fresh one.
      opening = null
      if (error instanceof DOMException && error.name === 'QuotaExceededError') throw error
      db.close()
      return work(await open())
    }
  }

  return {
    isDurable: true,
    preferences: (membershipId) =>
      withDb(async (db) => (await db.get('preferences', membershipId))?.preferences ?? null),
    keepPreferences: (membershipId, preferences) =>
      withDb(async (db) => void (await db.put('preferences', { membershipId, preferences }))),
    latestAttempt: (membershipId, scheduledClassId) =>
      withDb(async (db) => {
        const own = await db.getAllFromIndex('attempts', 'membership', membershipId)
        return (
          own
            .filter((attempt) => attempt.scheduledClassId === scheduledClassId)
            .sort((a, b) => b.startedWallMs - a.startedWallMs)[0] ?? null
        )
      }),
    keepAttempt: (attempt) =>
      withDb(async (db) => {
        await db.put('attempts', attempt)
        // What is cleared away must not make what is kept look lost.
        void forgetSent(db, attempt.startedWallMs - FORGET_AFTER_MS).catch(() => undefined)
      }),
    attempt: (attemptId) => withDb(async (db) => (await db.get('attempts', attemptId)) ?? null),
    events: (attemptId) =>
      withDb(async (db) => {
        const kept = await db.getAllFromIndex('events', 'attempt', attemptId)
        return kept.map(({ membershipId, event, sent }) => ({
          attemptId,
          membershipId,
          event,
          sent,
        }))
      }),
    keepEvents: (events) =>
      withDb(async (db) => {
        const transaction = db.transaction('events', 'readwrite', { durability: 'strict' })
        const puts = events.map((kept) =>
          transaction.store.put({
            ...kept,
            id: kept.event.id,
            ...(kept.sent ? {} : { unsentOf: kept.membershipId }),
          }),
        )
        await Promise.all([...puts, transaction.done])
      }),
    alive: (attemptId) => withDb(async (db) => (await db.get('alive', attemptId)) ?? null),
    keepAlive: (alive) => withDb(async (db) => void (await db.put('alive', alive))),
    unsent: (membershipId) =>
      withDb(async (db) => {
        const waiting = await db.getAllFromIndex('events', 'unsent', membershipId)
        const byAttempt = new Map<string, ClassEvent[]>()
        for (const { attemptId, event } of waiting) {
          byAttempt.set(attemptId, [...(byAttempt.get(attemptId) ?? []), event])
        }
        const found = []
        for (const [attemptId, events] of byAttempt) {
          const attempt = await db.get('attempts', attemptId)
          if (attempt) found.push({ attempt, events: events.sort((a, b) => a.seq - b.seq) })
        }
        return found
      }),
    markSent: (attemptId, ids) =>
      withDb(async (db) => {
        const transaction = db.transaction('events', 'readwrite')
        const marks = ids.map(async (id) => {
          const kept = await transaction.store.get([attemptId, id])
          if (!kept) return
          const { unsentOf: _waiting, ...rest } = kept
          await transaction.store.put({ ...rest, sent: true })
        })
        await Promise.all([...marks, transaction.done])
      }),
  }
}

/** Clears away what began before `beforeWallMs` and has been sent whole. */
async function forgetSent(db: IDBPDatabase<Schema>, beforeWallMs: number): Promise<void> {
  for (const attempt of await db.getAll('attempts')) {
    if (attempt.startedWallMs >= beforeWallMs) continue
    const events = await db.getAllFromIndex('events', 'attempt', attempt.attemptId)
    if (events.some((event) => !event.sent)) continue
    const transaction = db.transaction(['attempts', 'events', 'alive'], 'readwrite')
    await Promise.all([
      ...events.map((event) =>
        transaction.objectStore('events').delete([event.attemptId, event.id]),
      ),
      transaction.objectStore('attempts').delete(attempt.attemptId),
      transaction.objectStore('alive').delete(attempt.attemptId),
      transaction.done,
    ])
  }
}

/**
 * At sign-out: nothing that the server has stays in a browser that others may use. What was not sent
 * stays for its own member alone, and is sent when they sign in again.
 */
export async function forgetSentClasses(): Promise<void> {
  if (typeof indexedDB === 'undefined') return
  try {
    const db = await inTime(openOnce())
    await forgetSent(db, Infinity)
    db.close()
  } catch {
    // Nothing was kept where nothing can be opened.
  }
}

/** Keeps everything as long as the page stays open, and no longer. */
export function volatileMemory(): PlayerMemory {
  const attempts = new Map<string, KeptAttempt>()
  const events = new Map<string, KeptEvent>()
  const alive = new Map<string, KeptAlive>()
  const preferences = new Map<string, PlayerPreferences>()
  return {
    isDurable: false,
    preferences: async (membershipId) => preferences.get(membershipId) ?? null,
    keepPreferences: async (membershipId, chosen) => void preferences.set(membershipId, chosen),
    latestAttempt: async (membershipId, scheduledClassId) =>
      [...attempts.values()].findLast(
        (one) => one.membershipId === membershipId && one.scheduledClassId === scheduledClassId,
      ) ?? null,
    attempt: async (attemptId) => attempts.get(attemptId) ?? null,
    keepAttempt: async (attempt) => void attempts.set(attempt.attemptId, attempt),
    events: async (attemptId) => [...events.values()].filter((one) => one.attemptId === attemptId),
    keepEvents: async (kept) => kept.forEach((one) => events.set(one.event.id, one)),
    alive: async (attemptId) => alive.get(attemptId) ?? null,
    keepAlive: async (kept) => void alive.set(kept.attemptId, kept),
    unsent: async (membershipId) =>
      [...attempts.values()].flatMap((attempt) => {
        const waiting = [...events.values()].filter(
          (one) =>
            one.attemptId === attempt.attemptId && one.membershipId === membershipId && !one.sent,
        )
        return waiting.length > 0 ? [{ attempt, events: waiting.map((one) => one.event) }] : []
      }),
    markSent: async (_attemptId, ids) => {
      for (const id of ids) {
        const kept = events.get(id)
        if (kept) events.set(id, { ...kept, sent: true })
      }
    },
  }
}

/**
 * `durable` with memory behind it: from the first write that it refuses (storage full or forbidden)
 * nothing is lost while the page is open, `isDurable` says so, and every later write tries to make up
 * for what is owed.
 */
export function safeMemory(durable: PlayerMemory, fallback = volatileMemory()): PlayerMemory {
  let isDurable = durable.isDurable
  const sent = new Set<string>()
  const owedAttempts = new Map<string, KeptAttempt>()
  const owedEvents = new Map<string, KeptEvent>()

  async function settle(): Promise<void> {
    const attempts = [...owedAttempts.values()]
    const events = [...owedEvents.values()]
    try {
      for (const attempt of attempts) {
        await durable.keepAttempt(attempt)
        if (owedAttempts.get(attempt.attemptId) === attempt) owedAttempts.delete(attempt.attemptId)
      }
      if (events.length > 0) {
        await durable.keepEvents(
          events.map((one) => (sent.has(one.event.id) ? { ...one, sent: true } : one)),
        )
      }
      for (const one of events) owedEvents.delete(one.event.id)
      isDurable = durable.isDurable
    } catch {
      isDurable = false
    }
  }
  /** While storage refuses, nobody waits for it. */
  const write = async (): Promise<void> => {
    const settled = settle()
    if (isDurable) await settled
  }
  const read = async <T>(
    kept: () => Promise<T>,
    instead: () => Promise<T>,
    isThere: (value: T) => boolean,
  ): Promise<T> => {
    try {
      const value = await kept()
      if (isThere(value)) return value
    } catch {
      isDurable = false
    }
    return instead()
  }
  const isSome = (value: unknown) => value !== null

  return {
    get isDurable() {
      return isDurable
    },
    preferences: (id) =>
      read(
        () => durable.preferences(id),
        () => fallback.preferences(id),
        isSome,
      ),
    async keepPreferences(id, chosen) {
      await fallback.keepPreferences(id, chosen)
      await durable.keepPreferences(id, chosen).catch(() => undefined)
    },
    latestAttempt: async (id, classId) =>
      // One that storage refused is newer than any that it has.
      [...owedAttempts.values()].findLast(
        (one) => one.membershipId === id && one.scheduledClassId === classId,
      ) ??
      read(
        () => durable.latestAttempt(id, classId),
        () => fallback.latestAttempt(id, classId),
        isSome,
      ),
    attempt: (id) =>
      read(
        () => durable.attempt(id),
        () => fallback.attempt(id),
        isSome,
      ),
    async keepAttempt(attempt) {
      await fallback.keepAttempt(attempt)
      owedAttempts.set(attempt.attemptId, attempt)
      await write()
    },
    async events(id) {
      const here = await fallback.events(id)
      const kept = await durable.events(id).catch(() => {
        isDurable = false
        return []
      })
      const known = new Set(kept.map((one) => one.event.id))
      return [...kept, ...here.filter((one) => !known.has(one.event.id))]
    },
    async keepEvents(events) {
      await fallback.keepEvents(events)
      for (const one of events) owedEvents.set(one.event.id, one)
      await write()
    },
    alive: (id) =>
      read(
        () => durable.alive(id),
        () => fallback.alive(id),
        isSome,
      ),
    async keepAlive(alive) {
      await fallback.keepAlive(alive)
      await durable.keepAlive(alive).catch(() => undefined)
    },
    async unsent(id) {
      const here = await fallback.unsent(id)
      const kept = await durable.unsent(id).catch(() => {
        isDurable = false
        return []
      })
      const all = new Map(kept.map((one) => [one.attempt.attemptId, one]))
      for (const one of here) {
        const known = all.get(one.attempt.attemptId)
        const ids = new Set(known?.events.map((event) => event.id))
        const events = [
          ...(known?.events ?? []),
          ...one.events.filter((event) => !ids.has(event.id)),
        ]
        all.set(one.attempt.attemptId, { attempt: one.attempt, events })
      }
      return [...all.values()]
        .map(({ attempt, events }) => ({
          attempt,
          events: events
            .filter((event) => !sent.has(event.id))
            .sort((one, other) => one.seq - other.seq),
        }))
        .filter((one) => one.events.length > 0)
    },
    async markSent(attemptId, ids) {
      for (const id of ids) sent.add(id)
      await fallback.markSent(attemptId, ids)
      await durable.markSent(attemptId, ids).catch(() => undefined)
    },
  }
}

/** The browser's memory for the player. */
export function browserMemory(): PlayerMemory {
  return safeMemory(typeof indexedDB === 'undefined' ? volatileMemory() : indexedMemory())
}
