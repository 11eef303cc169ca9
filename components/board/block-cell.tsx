import { RungCell, type CellRung } from '@/components/lane/rung-cell'
import type { BoardDto, BoardRow } from '@/server/contract/board'
import { blockPlan, roundReps } from '@/server/engine/pace/block-plan'
import type { Block } from '@/server/engine/spec/schema'
import { hasResult, scoreText } from '@/server/engine/tally/score'
import type { BlockTally } from '@/server/engine/tally/types'
import type { BlockShape } from './block-shapes'
import { takenInBlock } from './options-taken'

const LEVEL_KEY = { easier: '1', 'as-planned': '2', harder: '3' } as const

export interface BlockCellProps {
  dto: BoardDto
  row: BoardRow
  block: Block
  shape: BlockShape
}

/** The option marks of a block: 1 easier, 3 harder, as on the player's keys. */
export function OptionMarks({ dto, tally }: { dto: BoardDto; tally: BlockTally }) {
  const taken = takenInBlock(dto, tally)
  const levels = [...new Set(taken.map((one) => one.level))].sort()
  return levels.map((level) => (
    <span
      key={level}
      title={taken
        .filter((one) => one.level === level)
        .map((one) => `${one.movement}: ${one.option}`)
        .join(', ')}
      className="inline-grid size-5 place-items-center border-2 border-text figures text-sm"
    >
      <span className="sr-only">Option </span>
      {LEVEL_KEY[level]}
    </span>
  ))
}

/** One member in one block: rungs or pieces, the score, the option, what was rested and skipped. */
export function BlockCell({ dto, row, block, shape }: BlockCellProps) {
  const tally = row.tally?.blocks.find((one) => one.block === block.id)
  if (!tally || !row.tally) {
    return (
      <div aria-hidden className="mx-1 border-t-2 border-dotted border-line-lesser opacity-60" />
    )
  }
  if (tally.format === 'rest') return <RestCell tally={tally} />
  if (tally.skipped && !hasResult(tally)) {
    return (
      <p className="text-sm leading-tight">
        <span className="font-semibold">Skipped</span>
        {tally.skipped.reason ? (
          <span className="block text-text-quiet">{tally.skipped.reason}</span>
        ) : null}
      </p>
    )
  }
  const present = presentIn(row, block, shape)
  const begun =
    tally.over || present !== null || tally.logged.length > 0 || (tally.pieces?.done ?? 0) > 0
  const score = begun ? scoreText(tally) : ''
  return (
    <div className={shape.counted ? 'flex items-center gap-1.5' : 'space-y-0.5'}>
      {shape.counted ? (
        <RungCell
          className="h-9 min-w-10 flex-1"
          lengthMs={shape.lengthMs}
          rungs={loggedRungs(dto, block, tally, shape)}
          wedge={shape.wedge}
          longestReps={shape.longestReps}
          present={present}
          stoppedAtMs={stoppedIn(row, shape)}
          label={`${block.title}: ${score || 'not begun'}`}
        />
      ) : (
        <PiecesBar tally={tally} stopped={stoppedIn(row, shape) !== null} />
      )}
      <span className="flex shrink-0 items-center gap-1 whitespace-nowrap">
        <span className="font-display text-[15px] font-semibold tabular-nums">{score}</span>
        {begun ? <OptionMarks dto={dto} tally={tally} /> : null}
        {tally.skipped ? (
          <abbr
            title={`The rest was skipped${tally.skipped.reason ? `: ${tally.skipped.reason}` : ''}`}
            className="text-sm text-text-quiet no-underline"
          >
            skipped
          </abbr>
        ) : null}
        {tally.countedAfterwards ? (
          <abbr
            title="Counted after class, not pressed in it"
            className="text-sm text-text-quiet no-underline"
          >
            after
          </abbr>
        ) : null}
      </span>
    </div>
  )
}

function loggedRungs(
  dto: BoardDto,
  block: Block,
  tally: BlockTally,
  shape: BlockShape,
): CellRung[] {
  const options: (string | undefined)[] = []
  for (const one of tally.options) options[one.station] = one.option
  const plan = blockPlan(dto.version, block, options)
  if (!plan) return []
  // Rounds counted after class have no moment of their own: they are spread over the block.
  return tally.logged.map(({ round, classMs, by }, index) => ({
    atMs:
      by === 'afterwards'
        ? ((index + 1) * shape.lengthMs) / (tally.logged.length + 1)
        : Math.min(shape.lengthMs, Math.max(0, classMs - shape.startMs)),
    reps: roundReps(plan, round) / Math.max(1, plan.stations.length),
    state: 'done',
  }))
}

/** Where the member is in this block, if it is the one they are in. */
function presentIn(
  row: BoardRow,
  block: Block,
  shape: BlockShape,
): { atMs: number; reps: number } | null {
  const tally = row.tally
  if (!tally || (tally.state !== 'in-class' && tally.state !== 'paused')) return null
  if (shape.presentBlock(row) !== block.id) return null
  return { atMs: Math.max(0, tally.classMs - shape.startMs), reps: shape.longestReps / 2 }
}

function stoppedIn(row: BoardRow, shape: BlockShape): number | null {
  const stop = row.tally?.stop
  if (row.tally?.state !== 'stopped' || !stop) return null
  const atMs = stop.classMs - shape.startMs
  return atMs >= 0 && atMs <= shape.lengthMs ? atMs : null
}

function PiecesBar({ tally, stopped }: { tally: BlockTally; stopped: boolean }) {
  const pieces = tally.pieces
  if (!pieces || pieces.of === 0) return null
  return (
    <div aria-hidden className="flex h-4 min-w-10 flex-1 border-2 border-line-lesser">
      <div className="bg-text" style={{ width: `${(100 * pieces.done) / pieces.of}%` }} />
      <div
        className="bg-fill-strong"
        style={{ width: `${(100 * pieces.partDone) / pieces.of}%` }}
      />
      {stopped ? <div className="w-2 bg-stop" /> : null}
    </div>
  )
}

function RestCell({ tally }: { tally: BlockTally }) {
  const beyondMs = tally.restLengthenedMs - tally.restCutMs
  if (Math.abs(beyondMs) < 1_000) return null
  const seconds = Math.round(Math.abs(beyondMs) / 1_000)
  return (
    <span className="block text-center text-sm whitespace-nowrap text-text-quiet">
      {beyondMs > 0 ? `+${seconds}` : `−${seconds}`}
    </span>
  )
}
