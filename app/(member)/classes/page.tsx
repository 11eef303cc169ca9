import type { Metadata } from 'next'
import { addDays, format } from 'date-fns'
import Link from 'next/link'
import { Suspense, type ReactNode } from 'react'
import { ClassDays } from '@/components/classes/class-days'
import { PageFrame } from '@/components/site/page-frame'
import { buttonClass } from '@/components/ui/button'
import { Empty } from '@/components/ui/empty'
import { PageTitle, Part } from '@/components/ui/heading'
import { SkeletonLines } from '@/components/ui/skeleton'
import { requireRole } from '@/server/auth/viewer'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { listBetween, localDay } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'Classes' }

const WEEKS_SHOWN = 2
const WEEKS_MORE = 6
const WEEKS_MOST = 104

/** Weeks to show, from the address; what makes no sense counts as not given. */
function weeksOf(text: string | string[] | undefined): number {
  const weeks = Number(text)
  return Number.isInteger(weeks) && weeks > 0 ? Math.min(weeks, WEEKS_MOST) : WEEKS_SHOWN
}

function remark(one: ScheduledClassSummary): ReactNode {
  const [latest] = one.myAttempts
  if (latest?.state === 'in-class' || latest?.state === 'paused') return <strong>in class</strong>
  if (one.myAttempts.some((attempt) => attempt.state === 'finished')) {
    return <span className="font-semibold text-done">✓ done</span>
  }
  return latest?.state === 'stopped' ? 'stopped' : null
}

interface Span {
  ahead: number
  behind: number
}

export default async function ClassesPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const { ahead, behind } = await searchParams
  const viewer = await requireRole(paths.classes(), 'member')
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle>Classes</PageTitle>
        {/* Read below the guard, so that a page that is not one's own is still a 404. */}
        <Suspense fallback={<SkeletonLines rows={12} />}>
          <Schedule viewer={viewer} span={{ ahead: weeksOf(ahead), behind: weeksOf(behind) }} />
        </Suspense>
      </div>
    </PageFrame>
  )
}

async function Schedule({ viewer, span }: { viewer: Viewer; span: Span }) {
  const today = localDay(viewer.gym.timeZone, new Date())
  const day = (offset: number) =>
    format(addDays(new Date(`${today}T12:00:00`), offset), 'yyyy-MM-dd')
  const db = defaultDb()
  const ahead = (await listBetween(viewer, { from: today, to: day(7 * span.ahead) }, db)).reverse()
  const behind = await listBetween(viewer, { from: day(-7 * span.behind), to: day(-1) }, db)
  const shared = {
    today,
    dateStyle: await readerDateStyle(),
    hrefOf: paths.classPage,
    remark,
  }
  return (
    <div className="mt-8 grid gap-x-14 gap-y-12 xl:grid-cols-2">
      <Part title="Today and ahead">
        {ahead.length === 0 ? (
          <Empty>
            <p>Nothing is planned for the {weeksText('next', span.ahead)}.</p>
          </Empty>
        ) : (
          <ClassDays classes={ahead} {...shared} />
        )}
        <More span={{ ...span, ahead: span.ahead + WEEKS_MORE }}>Further ahead</More>
      </Part>
      <Part title="Behind you">
        {behind.length === 0 ? (
          <Empty>
            <p>There were no classes in the {weeksText('last', span.behind)}.</p>
          </Empty>
        ) : (
          <ClassDays classes={behind} {...shared} />
        )}
        <More span={{ ...span, behind: span.behind + WEEKS_MORE }}>Earlier classes</More>
      </Part>
    </div>
  )
}

const weeksText = (which: string, weeks: number): string =>
  weeks === 1 ? `${which} week` : `${which} ${weeks === 2 ? 'two' : weeks} weeks`

function More({ span, children }: { span: Span; children: ReactNode }) {
  if (span.ahead > WEEKS_MOST || span.behind > WEEKS_MOST) return null
  return (
    <Link
      scroll={false}
      className={buttonClass('text', 'mt-3')}
      href={`${paths.classes()}?ahead=${span.ahead}&behind=${span.behind}`}
    >
      {children}
    </Link>
  )
}
