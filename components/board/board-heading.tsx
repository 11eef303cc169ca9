import type { BoardDto } from '@/server/contract/board'
import type { BoardState } from '@/server/contract/board-view'
import { clockText } from '@/server/engine/tally/score'
import { dayName, timeOfDay } from '@/server/contract/format'

interface BoardHeadingProps {
  board: BoardDto
  counts: Record<BoardState, number>
}

/** Which class, when, and how many stand where. */
export function BoardHeading({ board, counts }: BoardHeadingProps) {
  const { scheduledClass, timeZone } = board
  const closes = timeOfDay(scheduledClass.closesAt, timeZone)
  return (
    <div className="flex flex-wrap items-end justify-between gap-x-10 gap-y-4">
      <div>
        <h1 className="text-5xl leading-none font-extrabold sm:text-6xl">{scheduledClass.title}</h1>
        <p className="mt-3">
          <strong>{dayName(scheduledClass.day)}</strong>
          <span className="text-text-quiet">
            {' '}
            · {scheduledClass.group ?? 'Everybody'} · open{' '}
            {timeOfDay(scheduledClass.opensAt, timeZone)} to{' '}
            {closes === '00:00' ? 'midnight' : closes} · {clockText(scheduledClass.realLengthMs)}{' '}
            long
          </span>
        </p>
      </div>
      <dl className="flex flex-wrap gap-x-8 gap-y-2">
        <Count value={counts['in-class']} label="in class" />
        <Count
          value={counts.stopped}
          label="stopped"
          tone={counts.stopped > 0 ? 'text-stop' : ''}
        />
        {counts.quiet > 0 ? <Count value={counts.quiet} label="no word" /> : null}
        <Count value={counts.finished} label="finished" />
        <Count value={counts['not-started']} label="not here yet" />
      </dl>
    </div>
  )
}

function Count({ value, label, tone = '' }: { value: number; label: string; tone?: string }) {
  return (
    <div className="flex items-baseline gap-2">
      <dd className={`figures text-5xl ${tone}`}>{value}</dd>
      <dt className="order-last">{label}</dt>
    </div>
  )
}
