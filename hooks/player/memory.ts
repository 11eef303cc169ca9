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

/** IndexedDB with its connection opened again where the browser cut it; rejects where nothing can be kept. */
export function indexedMemory(): PlayerMemory {
  let opening: Promise<IDBPDatabase<Schema>> | null = null
  const open = () => (opening ??= openOnce())

  async function withDb<T>(work: (db: IDBPDatabase<Schema>) => Promise<T>): Promise<T> {
    try {
      return await work(await open())
    } catch (error) {
      // Some browsers cut the connections of hidden tabs: once more on a fresh one.
      const isCut = error instanceof DOMException && error.name === 'InvalidStateError'
      opening = null
      if (!isCut) throw error
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
        await forgetOld(db, attempt.startedWallMs)
      }),
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
        for (const kept of events) {
          void transaction.store.put({
            ...kept,
            id: kept.event.id,
            ...(kept.sent ? {} : { unsentOf: kept.membershipId }),
          })
        }
        await transaction.done
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
        for (const id of ids) {
          const kept = await transaction.store.get([attemptId, id])
          if (!kept) continue
          const { unsentOf: _waiting, ...rest } = kept
          void transaction.store.put({ ...rest, sent: true })
        }
        await transaction.done
      }),
  }
}

async function forgetOld(db: IDBPDatabase<Schema>, nowMs: number): Promise<void> {
  for (const attempt of await db.getAll('attempts')) {
    if (nowMs - attempt.startedWallMs < FORGET_AFTER_MS) continue
    const events = await db.getAllFromIndex('events', 'attempt', attempt.attemptId)
    if (events.some((event) => !event.sent)) continue
    const transaction = db.transaction(['attempts', 'events', 'alive'], 'readwrite')
    for (const event of events) {
      void transaction.objectStore('events').delete([event.attemptId, event.id])
    }
    void transaction.objectStore('attempts').delete(attempt.attemptId)
    void transaction.objectStore('alive').delete(attempt.attemptId)
    await transaction.done
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
 * `durable` while it keeps what it is given, memory from the first write that it refuses (storage full
 * or forbidden): nothing is lost while the page is open, and the store says that it is not kept.
 */
export function safeMemory(durable: PlayerMemory, fallback = volatileMemory()): PlayerMemory {
  let isDurable = true
  const write = async (kept: () => Promise<void>, instead: () => Promise<void>): Promise<void> => {
    // Also in memory, so that a later refusal finds all of it there.
    await instead()
    if (!isDurable) return
    try {
      await kept()
    } catch {
      isDurable = false
    }
  }
  const read = async <T>(kept: () => Promise<T>, instead: () => Promise<T>): Promise<T> => {
    if (!isDurable) return instead()
    try {
      return await kept()
    } catch {
      isDurable = false
      return instead()
    }
  }
  return {
    get isDurable() {
      return isDurable
    },
    preferences: (id) =>
      read(
        () => durable.preferences(id),
        () => fallback.preferences(id),
      ),
    keepPreferences: (id, chosen) =>
      write(
        () => durable.keepPreferences(id, chosen),
        () => fallback.keepPreferences(id, chosen),
      ),
    latestAttempt: (id, classId) =>
      read(
        () => durable.latestAttempt(id, classId),
        () => fallback.latestAttempt(id, classId),
      ),
    keepAttempt: (attempt) =>
      write(
        () => durable.keepAttempt(attempt),
        () => fallback.keepAttempt(attempt),
      ),
    events: (id) =>
      read(
        () => durable.events(id),
        () => fallback.events(id),
      ),
    keepEvents: (events) =>
      write(
        () => durable.keepEvents(events),
        () => fallback.keepEvents(events),
      ),
    alive: (id) =>
      read(
        () => durable.alive(id),
        () => fallback.alive(id),
      ),
    keepAlive: (alive) =>
      write(
        () => durable.keepAlive(alive),
        () => fallback.keepAlive(alive),
      ),
    unsent: (id) =>
      read(
        () => durable.unsent(id),
        () => fallback.unsent(id),
      ),
    markSent: (id, ids) =>
      write(
        () => durable.markSent(id, ids),
        () => fallback.markSent(id, ids),
      ),
  }
}

/** The browser's memory for the player. */
export function browserMemory(): PlayerMemory {
  return typeof indexedDB === 'undefined'
    ? safeMemory(volatileMemory())
    : safeMemory(indexedMemory())
}
