import 'server-only'
/** Who is asking, and whether they may be where they are. Pages, actions and handlers all begin here. */
import { and, asc, eq, isNull } from 'drizzle-orm'
import { notFound, redirect } from 'next/navigation'
import { cache } from 'react'
import { database, type DbOrTx } from '@/db/client'
import { timed } from '@/db/deadline'
import { gyms } from '@/db/schema/gyms'
import { memberships } from '@/db/schema/memberships'
import { people } from '@/db/schema/people'
import { AppError } from '@/server/contract/errors'
import { paths } from '@/server/contract/paths'
import type { Role, Viewer } from '@/server/contract/viewer'
import { readSessionCookie } from './cookie'
import { readSession } from './lucia'

/** A session with the person and gym that it stands for. */
export interface Session {
  sessionId: string
  viewer: Viewer
}

/** The person as a viewer of the gym they stand in, or of their first; null without an active membership. */
export const viewerOf = timed(
  async (db: DbOrTx, personId: string, gymId: string | null): Promise<Viewer | null> => {
    const rows = await db
      .select({
        membershipId: memberships.id,
        gymId: gyms.id,
        roles: memberships.roles,
        gymName: gyms.name,
        place: gyms.place,
        timeZone: gyms.timeZone,
        name: people.name,
        email: people.email,
      })
      .from(memberships)
      .innerJoin(gyms, eq(gyms.id, memberships.gymId))
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(and(eq(memberships.personId, personId), isNull(memberships.deactivatedAt)))
      .orderBy(asc(gyms.name))
    const here = rows.find((row) => row.gymId === gymId) ?? rows[0]
    if (!here) return null
    return {
      personId,
      membershipId: here.membershipId,
      gymId: here.gymId,
      roles: here.roles,
      name: here.name,
      email: here.email,
      gym: { name: here.gymName, place: here.place, timeZone: here.timeZone },
      gyms: rows.map((row) => ({ gymId: row.gymId, name: row.gymName })),
    }
  },
)

/** The session that a token stands for; null where it has ended or the person is active in no gym. */
export async function sessionOf(token: string | null): Promise<Session | null> {
  if (!token) return null
  const signedIn = await readSession(token)
  if (!signedIn) return null
  const viewer = await viewerOf(database(), signedIn.personId, signedIn.gymId)
  return viewer ? { sessionId: signedIn.sessionId, viewer } : null
}

/** Once a request. */
export const currentSession = cache(async () => sessionOf(await readSessionCookie()))

export async function currentViewer(): Promise<Viewer | null> {
  return (await currentSession())?.viewer ?? null
}

/** For pages. Signed out: to sign-in, and back to `here` after it. */
export async function requireViewer(here: string): Promise<Viewer> {
  return (await currentViewer()) ?? redirect(paths.signIn(here))
}

/** For pages. Somebody without one of the roles gets 'not found'. */
export async function requireRole(here: string, ...roles: Role[]): Promise<Viewer> {
  const viewer = await requireViewer(here)
  return viewer.roles.some((role) => roles.includes(role)) ? viewer : notFound()
}

/** For actions and handlers: an error instead of a redirect. */
export async function sessionOrThrow(): Promise<Session> {
  const session = await currentSession()
  if (!session) {
    throw new AppError('signed-out', 'You are signed out. Sign in again; nothing is lost.')
  }
  return session
}

/** Where a role's work is. */
export function landingPath(viewer: Viewer): string {
  if (viewer.roles.includes('coach')) return paths.board()
  if (viewer.roles.includes('member')) return paths.today()
  return paths.gym()
}

/** For pages: what a data function refuses as `not-found` becomes the page's own 404. */
export async function orNotFound<T>(reading: Promise<T>): Promise<T> {
  try {
    return await reading
  } catch (error) {
    if (error instanceof AppError && error.code === 'not-found') notFound()
    throw error
  }
}
