import type { Metadata } from 'next'
import { ClassesTable } from '@/components/planner/classes-table'
import { PageFrame } from '@/components/site/page-frame'
import { PageTitle } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { listPlannedClasses } from '@/server/data/planned-classes'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'Planner' }

/** The gym's classes, for its coaches. */
export default async function PlannerPage() {
  const viewer = await requireRole(paths.planner(), 'coach')
  const classes = await listPlannedClasses(viewer, { now: new Date() }, defaultDb())
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle>Planner</PageTitle>
        <ClassesTable
          classes={classes}
          timeZone={viewer.gym.timeZone}
          dateStyle={await readerDateStyle()}
        />
      </div>
    </PageFrame>
  )
}
