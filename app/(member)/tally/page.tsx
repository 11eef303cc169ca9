import type { Metadata } from 'next'
import Link from 'next/link'
import { Suspense } from 'react'
import { EffortTrend } from '@/components/attempt/effort-trend'
import { StillFigure } from '@/components/figure/still-figure'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass, LinkButton } from '@/components/ui/button'
import { Empty } from '@/components/ui/empty'
import { PageTitle } from '@/components/ui/heading'
import { SkeletonLines } from '@/components/ui/skeleton'
import { requireRole } from '@/server/auth/viewer'
import { dayName, type DateStyle } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { listOwnAttempts, type OwnAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'My tally' }

const STATE_TEXT: Record<OwnAttempt['state'], string> = {
  'not-started': 'not started',
  'in-class': 'in class',
  paused: 'paused',
  stopped: 'stopped',
  finished: 'finished',
}

export default async function TallyPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const { before } = await searchParams
  const viewer = await requireRole(paths.tally(), 'member')
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle>My tally</PageTitle>
        {/* Read below the guard, so that a page that is not one's own is still a 404. */}
        <Suspense fallback={<SkeletonLines rows={9} />}>
          <Attempts viewer={viewer} before={typeof before === 'string' ? before : null} />
        </Suspense>
      </div>
    </PageFrame>
  )
}

async function Attempts({ viewer, before }: { viewer: Viewer; before: string | null }) {
  const { attempts, more } = await listOwnAttempts(viewer, { before }, defaultDb())
  const dateStyle = await readerDateStyle()
  const last = attempts.at(-1)
  if (!last) return <NoAttempts isLaterPage={before !== null} />
  const rated = attempts.flatMap((one) => (one.rpe === null ? [] : [{ ...one, rpe: one.rpe }]))
  return (
    <div className="mt-6 space-y-8">
      <EffortTrend classes={rated.reverse()} dateStyle={dateStyle} />
      <ul className="border-t-4 border-line">
        {attempts.map((attempt) => (
          <AttemptLine key={attempt.attemptId} attempt={attempt} dateStyle={dateStyle} />
        ))}
      </ul>
      {more ? (
        <Link className={buttonClass('text')} href={`${paths.tally()}?before=${last.attemptId}`}>
          Earlier classes
        </Link>
      ) : null}
    </div>
  )
}

function NoAttempts({ isLaterPage }: { isLaterPage: boolean }) {
  return (
    <div className="mt-6">
      <Empty
        picture={<StillFigure figure="standing" frame="own" label="" className="h-52 w-auto" />}
      >
        <p>
          {isLaterPage
            ? 'There are no earlier classes.'
            : 'Your classes appear here, block by block, once you have done one.'}
        </p>
        <LinkButton href={paths.today()}>See today’s class</LinkButton>
      </Empty>
    </div>
  )
}

function AttemptLine({ attempt, dateStyle }: { attempt: OwnAttempt; dateStyle: DateStyle }) {
  const isOpen = attempt.state === 'in-class' || attempt.state === 'paused'
  return (
    <li className="border-b-4 border-fill">
      <Link
        href={isOpen ? paths.play(attempt.scheduledClassId) : paths.attemptTally(attempt.attemptId)}
        className="grid grid-cols-[1fr_auto] items-baseline gap-x-8 gap-y-0.5 py-3 decoration-3 underline-offset-6 hover:bg-fill/40 hover:underline sm:grid-cols-[14rem_1fr_9rem_6rem]"
      >
        <span className="text-text-quiet">{dayName(attempt.day, dateStyle)}</span>
        <span className="font-display text-2xl font-bold [overflow-wrap:anywhere] max-sm:col-span-2 max-sm:row-start-2">
          {attempt.title}
        </span>
        <span className="max-sm:text-right">
          {isOpen ? <strong>Go on with class</strong> : STATE_TEXT[attempt.state]}
          {attempt.late ? ', late' : ''}
        </span>
        <span className="whitespace-nowrap max-sm:col-span-2 sm:text-right">
          {attempt.rpe === null ? '' : `RPE ${attempt.rpe}`}
        </span>
      </Link>
    </li>
  )
}
