/**
 * Wakes about every 50 ms. In a worker, since hidden tabs slow the page's own timers to one a second and
 * then one a minute; on the page itself where a worker is refused.
 */
const EVERY_MS = 50

/** Returns the way to end it. */
export function startTicker(wake: () => void): () => void {
  const onPage = () => {
    const timer = setInterval(wake, EVERY_MS)
    return () => clearInterval(timer)
  }
  if (typeof Worker === 'undefined' || typeof Blob === 'undefined') return onPage()
  try {
    const source = `setInterval(() => postMessage(0), ${EVERY_MS})`
    const address = URL.createObjectURL(new Blob([source], { type: 'text/javascript' }))
    const worker = new Worker(address)
    let end = () => worker.terminate()
    worker.onmessage = wake
    // Refused by the page's own policy, for one.
    worker.onerror = () => {
      worker.terminate()
      end = onPage()
    }
    return () => {
      end()
      URL.revokeObjectURL(address)
    }
  } catch {
    return onPage()
  }
}
