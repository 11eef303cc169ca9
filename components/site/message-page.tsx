import type { ReactNode } from 'react'
import { StillFigure } from '@/components/figure/still-figure'
import type { FigureSlug } from '@/server/engine/figure/slugs'

/** One thing to say, and the way on: for pages that are not there or went wrong. */
export function MessagePage({
  title,
  figure,
  children,
}: {
  title: string
  figure: FigureSlug
  children: ReactNode
}) {
  return (
    <main className="flex min-h-dvh flex-col justify-between">
      <p className="page pt-4 font-display text-xl font-extrabold wide sm:pt-6">Floorside</p>
      <div>
        <div className="page pt-8 pb-2">
          <StillFigure
            figure={figure}
            frame="stature"
            label=""
            className="ml-[8%] h-[min(40vh,24rem)] w-auto max-w-[80%] sm:ml-[14%]"
          />
        </div>
        <div className="-mt-2 ml-4 rounded-tl-[4.5rem] border-t-10 border-l-10 border-present px-6 pt-8 pb-14 sm:ml-[6%] sm:rounded-tl-[9rem] sm:border-t-14 sm:border-l-14 sm:px-16 sm:pt-12">
          <h1 className="text-5xl font-extrabold sm:text-6xl">{title}</h1>
          <div className="mt-4 max-w-xl space-y-5 text-lg">{children}</div>
        </div>
      </div>
    </main>
  )
}
