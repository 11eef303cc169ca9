import type { ReactNode } from 'react'
import type { AttemptDto } from '@/server/contract/attempts'
import { dateOf, timeOfDay, type DateStyle } from '@/server/contract/format'
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

interface AttemptFactsProps {
  attempt: AttemptDto
  timeZone: string
  dateStyle?: DateStyle
}

/** How an attempt stands and felt: stop and pain first. */
export function AttemptFacts({ attempt, timeZone, dateStyle = 'day-first' }: AttemptFactsProps) {
  const { tally } = attempt
  const anchor = CR10_ANCHORS.find((one) => one.rating === tally.rating?.rpe)?.anchor
  const { intendedRpe } = attempt.version.spec
  const hurts = [...tally.hurts, ...(tally.rating?.hurts ?? [])]
  const time = (instant: string) => timeOfDay(instant, timeZone, dateStyle)
  return (
    <div className="space-y-5">
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
      <dl className="flex flex-wrap items-start gap-x-12 gap-y-4">
        {tally.rating ? (
          <Fact term="RPE" value={<Large number={tally.rating.rpe} of="of 10" />}>
            {anchor?.toLowerCase()}
          </Fact>
        ) : null}
        {intendedRpe === undefined ? null : (
          <Fact term="Meant to feel like" value={<Large number={intendedRpe} of="of 10" />} />
        )}
        <Fact
          term={STATE_TEXT[tally.state]}
          value={
            attempt.startedAt ? (
              <>
                {time(attempt.startedAt)}
                {attempt.finishedAt ? ` to ${time(attempt.finishedAt)}` : ''}
              </>
            ) : null
          }
        >
          {attempt.startedAt ? dateOf(attempt.startedAt, timeZone, dateStyle) : null}
        </Fact>
        {attempt.late ? <Fact term="Late" value="after the window had closed" /> : null}
      </dl>
      {tally.rating?.note ? (
        <blockquote className="max-w-3xl text-xl">“{tally.rating.note}”</blockquote>
      ) : null}
    </div>
  )
}

interface FactProps {
  term: string
  value: ReactNode
  children?: ReactNode
}

function Fact({ term, value, children }: FactProps) {
  return (
    <div>
      <dt className="text-text-quiet">{term}</dt>
      <dd className="flex min-h-12 flex-wrap items-end gap-x-3 text-xl leading-tight font-semibold">
        {value}
        {children ? (
          <span className="text-base font-normal text-text-quiet">{children}</span>
        ) : null}
      </dd>
    </div>
  )
}

function Large({ number, of }: { number: number; of: string }) {
  return (
    <span className="flex items-baseline gap-2">
      <span className="figures text-5xl">{number}</span>
      <span className="text-base font-normal">{of}</span>
    </span>
  )
}
