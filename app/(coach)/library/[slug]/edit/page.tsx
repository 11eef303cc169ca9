import type { Metadata } from 'next'
import { cache } from 'react'
import { MovementForm } from '@/components/library/movement-form'
import { PageFrame } from '@/components/site/page-frame'
import { PageTitle } from '@/components/ui/heading'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { getMovement } from '@/server/data/library'

interface PageProps {
  params: Promise<{ slug: string }>
}

/** Once a request, for the page and its title. */
const read = cache(async (slug: string) => {
  const viewer = await requireRole(paths.editMovement(slug), 'coach')
  const found = await orNotFound(getMovement(viewer, { slug, now: new Date() }, defaultDb()))
  return { viewer, found }
})

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { found } = await read((await params).slug)
  return { title: `Edit ${found.movement.name}` }
}

export default async function EditMovementPage({ params }: PageProps) {
  const { viewer, found } = await read((await params).slug)
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle size="long">{`Edit ${found.movement.name}`}</PageTitle>
        <MovementForm found={found} />
      </div>
    </PageFrame>
  )
}
