import type { Metadata } from 'next'
import { addDays, format } from 'date-fns'
import { ClassDays } from '@/components/classes/class-days'
import { PageFrame } from '@/components/site/page-frame'
import { PageTitle } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { participation } from '@/server/data/boards'
import { listBetween, localDay } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'All boards' }

const DAYS_BEHIND = 84

export default async function AllBoardsPage() {
  const viewer = await requireRole(paths.boardAll(), 'coach')
  const db = defaultDb()
  const today = localDay(viewer.gym.timeZone, new Date())
  const from = format(addDays(new Date(`${today}T12:00:00`), -DAYS_BEHIND), 'yyyy-MM-dd')
  const classes = await listBetween(viewer, { from, to: today }, db)
  const counts = await participation(
    viewer,
    { scheduledClassIds: classes.map((one) => one.scheduledClassId) },
    db,
  )
  return (
    <PageFrame viewer={viewer}>
      <div className="max-w-5xl page">
        <PageTitle>All boards</PageTitle>
        <p className="mt-3 text-text-quiet">Today and the twelve weeks before it.</p>
        <div className="mt-6 border-t-4 border-line">
          {classes.length === 0 ? (
            <p className="py-4">No class has been held yet.</p>
          ) : (
            <ClassDays
              classes={classes}
              today={today}
              dateStyle={await readerDateStyle()}
              hrefOf={paths.boardOf}
              remark={({ scheduledClassId }) => {
                const count = counts.get(scheduledClassId)
                return count ? `${count.finished} of ${count.started} finished` : 'nobody'
              }}
            />
          )}
        </div>
      </div>
    </PageFrame>
  )
}
