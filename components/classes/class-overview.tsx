import Link from 'next/link'
import type { ReactNode } from 'react'
import { buttonClass } from '@/components/ui/button'
import type { HealthStanding, ScheduledClassSummary } from '@/server/contract/classes'
import { dateOf, dayName, lengthText, windowText } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { BlockList } from './block-list'
import { ClassPicture } from './class-picture'

interface ClassOverviewProps {
  scheduledClass: ScheduledClassSummary
  version: PublishedVersion
  timeZone: string
  now: Date
  /** 'Today' on the day's own page, else the date. */
  when: string | null
  kit: Record<string, number>
  health: HealthStanding | null
  /** False for somebody who only reads it (a coach who does not train). */
  canPlay: boolean
}

/** One class on a page: what it is, when, how it runs, what it needs, and the way in. */
export function ClassOverview({
  scheduledClass,
  version,
  timeZone,
  now,
  when,
  kit,
  health,
  canPlay,
}: ClassOverviewProps) {
  const { title, focus, coachName, realLengthMs } = scheduledClass
  return (
    <article>
      <div className="flex flex-wrap items-start justify-between gap-x-12 gap-y-5 page">
        <h1 className="text-6xl leading-[0.95] font-extrabold text-balance sm:text-7xl lg:text-8xl">
          {title}
        </h1>
        <div className="pt-1">
          <p className="font-display text-2xl font-bold">
            {when ?? dayName(scheduledClass.day)},{' '}
            {windowText(scheduledClass.opensAt, scheduledClass.closesAt, timeZone)}
          </p>
          <p className="mt-1">
            {lengthText(realLengthMs)}
            {coachName ? ` with ${coachName}` : ''}
          </p>
          {focus ? <p className="text-text-quiet">{focus}</p> : null}
        </div>
        <div className="w-full sm:w-72">
          {canPlay ? <WayIn scheduledClass={scheduledClass} now={now} /> : null}
        </div>
      </div>
      <div className="mt-6">
        <ClassPicture version={version} />
      </div>
      <div className="mt-10 grid gap-x-12 gap-y-10 page lg:grid-cols-[1fr_20rem]">
        <section aria-label="Blocks">
          <BlockList version={version} />
        </section>
        <div className="space-y-9 border-line lg:border-l-4 lg:pl-8">
          <Section title="Kit">
            <KitLines version={version} kit={kit} />
          </Section>
          {health && canPlay ? (
            <Section title="Health questions">
              <HealthLines
                health={health}
                timeZone={timeZone}
                from={paths.classPage(scheduledClass.scheduledClassId)}
              />
            </Section>
          ) : null}
        </div>
      </div>
    </article>
  )
}

function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section>
      <h2 className="mb-2 text-2xl">{title}</h2>
      {children}
    </section>
  )
}

function WayIn({ scheduledClass, now }: { scheduledClass: ScheduledClassSummary; now: Date }) {
  const { scheduledClassId, myAttempts, opensAt, closesAt } = scheduledClass
  const latest = myAttempts[0]
  const isOpen = latest && (latest.state === 'in-class' || latest.state === 'paused')
  const isDone = myAttempts.find((attempt) => attempt.state === 'finished')
  const isEarly = now.getTime() < Date.parse(opensAt)
  const isLate = now.getTime() > Date.parse(closesAt)
  return (
    <>
      <Link
        href={paths.play(scheduledClassId)}
        className={buttonClass(isDone && !isOpen ? 'outlined' : 'filled', 'w-full text-2xl')}
      >
        {isOpen ? 'Go on with class' : isDone ? 'Play again' : 'Get ready'}
      </Link>
      {isDone ? (
        <p className="mt-3">
          Done today.{' '}
          <Link className={buttonClass('text')} href={paths.attemptTally(isDone.attemptId)}>
            See my tally
          </Link>
        </p>
      ) : latest?.state === 'stopped' ? (
        <p className="mt-3">You stopped this one. Your coach sees it.</p>
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

function KitLines({ version, kit }: { version: PublishedVersion; kit: Record<string, number> }) {
  const items = version.spec.kit ?? []
  if (items.length === 0) return <p>Nothing but the floor.</p>
  return (
    <ul className="space-y-1">
      {items.map((item) => {
        const have = kit[item.item] ?? 0
        return (
          <li key={item.item}>
            <strong>
              {item.count > 1 ? `${item.count} × ` : ''}
              {item.item}
            </strong>
            <span className="text-text-quiet">
              {' '}
              ·{' '}
              {have >= item.count
                ? 'yours'
                : item.optional
                  ? 'if you have one'
                  : have > 0
                    ? `you have ${have}`
                    : 'not in your kit'}
            </span>
          </li>
        )
      })}
      <li>
        <Link className={buttonClass('text')} href={`${paths.account()}#kit`}>
          Change my kit
        </Link>
      </li>
    </ul>
  )
}

function HealthLines({
  health,
  timeZone,
  from,
}: {
  health: HealthStanding
  timeZone: string
  from: string
}) {
  const link = (text: string) => (
    <Link
      className={buttonClass('text')}
      href={`${paths.health()}?next=${encodeURIComponent(from)}`}
    >
      {text}
    </Link>
  )
  if (health.consentMissing)
    return (
      <p>
        Your guardian’s consent is not on record yet. Ask your gym; until then you can read classes.
      </p>
    )
  switch (health.standing) {
    case 'open':
      return (
        <>
          <p>
            {health.answeredAt
              ? 'Your answers are out of date.'
              : 'You have not answered them yet.'}{' '}
            It takes a minute, before your first class.
          </p>
          {link('Answer them')}
        </>
      )
    case 'blocked':
      return (
        <>
          <p>You can read classes. To play, state that a licensed professional has cleared you.</p>
          {link('My answers')}
        </>
      )
    case 'clearance':
      return (
        <>
          <p>State that you have been cleared, or choose limits. Then you can play.</p>
          {link('My answers')}
        </>
      )
    case 'clear':
      return (
        <>
          <p>
            You answered on {health.answeredAt ? dateOf(health.answeredAt, timeZone) : ''}.
            {health.goodUntil ? ` Good until ${dateOf(health.goodUntil, timeZone)}.` : ''}
          </p>
          {link('Something has changed')}
        </>
      )
  }
}
