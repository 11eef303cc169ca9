import { stationPlan } from '@/server/engine/pace/block-plan'
import { LEAST_ATTEMPTS, paceKey } from '@/server/engine/pace/learn'
import { TIRING } from '@/server/engine/pace/walk'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { plural } from '@/server/contract/format'
import type { LearntPacesDto } from '@/server/contract/paces'

interface PaceRow {
  key: string
  name: string
  option: string
  plannedSeconds: number
}

/** Every movement done in reps at the member's own pace, with its options. */
function rowsOf(version: PublishedVersion): PaceRow[] {
  const rows = new Map<string, PaceRow>()
  for (const { format } of version.spec.blocks) {
    if (format.type !== 'rounds' && format.type !== 'for-time') continue
    for (const station of format.stations) {
      const movement = version.movements.find((one) => one.slug === station.movement)
      if (!movement) continue
      for (const option of movement.options) {
        const key = paceKey(movement.slug, option.option)
        rows.set(key, {
          key,
          name: movement.name,
          option: option.level === 'as-planned' ? 'as planned' : option.name,
          plannedSeconds: stationPlan(version, station, option.option).secondsPerRep,
        })
      }
    }
  }
  return [...rows.values()]
}

const seconds = (value: number) => `${value.toFixed(1)} s`

/** Seconds a rep as planned and as members' results have taught, and how far forecasts were off. */
export function Paces({ version, learnt }: { version: PublishedVersion; learnt: LearntPacesDto }) {
  const known = new Map(learnt.paces.map((pace) => [paceKey(pace.movement, pace.option), pace]))
  const rows = rowsOf(version)
  if (rows.length === 0) {
    return <p className="mt-3 text-text-quiet">No block here is done at the member’s own pace.</p>
  }
  const shown = rows.filter((row) => known.has(row.key))
  const waiting = rows.length - shown.length
  return (
    <div className="mt-3 space-y-3">
      {shown.length > 0 ? (
        <table className="w-full text-left leading-snug max-sm:text-[0.92em]">
          <thead className="text-[0.9em] text-text-quiet">
            <tr>
              <th className="pb-1 font-normal">Movement</th>
              <th className="pb-1 pl-2 text-right font-normal sm:pl-3">planned</th>
              <th className="pb-1 pl-2 text-right font-normal sm:pl-3">seen</th>
              <th className="pb-1 pl-2 text-right font-normal sm:pl-3">rests on</th>
              <th className="pb-1 pl-2 text-right font-normal sm:pl-3">was off by</th>
            </tr>
          </thead>
          <tbody>
            {shown.map((row) => {
              const pace = known.get(row.key)
              return pace ? (
                <tr key={row.key} className="border-t-2 border-fill align-top">
                  <td className="py-1.5">
                    {row.name}
                    <span className="block text-[0.9em] text-text-quiet">{row.option}</span>
                  </td>
                  <td className="py-1.5 pl-2 text-right whitespace-nowrap tabular-nums sm:pl-3">
                    {seconds(row.plannedSeconds)}
                  </td>
                  <td className="py-1.5 pl-2 text-right font-semibold whitespace-nowrap tabular-nums sm:pl-3">
                    {seconds(pace.secondsPerRep)}
                  </td>
                  <td className="py-1.5 pl-2 text-right tabular-nums sm:pl-3">{pace.attempts}</td>
                  <td className="py-1.5 pl-2 text-right tabular-nums sm:pl-3">
                    {pace.medianErrorReps === null
                      ? 'not known'
                      : plural(Math.round(pace.medianErrorReps), 'rep')}
                  </td>
                </tr>
              ) : null
            })}
          </tbody>
        </table>
      ) : null}
      <p>
        {learnt.tiring
          ? `Over a whole block people slow down by ${Math.round(learnt.tiring.factor * 100)} %, as ${plural(learnt.tiring.attempts, 'attempt')} show.`
          : `Over a whole block people are taken to slow down by ${Math.round(TIRING.expected * 100)} %, until results show better.`}
      </p>
      <p className="text-[0.9em] text-text-quiet">
        Estimates, from rounds that members logged themselves. A way of doing a movement is learnt
        from {LEAST_ATTEMPTS} attempts on
        {waiting > 0 ? `; ${waiting} of ${rows.length} here go by the planned tempo` : ''}. ‘Was off
        by’ is the middle of how far forecasts from earlier results missed the reps of a block.
      </p>
    </div>
  )
}
