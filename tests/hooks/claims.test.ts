import { describe, expect, it, vi } from 'vitest'
import { channelClaims, lockClaims } from '@/hooks/player/claims'
import type { ClaimPort } from '@/hooks/player/ports'

/** The Web Locks API as far as one exclusive lock by name goes (w3c.github.io/web-locks). */
function fakeLocks(): Pick<LockManager, 'request'> {
  const held = new Map<string, (reason: unknown) => void>()
  const request = async (
    name: string,
    options: LockOptions,
    work: (lock: Lock | null) => unknown,
  ): Promise<unknown> => {
    if (options.steal) held.get(name)?.(new DOMException('Stolen', 'AbortError'))
    else if (held.has(name)) return work(null)
    return new Promise((resolve, reject) => {
      held.set(name, reject)
      Promise.resolve(work({ name, mode: 'exclusive' })).then((value) => {
        if (held.get(name) === reject) held.delete(name)
        resolve(value)
      }, reject)
    })
  }
  return { request: request as LockManager['request'] }
}

function fakeChannels() {
  const open = new Set<{ name: string; tell(data: unknown): void }>()
  return (name: string) => {
    const channel = {
      name,
      onmessage: null as ((event: { data: unknown }) => void) | null,
      tell(data: unknown) {
        queueMicrotask(() => channel.onmessage?.({ data }))
      },
      postMessage(data: unknown) {
        for (const other of open) if (other !== channel && other.name === name) other.tell(data)
      },
      close: () => void open.delete(channel),
    }
    open.add(channel)
    return channel as unknown as BroadcastChannel
  }
}

describe.each([
  ['web locks', () => fakeLockPorts()],
  ['a channel, where there are no locks', () => fakeChannelPorts()],
])('one attempt is played by one tab, by %s', (_, ports) => {
  it('the second is told, until the first lets go', async () => {
    const [first, second] = ports()
    const held = await first.claim('a', false, vi.fn())
    expect(held).not.toBeNull()
    expect(await second.claim('a', false, vi.fn())).toBeNull()
    expect(await second.claim('b', false, vi.fn())).not.toBeNull()
    held?.release()
    expect(await second.claim('a', false, vi.fn())).not.toBeNull()
  })

  it('a tab that takes over gets it, and the first is told', async () => {
    const [first, second] = ports()
    const lost = vi.fn()
    await first.claim('a', false, lost)
    expect(await second.claim('a', true, vi.fn())).not.toBeNull()
    await vi.waitFor(() => expect(lost).toHaveBeenCalledTimes(1))
    expect(await first.claim('a', false, vi.fn())).toBeNull()
  })

  it('letting go is not losing', async () => {
    const [first, second] = ports()
    const lost = vi.fn()
    const held = await first.claim('a', false, lost)
    held?.release()
    await second.claim('a', true, vi.fn())
    expect(lost).not.toHaveBeenCalled()
  })
})

it('a page that is just being left does not make its own reload a second tab', async () => {
  const [leaving, reloaded] = fakeLockPorts()
  const held = await leaving.claim('a', false, vi.fn())
  setTimeout(() => held?.release(), 100)
  expect(await reloaded.claim('a', false, vi.fn())).not.toBeNull()
})

function fakeLockPorts(): [ClaimPort, ClaimPort] {
  const locks = fakeLocks()
  return [lockClaims(locks), lockClaims(locks)]
}

function fakeChannelPorts(): [ClaimPort, ClaimPort] {
  const open = fakeChannels()
  return [channelClaims(open), channelClaims(open)]
}
