import clsx from 'clsx'
import Link from 'next/link'
import { memo, type ReactNode } from 'react'
import type { BoardDto, BoardRow } from '@/server/contract/board'
import {
  boardState,
  looksFirst,
  BOARD_STATE_TEXT,
  type BoardView,
} from '@/server/contract/board-view'
import { paths } from '@/server/contract/paths'
import type { Block } from '@/server/engine/spec/schema'
import { BlockCell } from './block-cell'
import { blockShapes, type BlockShape } from './block-shapes'
import { remarksOf } from './to-know'
import { ForecastCell } from './forecast-cell'
import { groupRows } from './groups'
import { RowState } from './row-state'
import { SortHead } from './sort-head'
import { Remarks } from './remarks'

export interface BoardTableProps {
  dto: BoardDto
  rows: readonly BoardRow[]
  view: BoardView
  nowMs: number
  onSort: (sort: BoardView['sort']) => void
}

/** How wide a block's column is, in rem: what its cell has to show, not its minutes alone. */
function columnRem(block: Block, shape: BlockShape | undefined): number {
  if (block.format.type === 'rest') return 3.6
  if (!shape?.counted) return 8.5
  return block.kind === 'finisher' ? 10 : 14
}

/** Members by blocks: the class's lane is the head, every row a lane of its own. */
export function BoardTable({ dto, rows, view, nowMs, onSort }: BoardTableProps) {
  const shapes = blockShapes(dto)
  const { blocks } = dto.version.spec
  const groups = groupRows(rows, view, nowMs)
  let number = 0
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Members by blocks">
      <table className="w-full min-w-max border-collapse text-left">
        <thead>
          <tr className="border-y-4 border-line">
            <SortHead
              sort="name"
              view={view}
              onSort={onSort}
              className="sticky left-0 z-10 min-w-52 bg-ground px-3 py-2"
            >
              {rows.length === 1 ? '1 member' : `${rows.length} members`}
            </SortHead>
            {blocks.map((block) => {
              const filled = block.kind === 'work'
              if (filled) number += 1
              return (
                <SortHead
                  key={block.id}
                  sort={`block:${block.id}`}
                  view={view}
                  onSort={onSort}
                  className={clsx(
                    'relative border-l-4 border-line px-0 py-0',
                    block.format.type === 'rest' && 'text-center',
                  )}
                  style={{ minWidth: `${columnRem(block, shapes.get(block.id))}rem` }}
                >
                  <BayHead block={block} number={filled ? number : null} />
                </SortHead>
              )
            })}
            <SortHead
              sort="rpe"
              view={view}
              onSort={onSort}
              className="border-l-4 border-line px-3 py-2"
            >
              RPE
            </SortHead>
            <SortHead sort="attention" view={view} onSort={onSort} className="min-w-64 px-3 py-2">
              To know
            </SortHead>
          </tr>
        </thead>
        <tbody>
          <tr className="text-text-quiet">
            <th scope="row" className="sticky left-0 z-10 bg-ground px-3 py-1.5 font-normal">
              Forecast
            </th>
            {blocks.map((block) => (
              <Cell key={block.id}>
                <ForecastCell dto={dto} block={block} shape={shapes.get(block.id)} />
              </Cell>
            ))}
            <td className="border-l-4 border-fill px-3">
              {dto.version.spec.intendedRpe !== undefined
                ? `${dto.version.spec.intendedRpe} meant`
                : ''}
            </td>
            <td className="px-3 text-sm">An estimate, at the expected tiring</td>
          </tr>
        </tbody>
        {groups.map((group) => (
          <tbody key={group.title ?? 'all'}>
            {group.title ? (
              <tr className="border-b-4 border-line-lesser">
                <th
                  scope="rowgroup"
                  colSpan={blocks.length + 3}
                  className="sticky left-0 px-3 pt-4 pb-1 font-display text-xl font-bold"
                >
                  {group.title}
                </th>
              </tr>
            ) : null}
            {group.rows.map((row) => (
              <Row key={row.membershipId} dto={dto} row={row} shapes={shapes} nowMs={nowMs} />
            ))}
          </tbody>
        ))}
      </table>
    </div>
  )
}

function Cell({ children }: { children: ReactNode }) {
  return <td className="border-l-4 border-fill px-2 py-1.5 align-middle">{children}</td>
}

function BayHead({ block, number }: { block: Block; number: number | null }) {
  const work = block.kind === 'work'
  return (
    <span className="block p-1">
      <span
        className={clsx(
          'flex h-10 items-center gap-2 overflow-hidden px-2 condensed whitespace-nowrap',
          work && 'bg-fill',
          block.kind === 'finisher' && 'hatched',
          !work &&
            block.kind !== 'finisher' &&
            block.format.type !== 'rest' &&
            'border-b-8 border-fill',
        )}
      >
        {number !== null ? <span className="font-black">{number}</span> : null}
        <span className="truncate">{block.title}</span>
      </span>
    </span>
  )
}

interface RowProps {
  dto: BoardDto
  row: BoardRow
  shapes: Map<string, BlockShape>
  nowMs: number
}

const Row = memo(function Row({ dto, row, shapes, nowMs }: RowProps) {
  const state = boardState(row, nowMs)
  const first = looksFirst(row, nowMs)
  const absent = state === 'not-started'
  const { blocks } = dto.version.spec
  const name = <span className="font-semibold">{row.memberName}</span>
  return (
    <tr className={clsx('odd:bg-ground-board', first && state === 'stopped' && 'stopped-row')}>
      <th scope="row" className="sticky left-0 z-10 bg-inherit px-3 py-1.5 text-left font-normal">
        {row.attemptId ? (
          <Link
            href={paths.boardAttempt(dto.scheduledClass.scheduledClassId, row.attemptId)}
            className="hover:underline"
            prefetch={false}
          >
            {name}
          </Link>
        ) : (
          <span className="text-text-quiet">{name}</span>
        )}
        <RowState row={row} dto={dto} shapes={shapes} nowMs={nowMs} />
      </th>
      {blocks.map((block) => {
        const shape = shapes.get(block.id)
        return (
          <Cell key={block.id}>
            {shape ? <BlockCell dto={dto} row={row} block={block} shape={shape} /> : null}
          </Cell>
        )
      })}
      <td className="border-l-4 border-fill px-3 align-middle">
        <span className="font-display text-lg font-semibold tabular-nums">
          {row.tally?.rating?.rpe ?? ''}
        </span>
      </td>
      <td className="max-w-96 px-3 py-1.5 align-middle">
        {absent ? <span className="sr-only">{BOARD_STATE_TEXT[state]}</span> : null}
        <Remarks remarks={remarksOf(row, dto, nowMs)} />
      </td>
    </tr>
  )
})
