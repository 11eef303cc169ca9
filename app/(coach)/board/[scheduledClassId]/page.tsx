import type { Metadata } from 'next'
import { Board } from '@/components/board/board'
import { PageFrame } from '@/components/site/page-frame'
import { orNotFound, requireRole } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'
import { getBoard } from '@/server/data/boards'
import { defaultDb } from '@/server/data/db'

export const metadata: Metadata = { title: 'Board' }

export default async function BoardPage({
  params,
}: {
  params: Promise<{ scheduledClassId: string }>
}) {
  const { scheduledClassId } = await params
  const viewer = await requireRole(paths.boardOf(scheduledClassId), 'coach')
  const board = await orNotFound(
    getBoard(viewer, { scheduledClassId, now: new Date() }, defaultDb()),
  )
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <Board initial={board} />
      </div>
    </PageFrame>
  )
}
