import 'server-only'
import { hash, verify } from '@node-rs/argon2'
import { AppError } from '@/server/contract/errors'
import { ARGON2ID } from '@/server/contract/passwords'

/** Hashes run on threads of their own; more at once would only queue for the same cores and 19 MiB each. */
const AT_ONCE = 4
/** About three seconds of hashing: whoever comes after would wait longer than a database may take. */
const MOST_WAITING = 400
let running = 0
const waiting: (() => void)[] = []

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (waiting.length >= MOST_WAITING) {
    throw new AppError('unavailable', 'Too many are signing in at once. Try again in a moment.')
  }
  while (running >= AT_ONCE) await new Promise<void>((resolve) => waiting.push(resolve))
  running += 1
  try {
    return await work()
  } finally {
    running -= 1
    waiting.shift()?.()
  }
}

/** One text for what looks the same: keyboards differ in how they compose 'é' (NIST SP 800-63B, 5.1.1.2). */
const normal = (password: string) => password.normalize('NFKC')

/** argon2id of a password, as a PHC string. */
export function hashPassword(password: string): Promise<string> {
  return inTurn(() => hash(normal(password), ARGON2ID))
}

/** Of a random password that nobody has; with the figures of `ARGON2ID`, so that it takes as long. */
const NOBODYS_HASH =
  '$argon2id$v=19$m=19456,t=2,p=1$vZQ/x0nUTt51oHVctTUVPA$Sf0vN5lXynSMgqBw4LqJ78LDla8eIPKBGjTSBOg1Hwc'

/**
 * Whether `password` belongs to `passwordHash`. Without a hash (no such account) the same work is done
 * against nobody's, so that the answer takes the same time.
 */
export async function verifyPassword(
  passwordHash: string | null,
  password: string,
): Promise<boolean> {
  const matches = await inTurn(() => verify(passwordHash ?? NOBODYS_HASH, normal(password)))
  return passwordHash !== null && matches
}
