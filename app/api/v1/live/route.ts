/**
 * GET ?boards=id,id: event stream for the gym's coaches. Event `board` carries `LiveBoardChange`: that
 * board is at that revision, read it again if yours is older. Present revisions come at once, so a
 * reader that was away catches up. A comment every 15 s keeps the line open. The stream ends within 15 s
 * after a sign-out, a new password, a deactivation or a switch to another gym.
 */
import { AppError } from '@/server/contract/errors'
import { readSessionCookie } from '@/server/auth/cookie'
import { sessionOf } from '@/server/auth/viewer'
import { listenableBoards } from '@/server/data/boards'
import { defaultDb } from '@/server/data/db'
import { handler } from '@/server/http/handler'
import { boardFeed } from '@/server/http/board-feed'
import { isClosing, registerStream } from '@/server/live/registry'

export const dynamic = 'force-dynamic'

const HEARTBEAT_MS = 15_000
/** With the five seconds that the database may take, a stream outlives its session by 15 s at most. */
const SESSION_CHECK_MS = 10_000
const MOST_BOARDS = 20

export const GET = handler<Record<string, never>>(async (request, _params, { viewer }) => {
  if (isClosing())
    throw new AppError('unavailable', 'The server is starting anew. Trying again by itself.')
  const wanted = (new URL(request.url).searchParams.get('boards') ?? '').split(',').filter(Boolean)
  if (wanted.length === 0 || wanted.length > MOST_BOARDS) {
    throw new AppError('bad-input', `Name 1 to ${MOST_BOARDS} boards.`)
  }
  const boards = await listenableBoards(viewer, { scheduledClassIds: wanted }, defaultDb())
  if (boards.length === 0) throw new AppError('not-found', 'There is no such board.')
  const token = await readSessionCookie()
  const text = new TextEncoder()
  let close = () => undefined as void
  /** A stream that its reader has cancelled is closed already. */
  let isCancelled = false

  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      let isOpen = true
      const send = (chunk: string) => {
        if (isOpen) controller.enqueue(text.encode(chunk))
      }
      const unread = boardFeed().read(boards, (change) =>
        send(`id: ${change.revision}\nevent: board\ndata: ${JSON.stringify(change)}\n\n`),
      )
      const heartbeat = setInterval(() => send(': here\n\n'), HEARTBEAT_MS)
      const sessionCheck = setInterval(() => {
        sessionOf(token).then(
          (session) => {
            if (!session?.viewer.roles.includes('coach') || session.viewer.gymId !== viewer.gymId)
              close()
          },
          // The database is away: the stream stays, the reader sees an old board and its age.
          () => undefined,
        )
      }, SESSION_CHECK_MS)
      const forget = registerStream(() => close())
      close = () => {
        if (!isOpen) return
        isOpen = false
        clearInterval(heartbeat)
        clearInterval(sessionCheck)
        unread()
        forget()
        if (!isCancelled) controller.close()
      }
      request.signal.addEventListener('abort', close)
      send('retry: 2000\n\n')
    },
    cancel() {
      isCancelled = true
      close()
    },
  })
  return new Response(body, {
    headers: {
      'content-type': 'text/event-stream; charset=utf-8',
      'cache-control': 'no-cache, no-transform',
      'x-accel-buffering': 'no',
    },
  })
})
