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
import { workNumber } from '@/server/contract/block-text'
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

/** Widths in pixels at least: what a cell has to show, not the block's minutes alone. */
const NAME_PX = 172
const RPE_PX = 44
const TO_KNOW_PX = 224

function columnPx(block: Block, shape: BlockShape | undefined): number {
  if (block.format.type === 'rest') return 36
  return shape?.counted ? 152 : 74
}

/** Members by blocks: the class's lane is the head, every row a lane of its own. */
export function BoardTable({ dto, rows, view, nowMs, onSort }: BoardTableProps) {
  const shapes = blockShapes(dto)
  const { blocks } = dto.version.spec
  const groups = groupRows(rows, view, nowMs)
  const widths = blocks.map((block) => columnPx(block, shapes.get(block.id)))
  return (
    <div
      // A phone shows the list instead, as soon as the page has its script. Positioned, so that nothing
      // hidden in a cell widens the page.
      className="relative overflow-x-auto max-[50rem]:hidden"
      tabIndex={0}
      role="region"
      aria-label="Members by blocks"
    >
      <table
        className="w-full table-fixed border-collapse text-left text-[15px]"
        style={{
          minWidth: NAME_PX + RPE_PX + TO_KNOW_PX + widths.reduce((sum, one) => sum + one, 0),
        }}
      >
        <colgroup>
          <col style={{ width: NAME_PX }} />
          {blocks.map((block, index) => (
            <col key={block.id} style={{ width: widths[index] }} />
          ))}
          <col style={{ width: RPE_PX }} />
          <col style={{ width: TO_KNOW_PX }} />
        </colgroup>
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
                >
                  <BayHead block={block} number={workNumber(blocks, block)} />
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
            <SortHead sort="attention" view={view} onSort={onSort} className="relative px-3 py-2">
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
              {dto.version.spec.intendedRpe !== undefined ? `${dto.version.spec.intendedRpe}` : ''}
            </td>
            <td className="px-3 text-[13px] leading-tight">
              {dto.forecast.some((one) => one.basis)
                ? 'An estimate, from what members did before'
                : 'An estimate, at the planned tempo'}
            </td>
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
  const isRest = block.format.type === 'rest'
  const isLow = !isRest && number === null && block.kind !== 'finisher'
  return (
    <span className="block p-1" title={block.title}>
      <span
        className={clsx(
          'flex h-10 items-center gap-1.5 overflow-hidden px-1.5 condensed leading-[1.05]',
          number !== null && 'bg-fill',
          block.kind === 'finisher' && 'hatched',
          isLow && 'border-b-8 border-fill',
        )}
      >
        {number !== null ? <span className="font-black">{number}</span> : null}
        <span className={isRest ? 'sr-only' : 'line-clamp-2'}>{block.title}</span>
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
      <th
        scope="row"
        className="sticky left-0 z-10 bg-ground py-1 pr-3 text-left text-base leading-tight font-normal"
      >
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
      <td className="px-3 py-1 align-middle">
        {absent ? <span className="sr-only">{BOARD_STATE_TEXT[state]}</span> : null}
        <Remarks remarks={remarksOf(row, dto, nowMs)} />
      </td>
    </tr>
  )
})
