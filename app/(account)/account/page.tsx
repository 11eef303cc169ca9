import type { Metadata } from 'next'
import { KitForm } from '@/components/account/kit-form'
import { PasswordForm } from '@/components/account/password-form'
import { Holds } from '@/components/attempt/holds'
import { PageFrame } from '@/components/site/page-frame'
import { SignOutButton, SignOutEverywhereButton } from '@/components/site/sign-out-button'
import { Button, LinkButton } from '@/components/ui/button'
import { switchGym } from '@/server/actions/account'
import { requireViewer } from '@/server/auth/viewer'
import { plural } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { listOwnHolds } from '@/server/data/health'
import { countSessions, getKit } from '@/server/data/people'

export const metadata: Metadata = { title: 'Account' }

export default async function AccountPage() {
  const viewer = await requireViewer(paths.account())
  const db = defaultDb()
  const isMember = viewer.roles.includes('member')
  const sessions = await countSessions(viewer, {}, db)
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <h1 className="text-5xl font-extrabold sm:text-6xl">{viewer.name}</h1>
        <p className="mt-2 text-text-quiet">
          {viewer.email} · {viewer.roles.join(', ')} at {viewer.gym.name}
        </p>
        <div className="mt-10 grid gap-x-16 gap-y-12 lg:grid-cols-2">
          {isMember ? (
            <section id="kit">
              <h2 className="mb-2 text-3xl">My kit</h2>
              <p className="text-text-quiet">
                What you have at home. Classes show what is missing.
              </p>
              <KitForm kit={await getKit(viewer, {}, db)} />
            </section>
          ) : null}
          <section>
            <h2 className="mb-4 text-3xl">Password</h2>
            <PasswordForm email={viewer.email} />
          </section>
          {isMember ? (
            <section className="space-y-6">
              <div>
                <h2 className="mb-2 text-3xl">Health</h2>
                <LinkButton
                  look="outlined"
                  href={`${paths.health()}?next=${encodeURIComponent(paths.account())}`}
                >
                  Health questions
                </LinkButton>
              </div>
              <Holds
                holds={await listOwnHolds(viewer, {}, db)}
                as="member"
                timeZone={viewer.gym.timeZone}
              />
            </section>
          ) : null}
          <section className="space-y-4">
            <h2 className="text-3xl">Signed in</h2>
            <p>
              You are signed in in {plural(sessions, 'browser')}. Signing out everywhere ends all of
              them, this one too.
            </p>
            <div className="flex flex-wrap gap-4">
              <SignOutButton />
              <SignOutEverywhereButton />
            </div>
          </section>
          {viewer.gyms.length > 1 ? (
            <section>
              <h2 className="mb-3 text-3xl">My gyms</h2>
              <ul className="space-y-3">
                {viewer.gyms.map((gym) => (
                  <li key={gym.gymId}>
                    {gym.gymId === viewer.gymId ? (
                      <p className="border-l-8 border-present py-2 pl-4">
                        <strong>{gym.name}</strong>, where you are now
                      </p>
                    ) : (
                      <form action={switchGym}>
                        <input type="hidden" name="gymId" value={gym.gymId} />
                        <Button type="submit" look="outlined">
                          Go to {gym.name}
                        </Button>
                      </form>
                    )}
                  </li>
                ))}
              </ul>
            </section>
          ) : null}
        </div>
      </div>
    </PageFrame>
  )
}
