'use client'
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { usePathname, useSearchParams } from 'next/navigation'
import { useDeferredValue, useState, useTransition } from 'react'
import type { BoardDto } from '@/server/contract/board'
import {
  arrangeRows,
  boardState,
  boardViewQuery,
  parseBoardView,
  type BoardState,
  type BoardView,
} from '@/server/contract/board-view'
import { paths } from '@/server/contract/paths'
import { useBoard } from '@/hooks/use-board'
import { useMedia } from '@/hooks/use-media'
import { useNow } from '@/hooks/use-now'
import { BoardFilters } from './board-filters'
import { BoardHeading } from './board-heading'
import { BoardList } from './board-list'
import { BoardTable } from './board-table'
import { LiveLine } from './live-line'

/** The board of one class. `initial`: as the page was rendered. */
export function Board({ initial }: { initial: BoardDto }) {
  const [client] = useState(() => new QueryClient())
  return (
    <QueryClientProvider client={client}>
      <LiveBoard initial={initial} />
    </QueryClientProvider>
  )
}

function LiveBoard({ initial }: { initial: BoardDto }) {
  const { board, live, problem, reload } = useBoard(initial)
  const nowMs = useNow(Date.parse(initial.readAt), 5_000)
  const [view, setView] = useBoardView()
  const phone = useMedia('(max-width: 50rem)')
  // What is typed and chosen shows at once; five hundred rows may follow a moment later.
  const shownView = useDeferredValue(view)
  const rows = arrangeRows(board, shownView, nowMs)
  const counts = countStates(board, nowMs)
  const query = boardViewQuery(view)
  const onSort = (sort: BoardView['sort']) =>
    setView({
      ...view,
      sort,
      order: view.sort === sort && sort !== 'attention' && view.order === 'up' ? 'down' : 'up',
    })
  return (
    <>
      <BoardHeading board={board} counts={counts} />
      <LiveLine
        readAt={board.readAt}
        live={live}
        problem={problem}
        reload={reload}
        timeZone={board.timeZone}
      />
      <BoardFilters
        view={view}
        setView={setView}
        counts={counts}
        blocks={board.version.spec.blocks}
        csvAddress={`${paths.api.boardCsv(board.scheduledClass.scheduledClassId)}${query ? `?${query}` : ''}`}
        phone={phone}
      />
      {board.rows.length === 0 ? (
        <p className="mt-6 border-t-4 border-line py-10 text-lg">
          Nobody is in this class’s group yet. Members who join the gym appear here.
        </p>
      ) : rows.length === 0 ? (
        <div className="mt-6 border-t-4 border-line py-10">
          <p className="text-lg">No member fits these filters.</p>
          <button
            type="button"
            className="mt-3 min-h-12 cursor-pointer font-semibold text-rest underline decoration-2 underline-offset-4"
            onClick={() => setView(parseBoardView(new URLSearchParams()))}
          >
            Show all {board.rows.length}
          </button>
        </div>
      ) : phone ? (
        <BoardList dto={board} rows={rows} view={shownView} nowMs={nowMs} />
      ) : (
        <BoardTable dto={board} rows={rows} view={shownView} nowMs={nowMs} onSort={onSort} />
      )}
      <p className="mt-4 text-sm text-text-quiet">
        A rung is a logged round, as long as its reps, at its moment. Tinted: the forecast. Yellow:
        where they are now. 1 and 3: an easier or a harder option.
      </p>
    </>
  )
}

/** The view in the address; changing it replaces the address, so that reload and a sent link show the same. */
function useBoardView(): [BoardView, (view: BoardView) => void] {
  const params = useSearchParams()
  const pathname = usePathname()
  const [, startTransition] = useTransition()
  const setView = (view: BoardView) => {
    const query = boardViewQuery(view)
    startTransition(() => {
      window.history.replaceState(null, '', query ? `${pathname}?${query}` : pathname)
    })
  }
  return [parseBoardView(new URLSearchParams(params.toString())), setView]
}

function countStates(board: BoardDto, nowMs: number): Record<BoardState, number> {
  const counts: Record<BoardState, number> = {
    stopped: 0,
    'in-class': 0,
    quiet: 0,
    finished: 0,
    'not-started': 0,
  }
  for (const row of board.rows) counts[boardState(row, nowMs)] += 1
  return counts
}
