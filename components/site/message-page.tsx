import type { ReactNode } from 'react'
import { StillFigure } from '@/components/figure/still-figure'

/** One thing to say, and the way on: for pages that are not there or went wrong. */
export function MessagePage({
  title,
  figure,
  children,
}: {
  title: string
  figure: string
  children: ReactNode
}) {
  return (
    <main className="flex min-h-dvh flex-col justify-end">
      <div className="flex flex-wrap items-end gap-x-16 gap-y-8 page">
        <StillFigure
          figure={figure}
          frame="stature"
          label=""
          className="h-[min(38vh,20rem)] w-auto"
        />
        <div className="max-w-xl pb-10">
          <h1 className="text-5xl font-extrabold sm:text-6xl">{title}</h1>
          <div className="mt-4 space-y-5 text-lg">{children}</div>
        </div>
      </div>
      <div className="h-[14vh] border-t-12 border-present" />
    </main>
  )
}
