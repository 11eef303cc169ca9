'use server'
/** Sign-in, sign-out, password, gym. */
import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { networkAddress } from '@/server/auth/address'
import { clearSessionCookie, readSessionCookie, writeSessionCookie } from '@/server/auth/cookie'
import { digestOf, endSession, endSessions, setSessionGym, startSession } from '@/server/auth/lucia'
import { checkActionOrigin } from '@/server/auth/origin'
import { hashPassword } from '@/server/auth/passwords'
import { checkSignIn } from '@/server/auth/sign-in'
import { currentSession, sessionOrThrow } from '@/server/auth/viewer'
import { AppError, type ActionResult } from '@/server/contract/errors'
import { changePasswordInput, fieldMessages, safeNext, signInInput } from '@/server/contract/forms'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { changeOwnPassword } from '@/server/data/people'
import { outcome } from './outcome'

const userAgent = async () => (await headers()).get('user-agent') ?? ''

/** Fields `email`, `password`, `next`. Redirects where it succeeds. */
export async function signIn(_before: ActionResult | null, form: FormData): Promise<ActionResult> {
  const parsed = signInInput.safeParse(Object.fromEntries(form))
  if (!parsed.success) {
    return { ok: false, message: 'Both are needed.', fields: fieldMessages(parsed.error) }
  }
  const { email, password, next } = parsed.data
  const done = await outcome('signIn', async () => {
    const address = await networkAddress()
    const { personId } = await checkSignIn(defaultDb(), {
      email,
      password,
      address,
      now: new Date(),
    })
    // A session that this browser had is not carried over: the token is new at every sign-in.
    const old = await readSessionCookie()
    if (old) await endSession(digestOf(old))
    await writeSessionCookie(
      await startSession(personId, { gymId: null, userAgent: await userAgent() }),
    )
  })
  if (!done.ok) return done
  redirect(safeNext(next) ?? paths.home())
}

/** Ends this session. */
export async function signOut(): Promise<void> {
  await checkActionOrigin()
  const token = await readSessionCookie()
  if (token) await endSession(digestOf(token))
  await clearSessionCookie()
  redirect(paths.signIn())
}

/** Ends every session of the person, this one too. */
export async function signOutEverywhere(): Promise<void> {
  await checkActionOrigin()
  const session = await currentSession()
  if (session) await endSessions(session.viewer.personId)
  await clearSessionCookie()
  redirect(paths.signIn())
}

/**
 * Fields `current`, `wanted`, `again`. Every session ends and this browser gets a new one. The present
 * password is checked as a sign-in is, with its throttle: a lent session is no way to guess it.
 */
export async function changePassword(
  _before: ActionResult | null,
  form: FormData,
): Promise<ActionResult> {
  return outcome('changePassword', async () => {
    const { viewer } = await sessionOrThrow()
    const parsed = changePasswordInput.safeParse(Object.fromEntries(form))
    if (!parsed.success) {
      throw new AppError('bad-input', 'The password was not changed.', {
        fields: fieldMessages(parsed.error),
      })
    }
    const db = defaultDb()
    await checkSignIn(db, {
      email: viewer.email,
      password: parsed.data.current,
      address: await networkAddress(),
      now: new Date(),
    }).catch((error: unknown) => {
      if (!(error instanceof AppError && error.code === 'bad-input')) throw error
      throw new AppError('bad-input', 'The password was not changed.', {
        fields: { current: 'That is not your present password.' },
      })
    })
    const passwordHash = await hashPassword(parsed.data.wanted)
    const token = await startSession(viewer.personId, {
      gymId: viewer.gymId,
      userAgent: await userAgent(),
    })
    await changeOwnPassword(viewer, { passwordHash, keepSessionId: digestOf(token) }, db)
    await writeSessionCookie(token)
    return undefined
  })
}

/** Field `gymId`: another gym that the person belongs to. */
export async function switchGym(form: FormData): Promise<void> {
  await checkActionOrigin()
  const session = await currentSession()
  if (!session) redirect(paths.signIn())
  const gymId = String(form.get('gymId') ?? '')
  if (!session.viewer.gyms.some((gym) => gym.gymId === gymId)) {
    throw new AppError('not-found', 'You are not in that gym.')
  }
  await setSessionGym(session.sessionId, gymId)
  redirect(paths.home())
}
