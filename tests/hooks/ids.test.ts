import { describe, expect, it } from 'vitest'
import { deviceId, newId } from '@/hooks/player/ids'
import { uuidV7Schema } from '@/server/contract/attempts'

const bits = (id: string) => BigInt(`0x${id.replaceAll('-', '')}`)
/** RFC 9562 (May 2024), section 5.7: unix_ts_ms 48, ver 4, rand_a 12, var 2, rand_b 62. */
const unixMs = (id: string) => Number(bits(id) >> 80n)
const version = (id: string) => Number((bits(id) >> 76n) & 0xfn)
const variant = (id: string) => Number((bits(id) >> 62n) & 0b11n)

describe('ids of events', () => {
  it('are laid out as RFC 9562 says, which is read here as its test vector (appendix A.6) is', () => {
    const vector = '017F22E2-79B0-7CC3-98C4-DC0C0C07398F'
    expect([unixMs(vector), version(vector), variant(vector)]).toEqual([1_645_557_742_000, 7, 2])
    const before = Date.now()
    const id = newId()
    expect(version(id)).toBe(7)
    expect(variant(id)).toBe(2)
    expect(unixMs(id)).toBeGreaterThanOrEqual(before)
    expect(unixMs(id)).toBeLessThanOrEqual(Date.now() + 1)
    expect(uuidV7Schema.safeParse(id).success).toBe(true)
    expect(uuidV7Schema.safeParse(vector).success).toBe(true)
  })

  it('rise also within a millisecond, and none comes twice', () => {
    const ids = Array.from({ length: 5_000 }, newId)
    expect([...ids].sort()).toEqual(ids)
    expect(new Set(ids).size).toBe(ids.length)
  })

  it('need no crypto.randomUUID, which plain-http addresses lack', () => {
    const original = crypto.randomUUID
    Object.defineProperty(crypto, 'randomUUID', { value: undefined, configurable: true })
    expect(version(newId())).toBe(7)
    Object.defineProperty(crypto, 'randomUUID', { value: original, configurable: true })
  })
})

describe('the name of this browser', () => {
  it('stays as long as the browser keeps anything', () => {
    const kept = new Map<string, string>()
    const storage = {
      getItem: (key: string) => kept.get(key) ?? null,
      setItem: (key: string, value: string) => void kept.set(key, value),
    }
    expect(deviceId(storage)).toBe(deviceId(storage))
  })

  it('is there where storage is refused or holds something else', () => {
    const refusing = {
      getItem: () => {
        throw new DOMException('no', 'SecurityError')
      },
      setItem: () => undefined,
    }
    expect(version(deviceId(refusing))).toBe(7)
    expect(version(deviceId(null))).toBe(7)
    expect(version(deviceId({ getItem: () => 'x', setItem: () => undefined }))).toBe(7)
  })
})
