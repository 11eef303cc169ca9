import type { Metadata } from 'next'
import { cache } from 'react'
import { ClassOverview } from '@/components/classes/class-overview'
import { KitLines } from '@/components/classes/kit-lines'
import { HealthLines } from '@/components/health/health-lines'
import { PageFrame } from '@/components/site/page-frame'
import { orNotFound, requireViewer } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { getScheduledClass } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { fitOwn } from '@/server/data/fit'
import { forecastsOf, getLearntPaces } from '@/server/data/paces'
import { getHealth } from '@/server/data/health'
import { getKit } from '@/server/data/people'
import { readerDateStyle } from '@/server/http/reader'

interface PageProps {
  params: Promise<{ scheduledClassId: string }>
}

/** Once a request, for the page and its title. */
const readClass = cache(async (scheduledClassId: string) => {
  const viewer = await requireViewer(paths.classPage(scheduledClassId))
  const found = await orNotFound(getScheduledClass(viewer, { scheduledClassId }, defaultDb()))
  return { viewer, ...found }
})

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { scheduledClass } = await readClass((await params).scheduledClassId)
  return { title: scheduledClass.title }
}

export default async function ClassPage({ params }: PageProps) {
  const { viewer, scheduledClass, version } = await readClass((await params).scheduledClassId)
  const db = defaultDb()
  const now = new Date()
  const dateStyle = await readerDateStyle()
  const canPlay = viewer.roles.includes('member')
  const { timeZone } = viewer.gym
  return (
    <PageFrame viewer={viewer}>
      <ClassOverview
        scheduledClass={scheduledClass}
        version={version}
        forecasts={forecastsOf(version, await getLearntPaces(viewer, { now }, db))}
        fitted={canPlay ? await fitOwn(viewer, { version }, db) : []}
        timeZone={timeZone}
        dateStyle={dateStyle}
        now={now}
        when={null}
        canPlay={canPlay}
        kit={<KitLines version={version} kit={await getKit(viewer, {}, db)} isOwn={canPlay} />}
        health={
          canPlay ? (
            <HealthLines
              health={await getHealth(viewer, { now }, db)}
              timeZone={timeZone}
              dateStyle={dateStyle}
              from={paths.classPage(scheduledClass.scheduledClassId)}
            />
          ) : null
        }
      />
    </PageFrame>
  )
}
