import type { AttemptDto } from '@/server/contract/attempts'
import { timeOfDay } from '@/server/contract/format'
import { clockText } from '@/server/engine/tally/score'
import { eventText } from './event-text'

/** Everything that was recorded, in order: class time, time of day, what. */
export function EventList({ attempt, timeZone }: { attempt: AttemptDto; timeZone: string }) {
  const lines = attempt.events.flatMap(({ event }) => {
    const text = eventText(attempt.version, event)
    return text === null ? [] : [{ event, text }]
  })
  if (lines.length === 0) return <p>Nothing has been recorded yet.</p>
  return (
    <table className="w-full max-w-3xl text-left">
      <thead>
        <tr className="border-b-4 border-line-lesser">
          <th scope="col" className="w-20 py-1">
            Class
          </th>
          <th scope="col" className="w-24 py-1">
            Clock
          </th>
          <th scope="col" className="py-1">
            What happened
          </th>
        </tr>
      </thead>
      <tbody>
        {lines.map(({ event, text }) => (
          <tr key={event.id} className="align-baseline odd:bg-ground-board">
            <td className="py-1 font-display tabular-nums">{clockText(event.classMs)}</td>
            <td className="py-1 text-text-quiet tabular-nums">
              {timeOfDay(new Date(event.wallMs).toISOString(), timeZone)}
            </td>
            <td
              className={
                event.type === 'stopped' || event.type === 'hurt'
                  ? 'py-1 font-semibold text-stop'
                  : 'py-1'
              }
            >
              {text}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
