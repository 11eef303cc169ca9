import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { Player } from '@/components/player/player'
import { requireViewer } from '@/server/auth/viewer'
import { AppError } from '@/server/contract/errors'
import { paths } from '@/server/contract/paths'
import { defaultDb } from '@/server/data/db'
import { getPlayerData } from '@/server/data/player'

export const metadata: Metadata = { title: 'Play' }

export default async function PlayPage({
  params,
}: {
  params: Promise<{ scheduledClassId: string }>
}) {
  const { scheduledClassId } = await params
  const viewer = await requireViewer(paths.play(scheduledClassId))
  const data = await getPlayerData(
    viewer,
    { scheduledClassId, now: new Date() },
    defaultDb(),
  ).catch((error: unknown) => {
    if (error instanceof AppError && error.code === 'not-found') notFound()
    throw error
  })
  return <Player data={data} timeZone={viewer.gym.timeZone} />
}
