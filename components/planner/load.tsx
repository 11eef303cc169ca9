import { plural } from '@/server/contract/format'
import type { WeeksLoad } from '@/server/contract/load'
import type { ClassLoad, LoadedInARow, PatternLoad } from '@/server/engine/load/class-load'
import type { SessionSpec } from '@/server/engine/spec/schema'

const WORDS: Readonly<Partial<Record<string, string>>> = {
  'ankle-or-foot': 'ankle or foot',
  'lower-back': 'lower back',
  grip: 'the grip',
}
const word = (one: string) => WORDS[one] ?? one.replace(/-/g, ' ')

/** What the class asks of a body, beside the four weeks behind it. */
export function Load({
  spec,
  load,
  weeks,
}: {
  spec: SessionSpec
  load: ClassLoad
  weeks: WeeksLoad
}) {
  const most = Math.max(1, ...load.patterns.map((one) => one.reps))
  const titleOf = (id: string) => spec.blocks.find((block) => block.id === id)?.title ?? id
  return (
    <div className="mt-3 space-y-4">
      <table className="w-full text-left leading-snug max-sm:text-[0.92em]">
        <thead className="text-[0.9em] text-text-quiet">
          <tr>
            <th className="pb-1 font-normal">Pattern</th>
            <th className="pb-1 font-normal max-sm:hidden">
              <span className="sr-only">this class, as a bar</span>
            </th>
            <th className="pb-1 pl-2 text-right font-normal sm:pl-3">here</th>
            <th className="pb-1 pl-2 text-right font-normal sm:pl-3">last 4 weeks</th>
          </tr>
        </thead>
        <tbody>
          {load.patterns.map((one) => (
            <tr key={one.pattern} className="border-t-2 border-fill">
              <td className="py-1.5 pr-3">{word(one.pattern)}</td>
              <td className="w-[40%] py-1.5 max-sm:hidden" aria-hidden="true">
                <span
                  className="block h-4 bg-button"
                  style={{ width: `${(one.reps / most) * 100}%` }}
                />
              </td>
              <td className="py-1.5 pl-2 text-right font-semibold tabular-nums sm:pl-3 sm:whitespace-nowrap">
                {amount(one)}
              </td>
              <td className="py-1.5 pl-2 text-right tabular-nums sm:pl-3 sm:whitespace-nowrap">
                {amount(weeks.patterns.find((other) => other.pattern === one.pattern))}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <ul className="space-y-1.5">
        <li>
          Push to pull: <strong className="tabular-nums">{ratio(load)}</strong>; over the last four
          weeks, {plural(weeks.classes, 'class', 'classes')},{' '}
          <strong className="tabular-nums">{ratio(weeks)}</strong>.
        </li>
        {load.jumpContacts > 0 || weeks.jumpContacts > 0 ? (
          <li>
            Landings: <strong className="tabular-nums">{load.jumpContacts}</strong> here,{' '}
            {Math.round(weeks.jumpContacts / 4)} a week before.
          </li>
        ) : null}
        {load.floorWays.map((ways) => (
          <li key={ways.block}>
            {titleOf(ways.block)}: {ways.perRound} {ways.perRound === 1 ? 'way' : 'ways'} between
            standing and the floor a round, about {ways.impliedSeconds} s with the kit;{' '}
            {ways.plannedSeconds} s are planned.
          </li>
        ))}
        {load.inARow.map((row) => (
          <li key={`${row.what} ${row.blocks.join()}`}>{rowText(row, titleOf)}</li>
        ))}
      </ul>
      <p className="text-[0.9em] text-text-quiet">
        Estimates, with every option as planned. Rounds are taken at the expected pace; what is
        marked ≈ is timed work by the seconds of a rep.
      </p>
    </div>
  )
}

function amount(load: PatternLoad | undefined): string {
  if (!load) return '–'
  const reps = load.reps > 0 ? `${load.estimatedReps > 0 ? '≈ ' : ''}${load.reps}` : ''
  const held = load.holdSeconds > 0 ? `${load.holdSeconds} s` : ''
  return [reps, held].filter(Boolean).join(' + ')
}

function ratio({
  pushReps,
  pullReps,
  pushToPull,
}: Pick<ClassLoad, 'pushReps' | 'pullReps' | 'pushToPull'>): string {
  return pushToPull === null
    ? `${pushReps} to ${pullReps}`
    : `${pushReps} to ${pullReps} (${pushToPull.toFixed(1)})`
}

function rowText({ what, blocks }: LoadedInARow, titleOf: (id: string) => string): string {
  const name = word(what)
  return `${name.charAt(0).toUpperCase()}${name.slice(1)} in ${blocks.length} blocks in a row: ${blocks.map(titleOf).join(', ')}.`
}
