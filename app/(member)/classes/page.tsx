import type { Metadata } from 'next'
import { addDays, format } from 'date-fns'
import { Suspense } from 'react'
import { ClassDays } from '@/components/classes/class-days'
import { PageFrame } from '@/components/site/page-frame'
import { SkeletonLines } from '@/components/ui/skeleton'
import { requireRole } from '@/server/auth/viewer'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { listBetween, localDay } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'

export const metadata: Metadata = { title: 'Classes' }

const DAYS_AHEAD = 28
const DAYS_BEHIND = 56

const remark = (one: ScheduledClassSummary): string => {
  if (one.myAttempts.some((attempt) => attempt.state === 'finished')) return 'done'
  if (one.myAttempts.some((attempt) => attempt.state === 'stopped')) return 'stopped'
  return one.myAttempts.length > 0 ? 'open' : ''
}

export default async function ClassesPage() {
  const viewer = await requireRole(paths.classes(), 'member')
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <h1 className="text-6xl font-extrabold sm:text-7xl">Classes</h1>
        <Suspense fallback={<SkeletonLines rows={8} />}>
          <Schedule viewer={viewer} />
        </Suspense>
      </div>
    </PageFrame>
  )
}

async function Schedule({ viewer }: { viewer: Viewer }) {
  const today = localDay(viewer.gym.timeZone, new Date())
  const day = (offset: number) =>
    format(addDays(new Date(`${today}T12:00:00`), offset), 'yyyy-MM-dd')
  const db = defaultDb()
  const ahead = (await listBetween(viewer, { from: today, to: day(DAYS_AHEAD) }, db)).reverse()
  const behind = await listBetween(viewer, { from: day(-DAYS_BEHIND), to: day(-1) }, db)
  return (
    <div className="mt-8 grid gap-x-14 gap-y-12 xl:grid-cols-2">
      <section>
        <h2 className="border-b-4 border-line pb-1 text-3xl">Today and ahead</h2>
        {ahead.length === 0 ? (
          <p className="py-4">Nothing is scheduled for the next four weeks.</p>
        ) : (
          <ClassDays classes={ahead} hrefOf={paths.classPage} remark={remark} />
        )}
      </section>
      <section>
        <h2 className="border-b-4 border-line pb-1 text-3xl">Behind you</h2>
        {behind.length === 0 ? (
          <p className="py-4">No classes in the last eight weeks.</p>
        ) : (
          <ClassDays classes={behind} hrefOf={paths.classPage} remark={remark} />
        )}
      </section>
    </div>
  )
}
