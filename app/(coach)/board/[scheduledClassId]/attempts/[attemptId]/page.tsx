import type { Metadata } from 'next'
import Link from 'next/link'
import { notFound } from 'next/navigation'
import { AttemptFacts } from '@/components/attempt/attempt-facts'
import { EventList } from '@/components/attempt/event-list'
import { Holds } from '@/components/attempt/holds'
import { OptionRules } from '@/components/attempt/option-rules'
import { TallyBlocks } from '@/components/attempt/tally-blocks'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { getAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'
import { getMemberFit } from '@/server/data/fit'

export const metadata: Metadata = { title: 'Attempt' }

export default async function BoardAttemptPage({
  params,
}: {
  params: Promise<{ scheduledClassId: string; attemptId: string }>
}) {
  const { scheduledClassId, attemptId } = await params
  const viewer = await requireRole(paths.boardAttempt(scheduledClassId, attemptId), 'coach')
  const attempt = await orNotFound(getAttempt(viewer, { attemptId }, defaultDb()))
  if (attempt.scheduledClass.scheduledClassId !== scheduledClassId) notFound()
  const { timeZone } = viewer.gym
  return (
    <PageFrame viewer={viewer}>
      <div className="space-y-10 page">
        <div>
          <Link className={buttonClass('text')} href={paths.boardOf(scheduledClassId)}>
            Back to the board
          </Link>
          <h1 className="mt-2 text-5xl font-extrabold sm:text-6xl">{attempt.memberName}</h1>
          <p className="mt-2 text-text-quiet">
            {attempt.scheduledClass.title}, {dayName(attempt.scheduledClass.day)}
          </p>
        </div>
        <AttemptFacts attempt={attempt} timeZone={timeZone} />
        <Holds holds={attempt.holds} as="coach" timeZone={timeZone} />
        <section>
          <h2 className="mb-4 text-2xl">Block by block</h2>
          <TallyBlocks version={attempt.version} tally={attempt.tally} />
        </section>
        <OptionRules
          membershipId={attempt.membershipId}
          memberName={attempt.memberName}
          fit={await getMemberFit(viewer, { membershipId: attempt.membershipId }, defaultDb())}
          movements={attempt.version.movements}
        />
        <section>
          <h2 className="mb-2 text-2xl">In order</h2>
          <EventList attempt={attempt} timeZone={timeZone} />
        </section>
      </div>
    </PageFrame>
  )
}
