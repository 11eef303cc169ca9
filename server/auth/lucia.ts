import 'server-only'
/** lucia over our tables. Its session id is the SHA-256 of the token in the cookie: the token itself is nowhere kept. */
import { createHash, randomBytes } from 'node:crypto'
import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle'
import { eq } from 'drizzle-orm'
import { Lucia, TimeSpan } from 'lucia'
import { database } from '@/db/client'
import { timed } from '@/db/deadline'
import { people } from '@/db/schema/people'
import { signInSessions } from '@/db/schema/sign-in-sessions'

/** Without use for this long, a session ends. lucia lengthens it from half of that on. */
const IDLE_DAYS = 14
/** However much it is used, it ends after this. */
export const ABSOLUTE_DAYS = 30
const DAY_MS = 86_400_000

interface SessionColumns {
  gymId: string | null
  absoluteExpiresAt: Date
  userAgent: string
}

function makeLucia() {
  return new Lucia(new DrizzlePostgreSQLAdapter(database(), signInSessions, people), {
    sessionExpiresIn: new TimeSpan(IDLE_DAYS, 'd'),
    getSessionAttributes: (columns) => ({
      gymId: columns.gymId,
      absoluteExpiresAt: columns.absoluteExpiresAt,
    }),
  })
}
let made: ReturnType<typeof makeLucia> | null = null
const lucia = () => (made ??= makeLucia())

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof makeLucia>
    DatabaseSessionAttributes: SessionColumns
  }
}

export interface SignedIn {
  sessionId: string
  personId: string
  gymId: string | null
}

export function digestOf(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}

/** Starts a session for a person. Resolves with the token for the cookie: the only time that it is seen. */
export const startSession = timed(
  async (
    personId: string,
    more: { gymId: string | null; userAgent: string; now?: Date },
  ): Promise<string> => {
    const token = randomBytes(32).toString('base64url')
    const now = more.now ?? new Date()
    await lucia().deleteExpiredSessions()
    await lucia().createSession(
      personId,
      {
        gymId: more.gymId,
        absoluteExpiresAt: new Date(now.getTime() + ABSOLUTE_DAYS * DAY_MS),
        userAgent: more.userAgent.slice(0, 300),
      },
      { sessionId: digestOf(token) },
    )
    return token
  },
)

/** Who a token stands for; null where it is unknown or has ended by idling or by its absolute limit. */
export const readSession = timed(async (token: string, now?: Date): Promise<SignedIn | null> => {
  const { session } = await lucia().validateSession(digestOf(token))
  if (!session) return null
  if (session.absoluteExpiresAt.getTime() <= (now?.getTime() ?? Date.now())) {
    await lucia().invalidateSession(session.id)
    return null
  }
  return { sessionId: session.id, personId: session.userId, gymId: session.gymId }
})

export const endSession = timed((sessionId: string): Promise<void> =>
  lucia().invalidateSession(sessionId),
)

/** Ends every session of a person. */
export const endSessions = timed((personId: string): Promise<void> =>
  lucia().invalidateUserSessions(personId),
)

export const setSessionGym = timed(async (sessionId: string, gymId: string): Promise<void> => {
  await database().update(signInSessions).set({ gymId }).where(eq(signInSessions.id, sessionId))
})
