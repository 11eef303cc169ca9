import type { Metadata } from 'next'
import Link from 'next/link'
import { notFound } from 'next/navigation'
import { AttemptFacts } from '@/components/attempt/attempt-facts'
import { Holds } from '@/components/attempt/holds'
import { TallyBlocks } from '@/components/attempt/tally-blocks'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { getAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'

export const metadata: Metadata = { title: 'My tally' }

export default async function AttemptTallyPage({
  params,
}: {
  params: Promise<{ attemptId: string }>
}) {
  const { attemptId } = await params
  const viewer = await requireRole(paths.attemptTally(attemptId), 'member')
  const attempt = await orNotFound(getAttempt(viewer, { attemptId }, defaultDb()))
  if (attempt.membershipId !== viewer.membershipId) notFound()
  return (
    <PageFrame viewer={viewer}>
      <div className="space-y-10 page">
        <div>
          <Link className={buttonClass('text')} href={paths.tally()}>
            All my classes
          </Link>
          <h1 className="mt-2 text-5xl font-extrabold sm:text-6xl">
            {attempt.scheduledClass.title}
          </h1>
          <p className="mt-2 text-text-quiet">{dayName(attempt.scheduledClass.day)}</p>
        </div>
        <AttemptFacts attempt={attempt} timeZone={viewer.gym.timeZone} />
        <section>
          <h2 className="mb-4 text-2xl">Block by block</h2>
          <TallyBlocks version={attempt.version} tally={attempt.tally} />
        </section>
        <Holds holds={attempt.holds} as="member" timeZone={viewer.gym.timeZone} />
      </div>
    </PageFrame>
  )
}
