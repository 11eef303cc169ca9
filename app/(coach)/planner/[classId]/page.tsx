import type { Metadata } from 'next'
import { cache } from 'react'
import { PlannedClassPage } from '@/components/planner/planned-class'
import { PageFrame } from '@/components/site/page-frame'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { swapsOf, weeksLoad } from '@/server/data/loads'
import { forecastsOf, getLearntPaces } from '@/server/data/paces'
import { getPlannedClass } from '@/server/data/planned-classes'
import { readerDateStyle } from '@/server/http/reader'

interface PageProps {
  params: Promise<{ classId: string }>
}

/** Once a request, for the page and its title. */
const readClass = cache(async (classId: string) => {
  const viewer = await requireRole(paths.plannedClass(classId), 'coach')
  const now = new Date()
  const planned = await orNotFound(getPlannedClass(viewer, { classId, now }, defaultDb()))
  return { viewer, planned, now }
})

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { planned } = await readClass((await params).classId)
  return { title: planned.version.spec.title }
}

export default async function PlannerClassPage({ params }: PageProps) {
  const { viewer, planned, now } = await readClass((await params).classId)
  const learnt = await getLearntPaces(viewer, { now }, defaultDb())
  return (
    <PageFrame viewer={viewer}>
      <PlannedClassPage
        planned={planned}
        learnt={learnt}
        weeks={await weeksLoad(viewer, { now }, defaultDb())}
        swaps={await swapsOf(viewer, { version: planned.version }, defaultDb())}
        forecasts={forecastsOf(planned.version, learnt)}
        timeZone={viewer.gym.timeZone}
        dateStyle={await readerDateStyle()}
      />
    </PageFrame>
  )
}
