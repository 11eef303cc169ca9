import { dayMonth, type DateStyle } from '@/server/contract/format'

interface EffortTrendProps {
  /** In order of time, the latest last. RPE 0 to 10. */
  classes: readonly { attemptId: string; title: string; day: string; rpe: number }[]
  dateStyle: DateStyle
}

const MOST = 24
const FEWEST = 3

/** How hard the last classes felt, as rungs on one baseline; fewer than three show no trend. */
export function EffortTrend({ classes, dateStyle }: EffortTrendProps) {
  if (classes.length < FEWEST) return null
  const shown = classes.slice(-MOST)
  return (
    <figure className="max-w-3xl">
      <ol className="flex h-36 items-end gap-1.5 border-b-4 border-line sm:gap-3">
        {shown.map((one, index) => {
          const isLatest = index === shown.length - 1
          return (
            <li
              key={one.attemptId}
              className="relative flex h-full max-w-9 flex-1 flex-col justify-end text-center"
            >
              <span className="sr-only">
                {one.title}, {dayMonth(one.day, dateStyle)}: {one.rpe} of 10
              </span>
              <span aria-hidden className="pb-1.5 figures text-xl max-sm:text-base">
                {one.rpe}
              </span>
              <span
                aria-hidden
                className={
                  isLatest
                    ? 'mx-[12%] bg-present outline-4 -outline-offset-4 outline-on-present'
                    : 'mx-[12%] bg-text'
                }
                style={{ height: `${Math.max(3, one.rpe * 8.2)}%` }}
              />
            </li>
          )
        })}
      </ol>
      <figcaption className="mt-2 text-text-quiet">
        How hard your last {shown.length} classes felt: 0 is rest, 10 is maximal. The latest is on
        the right.
      </figcaption>
    </figure>
  )
}
