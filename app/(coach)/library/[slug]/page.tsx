import type { Metadata } from 'next'
import { cache } from 'react'
import { MovementPage } from '@/components/library/movement-page'
import { PageFrame } from '@/components/site/page-frame'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { getMovement } from '@/server/data/library'

interface PageProps {
  params: Promise<{ slug: string }>
}

/** Once a request, for the page and its title. */
const read = cache(async (slug: string) => {
  const viewer = await requireRole(paths.movement(slug), 'coach')
  const found = await orNotFound(getMovement(viewer, { slug, now: new Date() }, defaultDb()))
  return { viewer, found }
})

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { found } = await read((await params).slug)
  return { title: found.movement.name }
}

export default async function LibraryMovementPage({ params }: PageProps) {
  const { viewer, found } = await read((await params).slug)
  return (
    <PageFrame viewer={viewer}>
      <MovementPage found={found} />
    </PageFrame>
  )
}
