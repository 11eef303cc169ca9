import type { Metadata } from 'next'
import Link from 'next/link'
import { ClassOverview } from '@/components/classes/class-overview'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { requireRole } from '@/server/auth/viewer'
import { dayName, lengthText } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { getScheduledClass, listToday, nearestClasses } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { getHealth } from '@/server/data/health'
import { getKit } from '@/server/data/people'

export const metadata: Metadata = { title: 'Today' }

export default async function TodayPage() {
  const viewer = await requireRole(paths.today(), 'member')
  const db = defaultDb()
  const now = new Date()
  const classes = await listToday(viewer, { now }, db)
  const [first, ...others] = classes
  if (!first) return <NothingToday />
  const { version } = await getScheduledClass(
    viewer,
    { scheduledClassId: first.scheduledClassId },
    db,
  )
  return (
    <PageFrame viewer={viewer}>
      <ClassOverview
        scheduledClass={first}
        version={version}
        timeZone={viewer.gym.timeZone}
        now={now}
        when="Today"
        kit={await getKit(viewer, {}, db)}
        health={await getHealth(viewer, { now }, db)}
        canPlay
      />
      {others.length > 0 ? (
        <section className="mt-14 page">
          <h2 className="border-b-4 border-line pb-1 text-3xl">Also today</h2>
          <ul>
            {others.map((one) => (
              <li
                key={one.scheduledClassId}
                className="flex flex-wrap items-baseline gap-x-6 gap-y-1 border-b-4 border-fill py-3"
              >
                <Link
                  href={paths.classPage(one.scheduledClassId)}
                  className="font-display text-2xl font-bold decoration-3 underline-offset-6 hover:underline"
                >
                  {one.title}
                </Link>
                <span>{lengthText(one.realLengthMs)}</span>
                <span className="text-text-quiet">{one.focus}</span>
                <Link
                  href={paths.play(one.scheduledClassId)}
                  className={buttonClass('text', 'ml-auto')}
                >
                  {one.myAttempts.some((attempt) => attempt.state === 'finished')
                    ? 'Play again'
                    : 'Get ready'}
                </Link>
              </li>
            ))}
          </ul>
        </section>
      ) : null}
    </PageFrame>
  )

  async function NothingToday() {
    const { next, last } = await nearestClasses(viewer, { now }, db)
    return (
      <PageFrame viewer={viewer}>
        <div className="page">
          <h1 className="text-6xl font-extrabold sm:text-7xl">Nothing today</h1>
          <p className="mt-4 max-w-xl text-xl">
            Your coach has planned no class for today. A walk counts too.
          </p>
          <div className="mt-10 grid max-w-4xl gap-8 sm:grid-cols-2">
            {next ? <Near title="Next" scheduled={next} /> : null}
            {last ? <Near title="Last" scheduled={last} /> : null}
          </div>
          {!next && !last ? (
            <p className="mt-6">
              No classes have been planned yet. They appear here when they are.
            </p>
          ) : null}
        </div>
      </PageFrame>
    )
  }
}

function Near({
  title,
  scheduled,
}: {
  title: string
  scheduled: { scheduledClassId: string; title: string; day: string; realLengthMs: number }
}) {
  return (
    <section className="border-t-4 border-line pt-2">
      <h2 className="text-lg text-text-quiet">{title}</h2>
      <Link
        href={paths.classPage(scheduled.scheduledClassId)}
        className="font-display text-3xl font-bold underline decoration-3 underline-offset-6"
      >
        {scheduled.title}
      </Link>
      <p className="mt-1">
        {dayName(scheduled.day)}, {lengthText(scheduled.realLengthMs)}
      </p>
    </section>
  )
}
