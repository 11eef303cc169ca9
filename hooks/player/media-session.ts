/** The media key 'next' of a keyboard or a clicker, where the browser gives it to the page so. */

/** Returns the way to end it. */
export function onMediaNext(next: () => void): () => void {
  const set = (handler: (() => void) | null) => {
    try {
      navigator.mediaSession?.setActionHandler('nexttrack', handler)
    } catch {
      // Older browsers know the session and not this action.
    }
  }
  set(next)
  return () => set(null)
}
