'use client'
/** A board kept true: fetched once, read again whenever the live stream says that it changed. */
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useEffect, useState } from 'react'
import type { BoardDto } from '@/server/contract/board'
import type { ErrorBody } from '@/server/contract/errors'
import { paths } from '@/server/contract/paths'
import { listenToBoard, type LiveState } from './live-channel'

/** The floor under the stream: what it may have missed is seen after this long all the same. */
const POLL_WHILE_LIVE_MS = 30_000
const POLL_WHILE_LOST_MS = 2_000
/** A full class changes many times a second; one reading a second shows each change within two. */
const LEAST_BETWEEN_MS = 1_000

export interface LiveBoard {
  board: BoardDto
  live: LiveState
  /** The last reading failed: what to tell the coach. */
  problem: string | null
  reload: () => void
}

async function readBoard(scheduledClassId: string, signal: AbortSignal): Promise<BoardDto> {
  const answer = await fetch(paths.api.board(scheduledClassId), { signal, cache: 'no-store' })
  if (answer.ok) return (await answer.json()) as BoardDto
  const body = (await answer.json().catch(() => null)) as ErrorBody | null
  throw new Error(body?.error.message ?? `The board could not be read (${answer.status}).`)
}

/** `initial`: what the page was rendered with. */
export function useBoard(initial: BoardDto): LiveBoard {
  const scheduledClassId = initial.scheduledClass.scheduledClassId
  const [live, setLive] = useState<LiveState>('connecting')
  const client = useQueryClient()
  const query = useQuery({
    queryKey: ['board', scheduledClassId],
    queryFn: ({ signal }) => readBoard(scheduledClassId, signal),
    initialData: initial,
    initialDataUpdatedAt: Date.parse(initial.readAt),
    staleTime: POLL_WHILE_LIVE_MS,
    refetchInterval: live === 'live' ? POLL_WHILE_LIVE_MS : POLL_WHILE_LOST_MS,
    refetchOnWindowFocus: 'always',
    retry: false,
  })

  useEffect(() => {
    let wanted: ReturnType<typeof setTimeout> | undefined
    let readMs = 0
    const end = listenToBoard(scheduledClassId, {
      onState: setLive,
      onChange: ({ revision }) => {
        const shown = client.getQueryData<BoardDto>(['board', scheduledClassId])
        if (shown && shown.revision >= revision) return
        wanted ??= setTimeout(
          () => {
            wanted = undefined
            readMs = Date.now()
            void client.invalidateQueries({ queryKey: ['board', scheduledClassId] })
          },
          Math.max(0, readMs + LEAST_BETWEEN_MS - Date.now()),
        )
      },
    })
    return () => {
      clearTimeout(wanted)
      end()
    }
  }, [client, scheduledClassId])

  return {
    board: query.data,
    live,
    problem: query.error
      ? query.error instanceof TypeError
        ? 'No connection to the gym’s server.'
        : query.error.message
      : null,
    reload: () => void query.refetch(),
  }
}
