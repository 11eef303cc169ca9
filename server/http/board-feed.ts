import 'server-only'
import { database, databaseSql } from '@/db/client'
import { BOARD_CHANNEL } from '@/server/data/board-notices'
import { boardRevisions } from '@/server/data/boards'
import { BoardFeed } from '@/server/live/boards'

const kept = globalThis as typeof globalThis & { floorsideFeed?: BoardFeed }

/** This process's feed of changed boards. */
export function boardFeed(): BoardFeed {
  kept.floorsideFeed ??= new BoardFeed({
    listen: async (heard, listening) => {
      await databaseSql().listen(BOARD_CHANNEL, heard, listening)
    },
    revisions: (ids) => boardRevisions(ids, database()),
    setTimer: (work, ms) => {
      const timer = setTimeout(work, ms)
      timer.unref()
      return timer
    },
  })
  return kept.floorsideFeed
}
