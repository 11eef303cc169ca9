/** One tab plays an attempt. A web lock where there are any, word over a channel else. */
import type { Claim, ClaimPort } from './ports'

const nameOf = (attemptId: string) => `floorside-attempt-${attemptId}`
/** How long another tab has to say that it plays the attempt, or to be gone. */
const ANSWER_MS = 250

type Word = { type: 'mine?' | 'mine' | 'take'; tab: string }

/** By the browser's locks: the second one waits for nobody, a taken one is told. */
export function lockClaims(locks: Pick<LockManager, 'request'>): ClaimPort {
  const once: ClaimPort['claim'] = (attemptId, take, lost) =>
    new Promise((resolve) => {
      let isReleased = false
      locks
        .request(
          nameOf(attemptId),
          take ? { steal: true } : { ifAvailable: true },
          (lock): Promise<void> | undefined => {
            if (!lock) {
              resolve(null)
              return undefined
            }
            return new Promise<void>((release) =>
              resolve({
                release() {
                  isReleased = true
                  release()
                },
              }),
            )
          },
        )
        // A stolen lock rejects the request of its former holder.
        .catch(() => {
          if (!isReleased) lost()
          resolve(null)
        })
    })
  return {
    async claim(attemptId, take, lost) {
      const first = await once(attemptId, take, lost)
      if (first) return first
      // A page that is just being left, as at a reload, gives its lock back a moment later.
      await new Promise((resolve) => setTimeout(resolve, ANSWER_MS))
      return once(attemptId, take, lost)
    },
  }
}

/** By asking over a channel: plain-http addresses have no locks. */
export function channelClaims(open: (name: string) => BroadcastChannel): ClaimPort {
  return {
    async claim(attemptId, take, lost) {
      const tab = Math.random().toString(36).slice(2)
      const channel = open(nameOf(attemptId))
      const say = (type: Word['type']) => channel.postMessage({ type, tab } satisfies Word)
      let isHeld = false
      const held = await new Promise<boolean>((resolve) => {
        channel.onmessage = ({ data }: MessageEvent<Word>) => {
          if (data.type === 'mine' && !isHeld && !take) resolve(true)
          else if (data.type === 'mine?' && isHeld) say('mine')
          else if (data.type === 'take' && isHeld) {
            isHeld = false
            channel.close()
            lost()
          }
        }
        if (take) {
          say('take')
          resolve(false)
        } else {
          say('mine?')
          setTimeout(() => resolve(false), ANSWER_MS)
        }
      })
      if (held) {
        channel.close()
        return null
      }
      isHeld = true
      const claim: Claim = {
        release() {
          isHeld = false
          channel.close()
        },
      }
      return claim
    },
  }
}

export function browserClaims(): ClaimPort {
  if (typeof navigator !== 'undefined' && navigator.locks) return lockClaims(navigator.locks)
  if (typeof BroadcastChannel !== 'undefined') {
    return channelClaims((name) => new BroadcastChannel(name))
  }
  return { claim: async () => ({ release: () => undefined }) }
}
