import clsx from 'clsx'
import type { CSSProperties, ReactNode } from 'react'
import type { BoardView } from '@/server/contract/board-view'

interface SortHeadProps {
  sort: BoardView['sort']
  view: BoardView
  onSort: (sort: BoardView['sort']) => void
  className?: string
  style?: CSSProperties
  children: ReactNode
}

/** A column head that sorts by its column; a second press turns the order round. */
export function SortHead({ sort, view, onSort, className, style, children }: SortHeadProps) {
  const sorted = view.sort === sort
  return (
    <th
      scope="col"
      aria-sort={sorted ? (view.order === 'up' ? 'ascending' : 'descending') : 'none'}
      className={clsx('align-middle font-semibold', className)}
      style={style}
    >
      <button
        type="button"
        onClick={() => onSort(sort)}
        className="w-full cursor-pointer text-inherit"
        style={{ textAlign: 'inherit' }}
      >
        {children}
        {sorted && sort !== 'attention' ? (
          <span
            aria-hidden
            className="absolute right-1 bottom-0 translate-y-1/2 border-2 border-on-present bg-present px-1 text-xs leading-4 text-on-present"
          >
            {view.order === 'up' ? '↓' : '↑'}
          </span>
        ) : null}
      </button>
    </th>
  )
}
