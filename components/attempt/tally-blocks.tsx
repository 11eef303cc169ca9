import clsx from 'clsx'
import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
import { plural } from '@/server/contract/format'
import { blockPlan, roundReps } from '@/server/engine/pace/block-plan'
import { AS_PLANNED } from '@/server/engine/spec/names'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { clockText, hasResult, scoreText } from '@/server/engine/tally/score'
import type { AttemptTally, BlockTally } from '@/server/engine/tally/types'

/** What was done in every block: rungs, score, options used, rest. */
export function TallyBlocks({
  version,
  tally,
}: {
  version: PublishedVersion
  tally: AttemptTally
}) {
  return (
    <ol className="grid gap-x-10 gap-y-8 md:grid-cols-2 xl:grid-cols-3">
      {tally.blocks
        .filter((block) => block.format !== 'rest')
        .map((block) => (
          <BlockSummary key={block.block} version={version} tally={block} />
        ))}
    </ol>
  )
}

function BlockSummary({ version, tally }: { version: PublishedVersion; tally: BlockTally }) {
  const block = version.spec.blocks.find((one) => one.id === tally.block)
  if (!block || block.format.type === 'rest') return null
  const { stations } = block.format
  const plan = blockPlan(version, block)
  const taken = tally.options.flatMap(({ station, used }) => {
    const movement = version.movements.find((one) => one.slug === stations[station]?.movement)
    return used
      .filter((slug) => slug !== AS_PLANNED)
      .flatMap((slug) => movement?.options.find((one) => one.option === slug) ?? [])
      .map((option) => `${movement?.name ?? ''}: ${option.name.toLowerCase()}`)
  })
  const isUntouched = !hasResult(tally) && (tally.skipped !== null || !tally.over)
  return (
    <li className="border-t-4 border-line pt-3">
      <div className="flex items-baseline justify-between gap-4">
        <h3 className="text-xl">{block.title}</h3>
        <p className="figures text-4xl whitespace-nowrap">{isUntouched ? '' : scoreText(tally)}</p>
      </div>
      {tally.skipped ? (
        <p>
          {hasResult(tally) ? 'The rest was skipped' : 'Skipped'}
          {tally.skipped.reason ? `: ${tally.skipped.reason}` : ''}
        </p>
      ) : isUntouched ? (
        <p className="text-text-quiet">Not reached</p>
      ) : null}
      {isUntouched ? null : (
        <>
          {plan && tally.rounds > 0 ? (
            <Rungs
              className="my-3 h-28 max-w-full"
              {...rungWindow({
                repsOf: (round) =>
                  round > Math.min(plan.roundLimit, tally.rounds) ? null : roundReps(plan, round),
                done: tally.logged.map((one) => one.round),
                present: null,
                forecastRounds: null,
                limit: 10,
              })}
            />
          ) : null}
          {plan ? <p className="text-text-quiet">{plural(tally.totalReps, 'rep')} in all</p> : null}
          {tally.pieces ? <Pieces {...tally.pieces} /> : null}
        </>
      )}
      {[...new Set(taken)].map((text) => (
        <p key={text}>{text}</p>
      ))}
      {tally.restTakenMs >= 1_000 ? <p>{clockText(tally.restTakenMs)} rest as needed</p> : null}
      {tally.countedAfterwards ? <p className="text-text-quiet">Counted after class</p> : null}
    </li>
  )
}

/** Above it, pieces would be finer than a line. */
const MOST_PIECES = 40

/** Timed pieces as bays in a row: done filled, with a rest inside hatched, the others open. */
function Pieces({ done, partDone, of }: NonNullable<BlockTally['pieces']>) {
  if (of > MOST_PIECES) return null
  return (
    <div aria-hidden className="my-3 flex h-7 max-w-md border-2 border-line">
      {Array.from({ length: of }, (_, index) => (
        <span
          key={index}
          className={clsx(
            'flex-1 border-line not-last:border-r-2',
            index < done && 'bg-text not-last:border-r-ground!',
            index >= done && index < done + partDone && 'hatched',
          )}
        />
      ))}
    </div>
  )
}
