import Link from 'next/link'
import { useState } from 'react'
import type { BoardDto, BoardRow } from '@/server/contract/board'
import { boardState, type BoardView } from '@/server/contract/board-view'
import { paths } from '@/server/contract/paths'
import { BlockCell } from './block-cell'
import { blockShapes } from './block-shapes'
import { groupRows } from './groups'
import { Remarks } from './remarks'
import { stateLine } from './row-state'
import { remarksOf } from './to-know'

interface BoardListProps {
  dto: BoardDto
  rows: readonly BoardRow[]
  view: BoardView
  nowMs: number
}

/** The board in the hand: one block at a time, the one each member is in unless another is chosen. */
export function BoardList({ dto, rows, view, nowMs }: BoardListProps) {
  const [chosen, setChosen] = useState('')
  const shapes = blockShapes(dto)
  const blocks = dto.version.spec.blocks.filter((block) => block.format.type !== 'rest')
  const blockOf = (row: BoardRow) => {
    const present = chosen || [...shapes.values()][0]?.presentBlock(row)
    return (
      blocks.find((block) => block.id === present) ??
      blocks.findLast((block) => shapes.get(block.id)?.counted) ??
      blocks[0]
    )
  }
  return (
    <>
      <label className="block">
        <span className="block text-sm text-text-quiet">Block</span>
        <select
          value={chosen}
          onChange={(event) => setChosen(event.target.value)}
          className="h-12 w-full border-b-4 border-line bg-raised px-2"
        >
          <option value="">Where each of them is</option>
          {blocks.map((block) => (
            <option key={block.id} value={block.id}>
              {block.title}
            </option>
          ))}
        </select>
      </label>
      {groupRows(rows, view, nowMs).map((group) => (
        <section key={group.title ?? 'all'}>
          {group.title ? (
            <h2 className="mt-5 border-b-4 border-line-lesser pb-1 text-xl">{group.title}</h2>
          ) : null}
          <ul>
            {group.rows.map((row) => {
              const block = blockOf(row)
              const shape = block ? shapes.get(block.id) : undefined
              const name = <span className="font-semibold">{row.memberName}</span>
              return (
                <li key={row.membershipId} className="-mx-4 px-4 py-3 odd:bg-ground-board">
                  <div className="flex items-center justify-between gap-3">
                    {row.attemptId ? (
                      <Link
                        className="flex min-h-12 items-center underline decoration-1 underline-offset-4"
                        href={paths.boardAttempt(
                          dto.scheduledClass.scheduledClassId,
                          row.attemptId,
                        )}
                        prefetch={false}
                      >
                        {name}
                      </Link>
                    ) : (
                      <span className="text-text-quiet">{name}</span>
                    )}
                    <span
                      className={
                        boardState(row, nowMs) === 'stopped'
                          ? 'text-sm font-semibold text-stop'
                          : 'text-sm text-text-quiet'
                      }
                    >
                      {stateLine(row, dto, shapes, nowMs)}
                    </span>
                  </div>
                  {row.tally && block && shape ? (
                    <BlockCell dto={dto} row={row} block={block} shape={shape} />
                  ) : null}
                  <Remarks remarks={remarksOf(row, dto, nowMs)} />
                </li>
              )
            })}
          </ul>
        </section>
      ))}
    </>
  )
}
