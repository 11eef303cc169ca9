import 'server-only'
import { hash, verify } from '@node-rs/argon2'
import { ARGON2ID } from '@/server/contract/passwords'

/** Hashes run on threads of their own; more at once would only queue for the same cores and 19 MiB each. */
const AT_ONCE = 4
let running = 0
const waiting: (() => void)[] = []

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  while (running >= AT_ONCE) await new Promise<void>((resolve) => waiting.push(resolve))
  running += 1
  try {
    return await work()
  } finally {
    running -= 1
    waiting.shift()?.()
  }
}

/** argon2id of a password, as a PHC string. */
export function hashPassword(password: string): Promise<string> {
  return inTurn(() => hash(password, ARGON2ID))
}

let dummyHash: Promise<string> | null = null

/**
 * Whether `password` belongs to `passwordHash`. Without a hash (no such account) the same work is done
 * against a dummy, so that the answer takes the same time.
 */
export async function verifyPassword(
  passwordHash: string | null,
  password: string,
): Promise<boolean> {
  dummyHash ??= hashPassword('no account has this password')
  const against = passwordHash ?? (await dummyHash)
  const matches = await inTurn(() => verify(against, password))
  return passwordHash !== null && matches
}
