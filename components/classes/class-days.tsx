import Link from 'next/link'
import type { ReactNode } from 'react'
import { LaneStrip } from '@/components/lane/lane-strip'
import type { ScheduledClassSummary } from '@/server/contract/classes'
import { lengthText, shortDay, type DateStyle } from '@/server/contract/format'
import { weekStart, weekTitle } from '@/server/contract/weeks'

interface ClassDaysProps {
  classes: readonly ScheduledClassSummary[]
  /** The gym's local date, yyyy-mm-dd: weeks are named from it. */
  today: string
  dateStyle: DateStyle
  hrefOf: (scheduledClassId: string) => string
  /** What stands at the end of a line. */
  remark: (one: ScheduledClassSummary) => ReactNode
}

/** Classes under their weeks and days, in the order given, each with its lane to one scale. */
export function ClassDays({ classes, today, dateStyle, hrefOf, remark }: ClassDaysProps) {
  const fullMs = Math.max(...classes.map((one) => one.classLengthMs))
  const weeks = [...new Set(classes.map((one) => weekStart(one.day)))].map((week) => ({
    week,
    own: classes.filter((one) => weekStart(one.day) === week),
  }))
  return weeks.map(({ week, own }) => (
    <section key={week} className="@container">
      <h3 className="pt-5 pb-1.5 text-xl">{weekTitle(week, today, dateStyle)}</h3>
      <ul className="border-t-4 border-fill">
        {own.map((one, index) => (
          <li
            key={one.scheduledClassId}
            className="relative grid grid-cols-[1fr_auto] items-center gap-x-4 gap-y-1 border-b-4 border-fill py-2.5 hover:bg-fill/40 @lg:grid-cols-[6rem_1fr_8.2rem_3.8rem] @3xl:grid-cols-[7rem_1fr_16rem_8.5rem]"
          >
            <p
              className={
                own[index - 1]?.day === one.day
                  ? 'text-text-quiet @lg:invisible'
                  : one.day === today
                    ? 'font-bold'
                    : 'text-text-quiet'
              }
            >
              {one.day === today ? 'Today' : shortDay(one.day, dateStyle)}
            </p>
            <div className="min-w-0 leading-tight @max-lg:col-span-2 @max-lg:row-start-2">
              <Link
                href={hrefOf(one.scheduledClassId)}
                className="font-display text-xl font-bold [overflow-wrap:anywhere] decoration-3 underline-offset-6 after:absolute after:inset-0 hover:underline"
              >
                {one.title}
              </Link>
              <p className="text-text-quiet">
                {lengthText(one.realLengthMs)}
                {one.coachName ? `, ${one.coachName}` : ''}
              </p>
            </div>
            <LaneStrip
              blocks={one.blocks}
              fullMs={fullMs}
              className="@max-lg:col-span-2 @max-lg:row-start-3"
            />
            <p className="text-right leading-tight tabular-nums @max-lg:col-start-2 @max-lg:row-start-1">
              {remark(one)}
            </p>
          </li>
        ))}
      </ul>
    </section>
  ))
}
