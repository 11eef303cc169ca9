import Link from 'next/link'
import type { ReactNode } from 'react'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { dayName, lengthText } from '@/server/contract/format'

interface ClassDaysProps {
  classes: readonly ScheduledClassSummary[]
  hrefOf: (scheduledClassId: string) => string
  /** What stands at the end of a line. */
  remark: (one: ScheduledClassSummary) => ReactNode
}

/** Classes under their days, in the order given. */
export function ClassDays({ classes, hrefOf, remark }: ClassDaysProps) {
  const days = [...new Set(classes.map((one) => one.day))]
  return (
    <ol>
      {days.map((day) => (
        <li key={day} className="grid gap-x-8 border-b-4 border-fill py-3 sm:grid-cols-[14rem_1fr]">
          <h3 className="pt-2 font-text text-base leading-tight font-normal tracking-normal text-text-quiet">
            {dayName(day)}
          </h3>
          <ul>
            {classes
              .filter((one) => one.day === day)
              .map((one) => (
                <li
                  key={one.scheduledClassId}
                  className="grid grid-cols-[1fr_auto] items-baseline gap-x-5 sm:grid-cols-[11rem_1fr_auto]"
                >
                  <Link
                    href={hrefOf(one.scheduledClassId)}
                    className="py-1 font-display text-xl font-bold decoration-3 underline-offset-6 hover:underline"
                  >
                    {one.title}
                  </Link>
                  <span className="text-base text-text-quiet">
                    {lengthText(one.realLengthMs)}
                    {one.coachName ? `, ${one.coachName}` : ''}
                  </span>
                  <span className="text-right text-base">{remark(one)}</span>
                </li>
              ))}
          </ul>
        </li>
      ))}
    </ol>
  )
}
