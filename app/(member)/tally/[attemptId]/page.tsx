import type { Metadata } from 'next'
import Link from 'next/link'
import { notFound } from 'next/navigation'
import { cache } from 'react'
import { AttemptFacts } from '@/components/attempt/attempt-facts'
import { Holds } from '@/components/attempt/holds'
import { TallyBlocks } from '@/components/attempt/tally-blocks'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { PageTitle } from '@/components/ui/heading'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { getAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'
import { readerDateStyle } from '@/server/http/reader'

interface PageProps {
  params: Promise<{ attemptId: string }>
}

/** Once a request, for the page and its title. A coach's look at somebody else's is another page. */
const readAttempt = cache(async (attemptId: string) => {
  const viewer = await requireRole(paths.attemptTally(attemptId), 'member')
  const attempt = await orNotFound(getAttempt(viewer, { attemptId }, defaultDb()))
  return attempt.membershipId === viewer.membershipId ? { viewer, attempt } : notFound()
})

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { attempt } = await readAttempt((await params).attemptId)
  return { title: `${attempt.scheduledClass.title}, my tally` }
}

export default async function AttemptTallyPage({ params }: PageProps) {
  const { viewer, attempt } = await readAttempt((await params).attemptId)
  const dateStyle = await readerDateStyle()
  const { timeZone } = viewer.gym
  const { scheduledClass } = attempt
  return (
    <PageFrame viewer={viewer}>
      <div className="space-y-10 page">
        <div>
          <Link className={buttonClass('text')} href={paths.tally()}>
            All my classes
          </Link>
          <PageTitle>{scheduledClass.title}</PageTitle>
          <p className="mt-3 text-text-quiet">
            {dayName(scheduledClass.day, dateStyle)}
            {scheduledClass.coachName ? ` with ${scheduledClass.coachName}` : ''} ·{' '}
            <Link
              className="text-rest underline decoration-3 underline-offset-6 hover:decoration-present"
              href={paths.classPage(scheduledClass.scheduledClassId)}
            >
              The class
            </Link>
          </p>
        </div>
        <AttemptFacts attempt={attempt} timeZone={timeZone} dateStyle={dateStyle} />
        <section>
          <h2 className="mb-4 text-2xl sm:text-3xl">Block by block</h2>
          <TallyBlocks version={attempt.version} tally={attempt.tally} />
        </section>
        <Holds holds={attempt.holds} as="member" timeZone={timeZone} />
      </div>
    </PageFrame>
  )
}
