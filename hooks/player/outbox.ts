/**
 * Sends what was kept: in batches, again and again until the server says that it has them. Every event
 * has its own id, so sending twice stores once.
 */
import {
  EVENTS_PER_REQUEST,
  type RecordEventsInput,
  type RecordEventsResult,
} from '@/server/contract/attempts'
import type { ErrorBody } from '@/server/contract/errors'
import { paths } from '@/server/contract/paths'
import type { KeptAttempt, PlayerMemory } from './ports'
import type { PlayerState } from './types'

type Saving = PlayerState['saving']

export interface OutboxPorts {
  memory: PlayerMemory
  membershipId: string
  send: typeof fetch
  setTimer(work: () => void, ms: number): unknown
  clearTimer(timer: unknown): void
}

export interface Outbox {
  /** Sends now what waits. */
  kick(): void
  watch(tell: (saving: Saving) => void): () => void
  close(): void
}

const FIRST_RETRY_MS = 1_000
const LONGEST_RETRY_MS = 30_000
/** A request that outlives the page may carry 64 KiB. */
const KEEPALIVE_BYTES = 60_000
const REQUEST_MS = 15_000

/** The server will not take these however often they are sent. */
class Refused extends Error {}

export function createOutbox(ports: OutboxPorts): Outbox {
  const { memory, membershipId } = ports
  const watchers = new Set<(saving: Saving) => void>()
  let saving: Saving = { state: 'saved', unsent: 0, message: null }
  let isSending = false
  let isAskedAgain = false
  let retryMs = FIRST_RETRY_MS
  let timer: unknown = null
  let isClosed = false
  /** Attempts that the server refused, with its words: kept, shown, tried again at the next opening. */
  const refused = new Map<string, string>()

  const tell = (next: Saving) => {
    saving = next
    watchers.forEach((watcher) => watcher(next))
  }

  async function sendBatch(
    attempt: KeptAttempt,
    events: RecordEventsInput['events'],
  ): Promise<string[]> {
    const input: RecordEventsInput = {
      scheduledClassId: attempt.scheduledClassId,
      versionId: attempt.versionId,
      todayNote: attempt.todayNote,
      events,
    }
    const body = JSON.stringify(input)
    const answer = await ports.send(paths.api.attemptEvents(attempt.attemptId), {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body,
      keepalive: body.length < KEEPALIVE_BYTES,
      signal: AbortSignal.timeout(REQUEST_MS),
    })
    if (answer.ok) return ((await answer.json()) as RecordEventsResult).stored
    const said = ((await answer.json().catch(() => null)) as ErrorBody | null)?.error.message
    const comesBack = [401, 408, 425, 429].includes(answer.status) || answer.status >= 500
    if (comesBack) {
      throw new Error(answer.status === 401 ? 'sign in again to send; nothing is lost' : '')
    }
    throw new Refused(said ?? `The server did not take it (${answer.status}).`)
  }

  async function sendAll(): Promise<void> {
    const waiting = await memory.unsent(membershipId)
    let unsent = waiting.reduce((sum, one) => sum + one.events.length, 0)
    if (unsent === 0) {
      tell({ state: 'saved', unsent: 0, message: null })
      return
    }
    tell({ state: 'sending', unsent, message: null })
    for (const { attempt, events } of waiting) {
      if (refused.has(attempt.attemptId)) continue
      for (let from = 0; from < events.length; from += EVENTS_PER_REQUEST) {
        const part = events.slice(from, from + EVENTS_PER_REQUEST)
        try {
          const stored = await sendBatch(attempt, part)
          await memory.markSent(attempt.attemptId, stored)
          unsent -= stored.length
        } catch (error) {
          if (!(error instanceof Refused)) throw error
          refused.set(attempt.attemptId, error.message)
          break
        }
      }
    }
    const [message = null] = refused.values()
    tell(
      unsent > 0
        ? { state: 'saved-here', unsent, message }
        : { state: 'saved', unsent: 0, message: null },
    )
  }

  function kick(): void {
    if (isClosed) return
    if (isSending) {
      isAskedAgain = true
      return
    }
    isSending = true
    ports.clearTimer(timer)
    timer = null
    sendAll()
      .then(
        () => {
          retryMs = FIRST_RETRY_MS
        },
        async (error: unknown) => {
          const waiting = await memory.unsent(membershipId).catch(() => [])
          const message =
            error instanceof Error && error.message.startsWith('sign in') ? error.message : null
          tell({
            state: 'saved-here',
            unsent: waiting.reduce((sum, one) => sum + one.events.length, 0),
            message,
          })
          timer = ports.setTimer(kick, retryMs)
          retryMs = Math.min(LONGEST_RETRY_MS, retryMs * 2)
        },
      )
      .finally(() => {
        isSending = false
        if (isAskedAgain && !isClosed) {
          isAskedAgain = false
          kick()
        }
      })
  }

  return {
    kick,
    watch(watcher) {
      watchers.add(watcher)
      watcher(saving)
      return () => watchers.delete(watcher)
    },
    close() {
      isClosed = true
      ports.clearTimer(timer)
      watchers.clear()
    },
  }
}

/** The outbox of this browser: also kicked when the network or the page comes back. */
export function browserOutbox(memory: PlayerMemory, membershipId: string): Outbox {
  const outbox = createOutbox({
    memory,
    membershipId,
    send: (...args) => fetch(...args),
    setTimer: (work, ms) => setTimeout(work, ms),
    clearTimer: (timer) => clearTimeout(timer as number | undefined),
  })
  const onVisible = () => {
    if (document.visibilityState === 'visible') outbox.kick()
  }
  window.addEventListener('online', outbox.kick)
  document.addEventListener('visibilitychange', onVisible)
  return {
    ...outbox,
    close() {
      window.removeEventListener('online', outbox.kick)
      document.removeEventListener('visibilitychange', onVisible)
      outbox.close()
    },
  }
}
