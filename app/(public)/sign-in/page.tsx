import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { SignInForm } from '@/components/account/sign-in-form'
import { StillFigure } from '@/components/figure/still-figure'
import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
import { Notice } from '@/components/ui/notice'
import { readSessionCookie } from '@/server/auth/cookie'
import { currentViewer, landingPath } from '@/server/auth/viewer'
import { safeNext } from '@/server/contract/forms'

export const metadata: Metadata = { title: 'Sign in' }

const FIGURES = ['bent-over-row', 'reverse-lunge', 'standing-press'] as const

/** A ladder in mid-block, to show what a round looks like here. */
const LADDER = rungWindow({
  repsOf: (round) => (round <= 5 ? 2 + 2 * round : null),
  done: [1, 2],
  present: 3,
  forecastRounds: 4,
  limit: 5,
})

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const { next } = await searchParams
  const wanted = safeNext(typeof next === 'string' ? next : null)
  const viewer = await currentViewer()
  if (viewer) redirect(wanted ?? landingPath(viewer))
  // Signing out takes the cookie with it: one that is still there is from a session that ended by itself.
  const hasEnded = (await readSessionCookie()) !== null
  return (
    <div
      data-ground="hall"
      className="grid min-h-dvh bg-ground text-text max-lg:grid-rows-[auto_1fr] lg:grid-cols-[minmax(0,29%)_1fr]"
    >
      <header className="flex flex-col page pt-6 sm:pt-9 lg:pt-11 lg:pr-0">
        <p className="-ml-0.5 font-display text-5xl leading-none font-extrabold wide lg:text-[clamp(2.6rem,4vw,5.2rem)]">
          Floorside
        </p>
        <p className="mt-3 max-w-md text-xl leading-snug sm:mt-5 lg:pr-6">
          Strength classes at home, planned by your own coach and led by the clock.
        </p>
        <div className="mt-6 hidden space-y-3 pr-6 text-text-quiet lg:block">
          <p>
            Members follow on a laptop or a TV and log a round with one key. Every movement has an
            easier and a harder way.
          </p>
          <p>Coaches see who finished which block, on what, and plan the next class from it.</p>
        </div>
        <div aria-hidden className="mt-auto hidden pt-8 pb-12 lg:block">
          <Rungs {...LADDER} runOut className="block w-full" />
        </div>
      </header>
      <div className="flex flex-col border-line lg:border-l-6">
        <div
          aria-hidden
          className="flex flex-1 items-end justify-around pt-5 pl-[10%] sm:px-[6%] lg:pt-0"
        >
          {FIGURES.map((figure) => (
            <StillFigure
              key={figure}
              figure={figure}
              frame="stature"
              label=""
              className="h-28 w-auto sm:h-56 lg:h-[clamp(11rem,calc(100dvh-29.5rem),52vh)]"
            />
          ))}
        </div>
        <main
          data-ground="birch"
          className="ml-4 rounded-tl-[4.5rem] border-t-10 border-l-10 border-present boards px-6 pt-8 pb-12 text-text sm:ml-0 sm:border-t-14 sm:px-[6%] sm:max-lg:rounded-none sm:max-lg:border-l-0 lg:-ml-2.5 lg:rounded-tl-[9rem] lg:border-l-14 lg:pt-12"
        >
          <div className="grid gap-x-16 gap-y-8 md:grid-cols-[minmax(0,26rem)_minmax(0,22rem)]">
            <div>
              <h1 className="text-4xl sm:text-5xl">Sign in</h1>
              {hasEnded ? (
                <Notice tone="info" className="mt-4">
                  You were signed out: the time of this sign-in had run out, or it was ended
                  elsewhere. Nothing is lost. Sign in and you are back where you were.
                </Notice>
              ) : wanted ? (
                <p className="mt-2 text-text-quiet">Sign in to go on to the page you asked for.</p>
              ) : null}
              <SignInForm next={wanted} />
            </div>
            <div className="space-y-6 md:pt-17">
              <div>
                <h2 className="text-xl">New here?</h2>
                <p className="mt-1">
                  Your gym sets up your account. Ask your coach for it; they give you a first
                  password, which you can change after signing in.
                </p>
              </div>
              <div>
                <h2 className="text-xl">Class started?</h2>
                <p className="mt-1 text-text-quiet">
                  A class is open for its whole window. Sign in and start when you are ready: the
                  clock is your own.
                </p>
              </div>
            </div>
          </div>
        </main>
      </div>
    </div>
  )
}

export const dynamic = 'force-dynamic'
