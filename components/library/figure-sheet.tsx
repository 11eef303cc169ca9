import clsx from 'clsx'
import { StillFigure } from '@/components/figure/still-figure'
import { isFigureSlug } from '@/server/engine/figure/slugs'

const DRAWN_FOR_NONE = 'standing'
const drawn = (figure: string | null): string =>
  figure !== null && isFigureSlug(figure) ? figure : DRAWN_FOR_NONE

/**
 * Each figure once, for `SheetFigure` to show as often as a list needs it: hundreds of drawings would
 * make a page of megabytes. Stands on the same page as they do.
 */
export function FigureSheet({ figures }: { figures: readonly (string | null)[] }) {
  return (
    <svg aria-hidden focusable="false" className="absolute size-0">
      {[...new Set(figures.map(drawn))].map((figure) => (
        <symbol key={figure} id={`figure-${figure}`} overflow="visible">
          {/* Who jumps with the arms up is higher than the frame. */}
          <StillFigure figure={figure} label="" frame="stature" className="overflow-visible" />
        </symbol>
      ))}
    </svg>
  )
}

/** A figure of the sheet, sized by its class. The words beside it say what it shows. */
export function SheetFigure({ figure, className }: { figure: string | null; className: string }) {
  return (
    <svg aria-hidden focusable="false" className={clsx('overflow-visible', className)}>
      <use href={`#figure-${drawn(figure)}`} width="100%" height="100%" />
    </svg>
  )
}
