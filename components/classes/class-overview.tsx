import Link from 'next/link'
import type { ReactNode } from 'react'
import { buttonClass } from '@/components/ui/button'
import { PageTitle } from '@/components/ui/heading'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { dayName, lengthText, windowText, type DateStyle } from '@/server/contract/format'
import type { ForecastDto } from '@/server/contract/paces'
import { paths } from '@/server/contract/paths'
import type { FittedStation } from '@/server/engine/fit/fit'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { BlockList } from './block-list'
import { ClassPicture } from './class-picture'

interface ClassOverviewProps {
  scheduledClass: ScheduledClassSummary
  version: PublishedVersion
  forecasts: readonly ForecastDto[]
  /** The reader's own; empty for somebody who only reads. */
  fitted: readonly FittedStation[]
  timeZone: string
  dateStyle: DateStyle
  now: Date
  /** 'Today' on the day's own page, else the date. */
  when: string | null
  /** False for somebody who only reads it (a coach who does not train). */
  canPlay: boolean
  kit: ReactNode
  /** How the member's own health answers stand; null for somebody who only reads. */
  health: ReactNode
}

/** One class on a page: what it is, when, how it runs, what it needs, and the way in. */
export function ClassOverview({
  scheduledClass,
  version,
  forecasts,
  fitted,
  timeZone,
  dateStyle,
  now,
  when,
  canPlay,
  kit,
  health,
}: ClassOverviewProps) {
  const { title, focus, coachName, realLengthMs, opensAt, closesAt, day } = scheduledClass
  return (
    <article>
      <div className="flex flex-wrap items-start justify-between gap-x-12 gap-y-5 page">
        <div className="min-w-0">
          <PageTitle>{title}</PageTitle>
        </div>
        <div className="lg:pt-2">
          <p className="font-display text-2xl font-bold">
            {when ?? dayName(day, dateStyle)}, {windowText(opensAt, closesAt, timeZone, dateStyle)}
          </p>
          <p className="mt-1">
            {lengthText(realLengthMs)}
            {coachName ? ` with ${coachName}` : ''}
          </p>
          {focus ? <p className="text-text-quiet">{focus}</p> : null}
        </div>
        <div className="w-full sm:w-80 lg:pt-2">
          {canPlay ? <WayIn scheduledClass={scheduledClass} now={now} /> : null}
        </div>
      </div>
      <div className="mt-4 sm:mt-6">
        <ClassPicture version={version} />
      </div>
      <div className="mt-8 grid gap-x-10 gap-y-9 page lg:grid-cols-[1fr_17.5rem]">
        <div className="space-y-8 border-line lg:col-start-2 lg:row-start-1 lg:border-l-4 lg:pl-7">
          <section>
            <h2 className="text-2xl">Kit</h2>
            {kit}
          </section>
          {health ? (
            <section>
              <h2 className="mb-3 text-2xl">Health questions</h2>
              {health}
            </section>
          ) : null}
        </div>
        <section aria-label="Blocks" className="min-w-0">
          <BlockList version={version} forecasts={forecasts} fitted={fitted} />
        </section>
      </div>
    </article>
  )
}

function WayIn({ scheduledClass, now }: { scheduledClass: ScheduledClassSummary; now: Date }) {
  const { scheduledClassId, myAttempts, opensAt, closesAt } = scheduledClass
  const [latest] = myAttempts
  const isOpen = latest && (latest.state === 'in-class' || latest.state === 'paused')
  const done = myAttempts.filter((attempt) => attempt.state === 'finished')
  const [latestDone] = done
  const isEarly = now.getTime() < Date.parse(opensAt)
  const isLate = now.getTime() > Date.parse(closesAt)
  return (
    <>
      <Link
        href={paths.play(scheduledClassId)}
        className={buttonClass(
          latestDone && !isOpen ? 'outlined' : 'filled',
          'min-h-18! w-full text-[2rem]!',
        )}
      >
        {isOpen ? 'Go on with class' : latestDone ? 'Play again' : 'Get ready'}
      </Link>
      {latestDone ? (
        <p className="mt-2">
          <span className="font-semibold text-done">
            {done.length > 1 ? `You have done this ${done.length} times.` : 'You have done this.'}
          </span>{' '}
          <Link className={buttonClass('text')} href={paths.attemptTally(latestDone.attemptId)}>
            See my tally
          </Link>
        </p>
      ) : isOpen ? (
        <p className="mt-2">You are in the middle of it. It goes on where you left off.</p>
      ) : latest?.state === 'stopped' ? (
        <p className="mt-2">
          You stopped this one. Your coach sees it.{' '}
          <Link className={buttonClass('text')} href={paths.attemptTally(latest.attemptId)}>
            See my tally
          </Link>
        </p>
      ) : null}
      {isLate ? (
        <p className="mt-2 text-text-quiet">
          Its window has closed. You can still play it; it is marked late.
        </p>
      ) : isEarly ? (
        <p className="mt-2 text-text-quiet">
          Its day is still to come. You can look, and play it early.
        </p>
      ) : null}
    </>
  )
}
