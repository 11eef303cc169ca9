import type { AttemptDto } from '@/server/contract/attempts'
import { dateOf, timeOfDay } from '@/server/contract/format'
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { STOP_SIGN_TEXT } from '@/server/engine/fit/stop-signs'
import { CR10_ANCHORS } from '@/server/engine/load/session-rpe'
import { clockText } from '@/server/engine/tally/score'

const STATE_TEXT = {
  'not-started': 'Not started',
  'in-class': 'In class',
  paused: 'Paused',
  stopped: 'Stopped',
  finished: 'Finished',
} as const

/** How an attempt stands and felt: stop and pain first. */
export function AttemptFacts({ attempt, timeZone }: { attempt: AttemptDto; timeZone: string }) {
  const { tally } = attempt
  const anchor = CR10_ANCHORS.find((one) => one.rating === tally.rating?.rpe)?.anchor
  const hurts = [...tally.hurts, ...(tally.rating?.hurts ?? [])]
  const facts: [string, string][] = [
    [
      STATE_TEXT[tally.state],
      attempt.startedAt
        ? `${dateOf(attempt.startedAt, timeZone)}, started ${timeOfDay(attempt.startedAt, timeZone)}${attempt.finishedAt ? `, finished ${timeOfDay(attempt.finishedAt, timeZone)}` : ''}`
        : '',
    ],
  ]
  if (tally.rating)
    facts.push(['RPE', `${tally.rating.rpe} of 10${anchor ? `, ${anchor.toLowerCase()}` : ''}`])
  if (attempt.version.spec.intendedRpe !== undefined) {
    facts.push(['Meant to feel like', `${attempt.version.spec.intendedRpe} of 10`])
  }
  if (attempt.late) facts.push(['Late', 'after the window had closed'])
  return (
    <div className="space-y-4">
      {tally.stop ? (
        <p className="border-l-8 border-stop pl-4">
          <strong className="text-stop">
            Stopped at {clockText(tally.stop.classMs)}
            {tally.stop.sign ? `: ${STOP_SIGN_TEXT[tally.stop.sign].toLowerCase()}` : ''}
          </strong>
          {[tally.stop.where, tally.stop.note].filter(Boolean).map((text) => (
            <span key={text} className="block">
              {text}
            </span>
          ))}
        </p>
      ) : null}
      {hurts.length > 0 ? (
        <p className="border-l-8 border-stop pl-4">
          <strong>Pain: </strong>
          {hurts
            .map(
              (hurt) =>
                `${HURT_PLACE_TEXT[hurt.where].toLowerCase()}${hurt.note ? ` (${hurt.note})` : ''}`,
            )
            .join(', ')}
        </p>
      ) : null}
      {attempt.todayNote ? (
        <p className="border-l-8 border-present pl-4">
          <strong>New that day: </strong>
          {attempt.todayNote}
        </p>
      ) : null}
      <dl className="flex flex-wrap gap-x-10 gap-y-3">
        {facts.map(([term, value]) => (
          <div key={term}>
            <dt className="text-base text-text-quiet">{term}</dt>
            <dd className="font-semibold">{value}</dd>
          </div>
        ))}
      </dl>
      {tally.rating?.note ? (
        <blockquote className="text-xl">“{tally.rating.note}”</blockquote>
      ) : null}
    </div>
  )
}
