import 'server-only'
/** The cookie with the session's token. Written at sign-in and sign-out only, never while rendering. */
import { cookies } from 'next/headers'
import { ABSOLUTE_DAYS } from './lucia'

function isHttps(): boolean {
  return process.env.APP_ORIGIN?.startsWith('https://') ?? false
}

/** `__Host-` needs HTTPS, which a gym's server has and a laptop on the local network has not. */
export function sessionCookieName(): string {
  return isHttps() ? '__Host-floorside' : 'floorside'
}

export async function readSessionCookie(): Promise<string | null> {
  return (await cookies()).get(sessionCookieName())?.value ?? null
}

export async function writeSessionCookie(token: string): Promise<void> {
  ;(await cookies()).set(sessionCookieName(), token, {
    httpOnly: true,
    sameSite: 'lax',
    secure: isHttps(),
    path: '/',
    maxAge: ABSOLUTE_DAYS * 86_400,
  })
}

export async function clearSessionCookie(): Promise<void> {
  ;(await cookies()).set(sessionCookieName(), '', {
    httpOnly: true,
    sameSite: 'lax',
    secure: isHttps(),
    path: '/',
    maxAge: 0,
  })
}
