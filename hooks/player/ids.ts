import { v7, validate } from 'uuid'

/** UUIDv7 (RFC 9562); needs only getRandomValues, which plain-http addresses have too. */
export function newId(): string {
  return v7()
}

const DEVICE_KEY = 'floorside-device'

/** A name for this browser, kept as long as it keeps anything. */
export function deviceId(storage: Pick<Storage, 'getItem' | 'setItem'> | null): string {
  try {
    const known = storage?.getItem(DEVICE_KEY)
    if (known && validate(known)) return known
    const made = v7()
    storage?.setItem(DEVICE_KEY, made)
    return made
  } catch {
    return v7()
  }
}
