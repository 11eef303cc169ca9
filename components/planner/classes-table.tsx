import Link from 'next/link'
import { Empty } from '@/components/ui/empty'
import { dateOf, lengthText, plural, type DateStyle } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import type { PlannedClassSummary } from '@/server/contract/planned-classes'

interface ClassesTableProps {
  classes: readonly PlannedClassSummary[]
  timeZone: string
  dateStyle: DateStyle
}

/** Every class of the gym, each a way in. */
export function ClassesTable({ classes, timeZone, dateStyle }: ClassesTableProps) {
  if (classes.length === 0) return <Empty>No class has been published yet.</Empty>
  return (
    <ul className="mt-8 border-t-4 border-line">
      {classes.map((one) => (
        <li
          key={one.classId}
          className="grid items-baseline gap-x-8 gap-y-1 border-b-4 border-fill py-4 sm:grid-cols-[1fr_auto] lg:grid-cols-[minmax(16rem,1.2fr)_1.4fr_9rem_16rem]"
        >
          <Link
            href={paths.plannedClass(one.classId)}
            className="font-display text-2xl leading-tight font-bold [overflow-wrap:anywhere] decoration-3 underline-offset-6 hover:underline"
          >
            {one.title}
          </Link>
          <p className="text-text-quiet sm:max-lg:order-last sm:max-lg:col-span-2">{one.focus}</p>
          <p>{lengthText(one.realLengthMs)}</p>
          <p className="leading-snug sm:max-lg:col-span-2">
            {one.ahead > 0 ? `${plural(one.ahead, 'date')} ahead` : 'Not scheduled ahead'}
            <span className="block text-[0.9em] text-text-quiet">
              {plural(one.versions, 'version')}, the last{' '}
              {dateOf(one.publishedAt, timeZone, dateStyle)}
              {one.publishedBy ? ` by ${one.publishedBy}` : ''}
            </span>
          </p>
        </li>
      ))}
    </ul>
  )
}
