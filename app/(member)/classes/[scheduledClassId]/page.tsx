import type { Metadata } from 'next'
import { ClassOverview } from '@/components/classes/class-overview'
import { PageFrame } from '@/components/site/page-frame'
import { orNotFound, requireViewer } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { getScheduledClass } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { getHealth } from '@/server/data/health'
import { getKit } from '@/server/data/people'

export const metadata: Metadata = { title: 'Class' }

export default async function ClassPage({
  params,
}: {
  params: Promise<{ scheduledClassId: string }>
}) {
  const { scheduledClassId } = await params
  const viewer = await requireViewer(paths.classPage(scheduledClassId))
  const db = defaultDb()
  const now = new Date()
  const { scheduledClass, version } = await orNotFound(
    getScheduledClass(viewer, { scheduledClassId }, db),
  )
  const canPlay = viewer.roles.includes('member')
  return (
    <PageFrame viewer={viewer}>
      <ClassOverview
        scheduledClass={scheduledClass}
        version={version}
        timeZone={viewer.gym.timeZone}
        now={now}
        when={null}
        kit={await getKit(viewer, {}, db)}
        health={canPlay ? await getHealth(viewer, { now }, db) : null}
        canPlay={canPlay}
      />
    </PageFrame>
  )
}
