import type { Metadata } from 'next'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { listToday, nearestClasses } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'

export const metadata: Metadata = { title: 'Board' }

/** The board of today's class, or where to find another. */
export default async function BoardTodayPage() {
  const viewer = await requireRole(paths.board(), 'coach')
  const now = new Date()
  const [first] = await listToday(viewer, { now }, defaultDb())
  if (first) redirect(paths.boardOf(first.scheduledClassId))
  const { next, last } = await nearestClasses(viewer, { now }, defaultDb())
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <h1 className="text-6xl font-extrabold">No class today</h1>
        <ul className="mt-6 space-y-3 text-xl">
          {last ? (
            <li>
              Last:{' '}
              <Link className={buttonClass('text')} href={paths.boardOf(last.scheduledClassId)}>
                {last.title}
              </Link>
              , {dayName(last.day)}
            </li>
          ) : null}
          {next ? (
            <li>
              Next:{' '}
              <Link className={buttonClass('text')} href={paths.boardOf(next.scheduledClassId)}>
                {next.title}
              </Link>
              , {dayName(next.day)}
            </li>
          ) : null}
          {!next && !last ? <li>No class has been scheduled yet.</li> : null}
        </ul>
      </div>
    </PageFrame>
  )
}
