import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { SignInForm } from '@/components/account/sign-in-form'
import { StillFigure } from '@/components/figure/still-figure'
import { currentViewer, landingPath } from '@/server/auth/viewer'
import { safeNext } from '@/server/contract/forms'

export const metadata: Metadata = { title: 'Sign in' }

const FIGURES = ['bent-over-row', 'reverse-lunge', 'standing-press'] as const

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const { next } = await searchParams
  const wanted = safeNext(typeof next === 'string' ? next : null)
  const viewer = await currentViewer()
  if (viewer) redirect(wanted ?? landingPath(viewer))
  return (
    <div
      data-ground="hall"
      className="grid min-h-dvh bg-ground text-text lg:grid-cols-[minmax(0,29%)_1fr]"
    >
      <header className="flex flex-col justify-between gap-6 page py-6 lg:py-12 lg:pr-4">
        <div>
          <p className="font-display text-5xl font-extrabold wide lg:text-6xl">Floorside</p>
          <p className="mt-4 max-w-md text-xl">
            Strength classes at home, planned by your own coach and led by the clock.
          </p>
          <ul className="mt-5 hidden max-w-sm space-y-2 text-text-quiet lg:block">
            <li>
              Members follow on a laptop or a TV, with an easier and a harder way for every
              movement.
            </li>
            <li>Coaches see who finished which block, on what, and plan the next class from it.</li>
          </ul>
        </div>
        <p className="hidden text-base text-text-quiet lg:block">
          For members and coaches of gyms that use it.
        </p>
      </header>
      <div className="flex flex-col border-line lg:border-l-6">
        <div aria-hidden className="hidden min-h-0 flex-1 items-end justify-around px-[6%] sm:flex">
          {FIGURES.map((figure) => (
            <StillFigure
              key={figure}
              figure={figure}
              frame="stature"
              label=""
              className="h-[clamp(10rem,34vh,24rem)] w-auto"
            />
          ))}
        </div>
        <main
          data-ground="birch"
          className="border-t-12 border-present boards px-6 pt-8 pb-12 text-text sm:px-[6%] lg:-ml-1.5 lg:rounded-tl-[9rem] lg:border-l-12 lg:pt-14"
        >
          <div className="grid gap-x-16 gap-y-8 md:grid-cols-[minmax(0,26rem)_minmax(0,22rem)]">
            <div>
              <h1 className="text-4xl">Sign in</h1>
              {wanted ? (
                <p className="mt-2 text-text-quiet">Sign in to go on to the page you asked for.</p>
              ) : null}
              <SignInForm next={wanted} />
            </div>
            <div className="space-y-6 md:pt-16">
              <div>
                <h2 className="text-xl">New here?</h2>
                <p className="mt-1">
                  Your gym sets up your account. Ask your coach for it; they give you your e-mail
                  and a first password, which you can change after signing in.
                </p>
              </div>
              <div>
                <h2 className="text-xl">Class started?</h2>
                <p className="mt-1">
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
