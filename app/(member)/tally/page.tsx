import type { Metadata } from 'next'
import Link from 'next/link'
import { Suspense } from 'react'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass, LinkButton } from '@/components/ui/button'
import { SkeletonLines } from '@/components/ui/skeleton'
import { requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { listOwnAttempts, type OwnAttempt } from '@/server/data/attempts'
import { defaultDb } from '@/server/data/db'

export const metadata: Metadata = { title: 'My tally' }

const STATE_TEXT: Record<OwnAttempt['state'], string> = {
  'not-started': 'not started',
  'in-class': 'open',
  paused: 'open',
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
        <h1 className="text-6xl font-extrabold sm:text-7xl">My tally</h1>
        {/* Read below the guard, so that a page that is not one's own is still a 404. */}
        <Suspense fallback={<SkeletonLines rows={6} />}>
          <Attempts viewer={viewer} before={typeof before === 'string' ? before : null} />
        </Suspense>
      </div>
    </PageFrame>
  )
}

async function Attempts({ viewer, before }: { viewer: Viewer; before: string | null }) {
  const { attempts, more } = await listOwnAttempts(viewer, { before }, defaultDb())
  const last = attempts.at(-1)
  if (attempts.length === 0) {
    return (
      <div className="mt-8 max-w-xl">
        <p className="text-xl">
          {before
            ? 'No earlier classes.'
            : 'Your classes appear here, block by block, once you have done one.'}
        </p>
        <LinkButton href={paths.today()} className="mt-6">
          See today’s class
        </LinkButton>
      </div>
    )
  }
  return (
    <>
      <ul className="mt-8 border-t-4 border-line">
        {attempts.map((attempt) => (
          <li key={attempt.attemptId} className="border-b-4 border-fill">
            <Link
              href={
                attempt.state === 'in-class' || attempt.state === 'paused'
                  ? paths.play(attempt.scheduledClassId)
                  : paths.attemptTally(attempt.attemptId)
              }
              className="grid gap-x-8 gap-y-0.5 py-3 hover:bg-ground-board sm:grid-cols-[14rem_1fr_8rem_6rem] sm:items-baseline"
            >
              <span className="text-text-quiet">{dayName(attempt.day)}</span>
              <span className="font-display text-2xl font-bold">{attempt.title}</span>
              <span>
                {STATE_TEXT[attempt.state]}
                {attempt.late ? ', late' : ''}
              </span>
              <span className="text-text-quiet">
                {attempt.rpe === null ? '' : `RPE ${attempt.rpe}`}
              </span>
            </Link>
          </li>
        ))}
      </ul>
      {more && last ? (
        <Link
          className={buttonClass('text', 'mt-6')}
          href={`${paths.tally()}?before=${last.attemptId}`}
        >
          Earlier classes
        </Link>
      ) : null}
    </>
  )
}
