import type { Metadata } from 'next'
import Link from 'next/link'
import { Suspense } from 'react'
import { ClassOverview } from '@/components/classes/class-overview'
import { ClassWaiting } from '@/components/classes/class-waiting'
import { KitLines } from '@/components/classes/kit-lines'
import { StillFigure } from '@/components/figure/still-figure'
import { HealthLines } from '@/components/health/health-lines'
import { LaneStrip } from '@/components/lane/lane-strip'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { PageTitle, Part } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { dayName, lengthText, type DateStyle } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { getScheduledClass, listToday, nearestClasses } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { fitOwn } from '@/server/data/fit'
import { forecastsOf, getLearntPaces } from '@/server/data/paces'
import { getHealth } from '@/server/data/health'
import { getKit } from '@/server/data/people'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'Today' }

const isInClass = ({ myAttempts: [latest] }: ScheduledClassSummary): boolean =>
  latest?.state === 'in-class' || latest?.state === 'paused'

const isDone = ({ myAttempts }: ScheduledClassSummary): boolean =>
  myAttempts.some((attempt) => attempt.state === 'finished')

/** The class to show large: the one being played, else the first still to be done, else the first. */
function foremost(classes: readonly ScheduledClassSummary[]): ScheduledClassSummary | undefined {
  return classes.find(isInClass) ?? classes.find((one) => !isDone(one)) ?? classes[0]
}

export default async function TodayPage() {
  const viewer = await requireRole(paths.today(), 'member')
  return (
    <PageFrame viewer={viewer}>
      {/* Read below the guard, so that a page that is not one's own is still a 404. */}
      <Suspense fallback={<ClassWaiting />}>
        <Today viewer={viewer} now={new Date()} />
      </Suspense>
    </PageFrame>
  )
}

async function Today({ viewer, now }: { viewer: Viewer; now: Date }) {
  const classes = await listToday(viewer, { now }, defaultDb())
  const shown = foremost(classes)
  if (!shown) return <NothingToday viewer={viewer} now={now} />
  return (
    <>
      <TodaysClass viewer={viewer} scheduledClass={shown} now={now} />
      <AlsoToday classes={classes.filter((one) => one !== shown)} />
    </>
  )
}

interface TodaysClassProps {
  viewer: Viewer
  scheduledClass: ScheduledClassSummary
  now: Date
}

async function TodaysClass({ viewer, scheduledClass, now }: TodaysClassProps) {
  const db = defaultDb()
  const { scheduledClassId } = scheduledClass
  const { version } = await getScheduledClass(viewer, { scheduledClassId }, db)
  const dateStyle = await readerDateStyle()
  const { timeZone } = viewer.gym
  return (
    <ClassOverview
      scheduledClass={scheduledClass}
      version={version}
      forecasts={forecastsOf(version, await getLearntPaces(viewer, { now }, db))}
      fitted={await fitOwn(viewer, { version }, db)}
      timeZone={timeZone}
      dateStyle={dateStyle}
      now={now}
      when="Today"
      canPlay
      kit={<KitLines version={version} kit={await getKit(viewer, {}, db)} isOwn />}
      health={
        <HealthLines
          health={await getHealth(viewer, { now }, db)}
          timeZone={timeZone}
          dateStyle={dateStyle}
          from={paths.today()}
        />
      }
    />
  )
}

function AlsoToday({ classes }: { classes: readonly ScheduledClassSummary[] }) {
  if (classes.length === 0) return null
  const fullMs = Math.max(...classes.map((one) => one.classLengthMs))
  return (
    <div className="mt-6 page">
      <Part title="Also today">
        <ul>
          {classes.map((one) => (
            <li
              key={one.scheduledClassId}
              className="grid items-center gap-x-8 gap-y-1 border-b-4 border-fill py-3 sm:grid-cols-[1fr_auto] lg:grid-cols-[16rem_1fr_20rem_10rem]"
            >
              <Link
                href={paths.classPage(one.scheduledClassId)}
                className="font-display text-2xl font-bold decoration-3 underline-offset-6 hover:underline"
              >
                {one.title}
              </Link>
              <p className="sm:max-lg:col-start-1">
                {lengthText(one.realLengthMs)}
                {one.focus ? <span className="text-text-quiet"> · {one.focus}</span> : null}
              </p>
              <LaneStrip blocks={one.blocks} fullMs={fullMs} className="max-lg:hidden" />
              <Link
                href={paths.play(one.scheduledClassId)}
                className={buttonClass('text', 'justify-self-start sm:justify-self-end')}
              >
                {isDone(one) ? 'Play again' : 'Get ready'}
              </Link>
            </li>
          ))}
        </ul>
      </Part>
    </div>
  )
}

async function NothingToday({ viewer, now }: { viewer: Viewer; now: Date }) {
  const { next, last } = await nearestClasses(viewer, { now }, defaultDb())
  const dateStyle = await readerDateStyle()
  const fullMs = Math.max(next?.classLengthMs ?? 0, last?.classLengthMs ?? 0)
  return (
    <>
      <div className="flex flex-wrap items-end justify-between gap-x-16 border-b-4 border-line page">
        <div className="min-w-0 pb-8">
          <PageTitle>Nothing today</PageTitle>
          <p className="mt-4 max-w-xl text-xl">
            {next || last
              ? 'Your coach has planned no class for today. A walk counts too.'
              : 'No classes have been planned yet. They appear here when they are.'}
          </p>
        </div>
        <StillFigure
          figure="march-in-place"
          frame="own"
          label=""
          className="h-44 w-auto sm:mr-[12%] sm:h-64"
        />
      </div>
      <div className="mt-10 grid gap-x-16 gap-y-8 page lg:grid-cols-2">
        {next ? <Near title="Next" scheduled={next} fullMs={fullMs} dateStyle={dateStyle} /> : null}
        {last ? <Near title="Last" scheduled={last} fullMs={fullMs} dateStyle={dateStyle} /> : null}
      </div>
    </>
  )
}

interface NearProps {
  title: string
  scheduled: ScheduledClassSummary
  fullMs: number
  dateStyle: DateStyle
}

function Near({ title, scheduled, fullMs, dateStyle }: NearProps) {
  return (
    <section>
      <h2 className="text-lg font-normal text-text-quiet">{title}</h2>
      <Link
        href={paths.classPage(scheduled.scheduledClassId)}
        className="font-display text-3xl leading-tight font-bold [overflow-wrap:anywhere] decoration-3 underline-offset-6 hover:underline sm:text-4xl"
      >
        {scheduled.title}
      </Link>
      <p className="mt-1 mb-4">
        {dayName(scheduled.day, dateStyle)}, {lengthText(scheduled.realLengthMs)}
        {scheduled.coachName ? ` with ${scheduled.coachName}` : ''}
        {isDone(scheduled) ? <span className="font-semibold text-done">, done</span> : null}
      </p>
      <LaneStrip blocks={scheduled.blocks} fullMs={fullMs} className="h-9" />
    </section>
  )
}
