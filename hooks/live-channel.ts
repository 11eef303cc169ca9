/**
 * One event stream a browser, whatever the number of tabs: the tab that holds a lock keeps the stream
 * and passes on what it hears; the others listen to it. Browsers allow six connections to an address,
 * and a stream a tab would leave the sixth tab's requests hanging.
 */
import type { LiveBoardChange } from '@/server/contract/board'
import { paths } from '@/server/contract/paths'

export type LiveState = 'connecting' | 'live' | 'lost'

type Message =
  | { type: 'want'; tab: string; boards: string[] }
  | { type: 'change'; change: LiveBoardChange }
  | { type: 'state'; state: LiveState }
  | { type: 'who-wants' }

export interface LiveListener {
  onChange(change: LiveBoardChange): void
  onState(state: LiveState): void
}

export interface LivePorts {
  locks: Pick<LockManager, 'request'> | null
  channel: () => BroadcastChannel | null
  source: (address: string) => EventSource
}

const LOCK = 'floorside-live'

export function browserLivePorts(): LivePorts {
  return {
    locks: typeof navigator !== 'undefined' && 'locks' in navigator ? navigator.locks : null,
    channel: () =>
      typeof BroadcastChannel === 'undefined' ? null : new BroadcastChannel('floorside-live'),
    source: (address) => new EventSource(address),
  }
}

/**
 * Listens for changes of one board. Returns the way to end it. Without locks (a plain-http address on
 * the local network) the state stays 'lost' and the reader polls instead.
 */
export function listenToBoard(
  boardId: string,
  listener: LiveListener,
  ports: LivePorts = browserLivePorts(),
): () => void {
  const tab = Math.random().toString(36).slice(2)
  const channel = ports.channel()
  const wanted = new Map<string, string[]>([[tab, [boardId]]])
  const over = new AbortController()
  let source: EventSource | null = null
  let leading = false
  let state: LiveState = 'connecting'

  const tell = (next: LiveState) => {
    state = next
    listener.onState(next)
    if (leading) channel?.postMessage({ type: 'state', state: next } satisfies Message)
  }
  const boards = () => [...new Set([...wanted.values()].flat())].sort()
  const open = () => {
    source?.close()
    const opened = ports.source(paths.api.live(boards()))
    source = opened
    opened.onopen = () => tell('live')
    // EventSource tries again by itself unless the server refused; then try afresh.
    opened.onerror = () => {
      tell('lost')
      if (opened.readyState === 2 && !over.signal.aborted) {
        setTimeout(() => {
          if (source === opened && !over.signal.aborted) open()
        }, 5_000)
      }
    }
    opened.addEventListener('board', (event) => {
      const change = JSON.parse((event as MessageEvent<string>).data) as LiveBoardChange
      if (change.scheduledClassId === boardId) listener.onChange(change)
      channel?.postMessage({ type: 'change', change } satisfies Message)
    })
  }

  if (channel) {
    channel.onmessage = ({ data }: MessageEvent<Message>) => {
      if (data.type === 'want') {
        const before = boards().join()
        if (data.boards.length === 0) wanted.delete(data.tab)
        else wanted.set(data.tab, data.boards)
        if (leading && boards().join() !== before) open()
        else if (leading) channel.postMessage({ type: 'state', state } satisfies Message)
      } else if (data.type === 'who-wants') {
        channel.postMessage({ type: 'want', tab, boards: [boardId] } satisfies Message)
      } else if (data.type === 'change' && !leading) {
        if (data.change.scheduledClassId === boardId) listener.onChange(data.change)
      } else if (data.type === 'state' && !leading) {
        tell(data.state)
      }
    }
    channel.postMessage({ type: 'want', tab, boards: [boardId] } satisfies Message)
  }

  if (ports.locks && channel) {
    ports.locks
      .request(LOCK, { signal: over.signal }, () => {
        leading = true
        channel.postMessage({ type: 'who-wants' } satisfies Message)
        open()
        return new Promise<void>((resolve) => {
          over.signal.addEventListener('abort', () => resolve(), { once: true })
        })
      })
      .catch(() => undefined)
  } else {
    tell('lost')
  }

  return () => {
    channel?.postMessage({ type: 'want', tab, boards: [] } satisfies Message)
    over.abort()
    source?.close()
    channel?.close()
  }
}
