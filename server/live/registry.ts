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

/** Keeps `close` to be called at the end; returns the way to forget it. Called at once where the end has come. */
export function registerStream(close: () => void): () => void {
  const { streams, closing } = registry()
  if (closing) close()
  else streams.add(close)
  return () => streams.delete(close)
}

export function closeAllStreams(): void {
  const now = registry()
  now.closing = true
  for (const close of now.streams) close()
  now.streams.clear()
}

export function openStreams(): number {
  return registry().streams.size
}
