/** Keeps the screen awake in class. Lost at every hide, so it is asked for again; absent on plain http. */
export function browserWakeLock(): (on: boolean) => void {
  let isWanted = false
  let isAsking = false
  let lock: WakeLockSentinel | null = null
  const ask = () => {
    if (!isWanted || lock || isAsking || document.visibilityState !== 'visible') return
    if (!navigator.wakeLock) return
    isAsking = true
    navigator.wakeLock
      .request('screen')
      .then((got) => {
        lock = got
        got.addEventListener('release', () => {
          lock = null
        })
        if (!isWanted) void got.release()
      })
      // Refused on a low battery, for one: the next key asks again.
      .catch(() => undefined)
      .finally(() => {
        isAsking = false
      })
  }
  return (on) => {
    if (on === isWanted) return
    isWanted = on
    if (on) {
      document.addEventListener('visibilitychange', ask)
      document.addEventListener('keydown', ask)
      document.addEventListener('pointerdown', ask)
      ask()
    } else {
      document.removeEventListener('visibilitychange', ask)
      document.removeEventListener('keydown', ask)
      document.removeEventListener('pointerdown', ask)
      lock?.release().catch(() => undefined)
    }
  }
}
