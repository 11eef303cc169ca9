import 'server-only'
import { closeAllStreams } from './registry'

/** Open event streams are closed when the process is told to end, so that it can. */
export function closeStreamsAtTheEnd(): void {
  for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const)
    process.once(signal, closeAllStreams)
}
