/**
 * Sends what was kept: in batches, again and again until the server says that it has them. Every event
 * has its own id, so sending twice stores once.
 */
import type { RecordEventsInput, RecordEventsResult } from '@/server/contract/attempts'
import { EVENTS_PER_REQUEST } from '@/server/contract/batch'
import type { ErrorBody } from '@/server/contract/errors'
import { paths } from '@/server/contract/paths'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { KeptAttempt, PlayerMemory, PlayerPorts } from './ports'
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
  watch: PlayerPorts['watchOutbox']
  watchSeq: PlayerPorts['watchSeq']
  close(): void
}

const FIRST_RETRY_MS = 1_000
const LONGEST_RETRY_MS = 30_000
/** A request that outlives the page may carry 64 KiB. */
const KEEPALIVE_BYTES = 60_000
const REQUEST_MS = 15_000

/** It may be taken later. `message` is for the member where they can do something about it. */
class NotNow extends Error {}
/** The server will not take these however often they are sent. */
class Refused extends Error {
  /** Perhaps only some of a batch are at fault. */
  readonly isAboutContent: boolean
  constructor(message: string, isAboutContent: boolean) {
    super(message)
    this.isAboutContent = isAboutContent
  }
}

export function createOutbox(ports: OutboxPorts): Outbox {
  const { memory, membershipId } = ports
  const watchers = new Set<(saving: Saving) => void>()
  const seqWatchers = new Set<(attemptId: string, highestSeq: number) => void>()
  let saving: Saving = { state: 'saved', unsent: 0, message: null }
  let isSending = false
  let isAskedAgain = false
  let retryMs = FIRST_RETRY_MS
  let timer: unknown = null
  let isClosed = false
  /** Events that the server refused, with its words: kept, shown, tried again at the next opening. */
  const refused = new Map<string, string>()

  const tell = (next: Saving) => {
    saving = next
    watchers.forEach((watcher) => watcher(next))
  }

  /** The ids that the server has. Throws NotNow or Refused, or what the network throws. */
  async function post(attempt: KeptAttempt, events: ClassEvent[]): Promise<string[]> {
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
      keepalive: new TextEncoder().encode(body).length < KEEPALIVE_BYTES,
      signal: AbortSignal.timeout(REQUEST_MS),
    })
    if (answer.ok) {
      const { stored, highestSeq } = (await answer.json()) as RecordEventsResult
      seqWatchers.forEach((watcher) => watcher(attempt.attemptId, highestSeq))
      return stored
    }
    if (answer.status === 401) throw new NotNow('Sign in again to send; nothing is lost.')
    if ([408, 425, 429].includes(answer.status) || answer.status >= 500) throw new NotNow('')
    const said = ((await answer.json().catch(() => null)) as ErrorBody | null)?.error.message
    throw new Refused(
      `${said ?? `The server did not take it (${answer.status}).`} It stays on this computer.`,
      [400, 413, 422].includes(answer.status),
    )
  }

  /** One event that the server cannot read must not hold the others back: a refused batch is halved. */
  async function sendBatch(attempt: KeptAttempt, events: ClassEvent[]): Promise<void> {
    try {
      await memory.markSent(attempt.attemptId, await post(attempt, events))
    } catch (error) {
      if (!(error instanceof Refused)) throw error
      if (!error.isAboutContent || events.length === 1) {
        for (const event of events) refused.set(event.id, error.message)
        return
      }
      const middle = events.length >> 1
      await sendBatch(attempt, events.slice(0, middle))
      await sendBatch(attempt, events.slice(middle))
    }
  }

  async function waiting() {
    const kept = await memory.unsent(membershipId)
    return { kept, unsent: kept.reduce((sum, one) => sum + one.events.length, 0) }
  }

  async function sendAll(): Promise<void> {
    const { kept, unsent } = await waiting()
    if (unsent > 0) {
      tell({ state: 'sending', unsent, message: null })
      for (const { attempt, events } of kept) {
        const wanted = events.filter((event) => !refused.has(event.id))
        for (let from = 0; from < wanted.length; from += EVENTS_PER_REQUEST) {
          await sendBatch(attempt, wanted.slice(from, from + EVENTS_PER_REQUEST))
        }
      }
    }
    const left = unsent > 0 ? (await waiting()).unsent : 0
    const [message = null] = refused.values()
    tell(
      left > 0
        ? { state: 'saved-here', unsent: left, message }
        : { state: 'saved', unsent: 0, message: null },
    )
  }

  async function later(error: unknown): Promise<void> {
    const { unsent } = await waiting().catch(() => ({ unsent: saving.unsent }))
    const message = error instanceof NotNow && error.message !== '' ? error.message : null
    tell({ state: 'saved-here', unsent, message })
    if (isClosed) return
    timer = ports.setTimer(kick, retryMs)
    retryMs = Math.min(LONGEST_RETRY_MS, retryMs * 2)
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
      .then(() => {
        retryMs = FIRST_RETRY_MS
      }, later)
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
    watchSeq(watcher) {
      seqWatchers.add(watcher)
      return () => seqWatchers.delete(watcher)
    },
    close() {
      isClosed = true
      ports.clearTimer(timer)
      watchers.clear()
      seqWatchers.clear()
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
