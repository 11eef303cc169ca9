import 'server-only'
/** Every open event stream of this process: an open stream keeps the server alive for ever, so all are closed when it is told to end. */
interface Registry {
  streams: Set<() => void>
  closing: boolean
}
// Routes and instrumentation are bundled apart; they share the process.
const kept = globalThis as typeof globalThis & { floorsideStreams?: Registry }

function registry(): Registry {
  kept.floorsideStreams ??= { streams: new Set(), closing: false }
  return kept.floorsideStreams
}

/** Keeps `close` to be called at the end; returns the way to forget it. */
export function registerStream(close: () => void): () => void {
  const { streams } = registry()
  streams.add(close)
  return () => streams.delete(close)
}

/** The process has been told to end: a connection that is still open must not begin another stream. */
export function isClosing(): boolean {
  return registry().closing
}

export function closeAllStreams(): void {
  const now = registry()
  now.closing = true
  for (const close of now.streams) close()
  now.streams.clear()
}
