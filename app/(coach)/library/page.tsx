import type { Metadata } from 'next'
import { FigureSheet } from '@/components/library/figure-sheet'
import { LibraryList } from '@/components/library/library-list'
import { PageFrame } from '@/components/site/page-frame'
import { LinkButton } from '@/components/ui/button'
import { PageTitle } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { EVERY_MOVEMENT } from '@/server/contract/library-filter'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { listLibrary } from '@/server/data/library'

export const metadata: Metadata = { title: 'Library' }

/** The gym's movements, for its coaches. What of them is shown stands in the address. */
export default async function LibraryPage() {
  const viewer = await requireRole(paths.library(), 'coach')
  const rows = await listLibrary(viewer, EVERY_MOVEMENT, defaultDb())
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <div className="flex flex-wrap items-end justify-between gap-x-12 gap-y-4">
          <PageTitle>Library</PageTitle>
          <LinkButton href={paths.newMovement()}>New movement</LinkButton>
        </div>
        <FigureSheet figures={rows.map((row) => row.figure)} />
        <LibraryList rows={rows} />
      </div>
    </PageFrame>
  )
}
