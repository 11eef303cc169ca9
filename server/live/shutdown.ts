import 'server-only'
import { closeAllStreams } from './registry'

/**
 * No request may take longer than its five seconds of database and a little more; what is still open
 * then is a browser that keeps asking on an old connection, and would keep the process alive.
 */
const END_WITHIN_MS = 5_500

/** Open event streams are closed when the process is told to end, so that it can; and it does, in time. */
export function closeStreamsAtTheEnd(): void {
  for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const) {
    process.once(signal, () => {
      closeAllStreams()
      setTimeout(() => process.exit(0), END_WITHIN_MS).unref()
    })
  }
}
