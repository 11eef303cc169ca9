import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
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
  return (
    <li className="border-t-4 border-line pt-2">
      <div className="flex items-baseline justify-between gap-4">
        <h3 className="text-xl">{block.title}</h3>
        <p className="figures text-3xl whitespace-nowrap">
          {tally.skipped && !hasResult(tally) ? '' : scoreText(tally)}
        </p>
      </div>
      {tally.skipped ? (
        <p>
          {hasResult(tally) ? 'The rest was skipped' : 'Skipped'}
          {tally.skipped.reason ? `: ${tally.skipped.reason}` : ''}
        </p>
      ) : null}
      {tally.skipped && !hasResult(tally) ? null : (
        <>
          {plan && tally.rounds > 0 ? (
            <Rungs
              className="my-2 h-24 max-w-full"
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
          {plan ? <p className="text-text-quiet">{tally.totalReps} reps in all</p> : null}
        </>
      )}
      {taken.length > 0 ? <p>{taken.join(', ')}</p> : null}
      {tally.restTakenMs >= 1_000 ? <p>{clockText(tally.restTakenMs)} rest as needed</p> : null}
      {tally.countedAfterwards ? <p className="text-text-quiet">Counted after class</p> : null}
    </li>
  )
}
