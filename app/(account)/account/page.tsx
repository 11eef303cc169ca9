import type { Metadata } from 'next'
import type { ReactNode } from 'react'
import { FitForm } from '@/components/account/fit-form'
import { KitForm } from '@/components/account/kit-form'
import { PasswordForm } from '@/components/account/password-form'
import { Holds } from '@/components/attempt/holds'
import { HealthLines } from '@/components/health/health-lines'
import { PageFrame } from '@/components/site/page-frame'
import { SignOutButton, SignOutEverywhereButton } from '@/components/site/sign-out-button'
import { Button } from '@/components/ui/button'
import { PageTitle, Part } from '@/components/ui/heading'
import { switchGym } from '@/server/actions/account'
import { requireViewer } from '@/server/auth/viewer'
import { plural } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { defaultDb } from '@/server/data/db'
import { getOwnFit } from '@/server/data/fit'
import { getHealth, listOwnHolds } from '@/server/data/health'
import { countSessions } from '@/server/data/people'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'My account' }

export default async function AccountPage() {
  const viewer = await requireViewer(paths.account())
  const db = defaultDb()
  const isMember = viewer.roles.includes('member')
  const sessions = await countSessions(viewer, {}, db)
  const own = await getOwnFit(viewer, {}, db)
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle size="long">{viewer.name}</PageTitle>
        <p className="mt-3 [overflow-wrap:anywhere] text-text-quiet">
          {viewer.email} · {viewer.roles.join(', ')} at {viewer.gym.name}
        </p>
        <div className="mt-10 grid gap-x-16 gap-y-12 lg:grid-cols-2">
          <div className="space-y-12">
            {isMember ? (
              <>
                <Part title="My kit" id="kit">
                  <p className="py-3 text-text-quiet">
                    What you have at home. Classes show what is missing.
                  </p>
                  <KitForm kit={own.kit} weights={own.kitWeights} />
                </Part>
                <Part title="My body" id="body">
                  <p className="py-3 text-text-quiet">
                    Classes start you on the option that spares it, and say why. You can always
                    choose another. Your coach sees these notes; they are no medical advice.
                  </p>
                  <FitForm fit={own} />
                </Part>
                <Part title="Health">
                  <div className="space-y-6 py-3">
                    <OwnHealth viewer={viewer} />
                  </div>
                </Part>
              </>
            ) : null}
            {viewer.gyms.length > 1 ? <OwnGyms viewer={viewer} /> : null}
          </div>
          <div className="space-y-12">
            <Part title="Password">
              <div className="pt-4">
                <PasswordForm email={viewer.email} />
              </div>
            </Part>
            <Part title="Signed in">
              <div className="space-y-4 py-3">
                <p>
                  {plural(sessions, 'browser is', 'browsers are')} signed in with your account, this
                  one among them. On a computer that is not yours, sign out when you leave.
                </p>
                <div className="flex flex-wrap gap-4">
                  <SignOutButton />
                  <SignOutEverywhereButton />
                </div>
              </div>
            </Part>
          </div>
        </div>
      </div>
    </PageFrame>
  )
}

async function OwnHealth({ viewer }: { viewer: Viewer }): Promise<ReactNode> {
  const db = defaultDb()
  const { timeZone } = viewer.gym
  return (
    <>
      <div>
        <HealthLines
          health={await getHealth(viewer, { now: new Date() }, db)}
          timeZone={timeZone}
          dateStyle={await readerDateStyle()}
          from={paths.account()}
        />
      </div>
      <Holds holds={await listOwnHolds(viewer, {}, db)} as="member" timeZone={timeZone} />
    </>
  )
}

function OwnGyms({ viewer }: { viewer: Viewer }) {
  return (
    <Part title="My gyms" id="gyms">
      <ul>
        {viewer.gyms.map((gym) => (
          <li
            key={gym.gymId}
            className="flex min-h-16 flex-wrap items-center justify-between gap-x-6 border-b-4 border-fill py-2"
          >
            <strong>{gym.name}</strong>
            {gym.gymId === viewer.gymId ? (
              <span className="text-text-quiet">you are here</span>
            ) : (
              <form action={switchGym}>
                <input type="hidden" name="gymId" value={gym.gymId} />
                <Button type="submit" look="text">
                  Go there<span className="sr-only">: {gym.name}</span>
                </Button>
              </form>
            )}
          </li>
        ))}
      </ul>
    </Part>
  )
}
