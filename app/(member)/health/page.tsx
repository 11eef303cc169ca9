import type { Metadata } from 'next'
import { HealthForm } from '@/components/health/health-form'
import { PageFrame } from '@/components/site/page-frame'
import { PageTitle } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { dateOf } from '@/server/contract/format'
import { safeNext } from '@/server/contract/forms'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { getHealth } from '@/server/data/health'
import { readerDateStyle } from '@/server/http/reader'

export const metadata: Metadata = { title: 'Health questions' }

export default async function HealthPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const { next } = await searchParams
  const viewer = await requireRole(paths.health(), 'member')
  const health = await getHealth(viewer, { now: new Date() }, defaultDb())
  return (
    <PageFrame viewer={viewer}>
      <div className="max-w-4xl page">
        <PageTitle size="long">Health questions</PageTitle>
        <div className="mt-4 max-w-2xl space-y-3 text-lg">
          <p>
            Exercise can hurt people. These questions find out whether you should talk to somebody
            licensed before you start. Each says what a yes changes; no answer shuts you out for
            good.
          </p>
          <p className="text-text-quiet">
            You and the coaches of {viewer.gym.name} see your answers, nobody else.
            {health.answeredAt
              ? ` You answered last on ${dateOf(health.answeredAt, viewer.gym.timeZone, await readerDateStyle())}.`
              : ''}
          </p>
        </div>
        <div className="mt-6">
          <HealthForm
            health={health}
            next={safeNext(typeof next === 'string' ? next : null) ?? paths.today()}
          />
        </div>
      </div>
    </PageFrame>
  )
}
