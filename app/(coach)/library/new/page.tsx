import type { Metadata } from 'next'
import { MovementForm } from '@/components/library/movement-form'
import { PageFrame } from '@/components/site/page-frame'
import { PageTitle } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'

export const metadata: Metadata = { title: 'New movement' }

export default async function NewMovementPage() {
  const viewer = await requireRole(paths.newMovement(), 'coach')
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle size="long">New movement</PageTitle>
        <MovementForm found={null} />
      </div>
    </PageFrame>
  )
}
