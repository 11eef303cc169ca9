import { motionOf } from '@/server/engine/figure/motion'
import { FigureDrawing, outlineAt, type FigureLook } from './drawing'

export interface StillFigureProps extends FigureLook {
  /** Milliseconds into the movement; without it the position that shows it best. */
  atMs?: number | undefined
}

/** A figure that stands still; renders on the server, needs no script. */
export function StillFigure({ atMs, ...look }: StillFigureProps) {
  const at = atMs ?? motionOf(look.figure, look.timing).stillMs
  return <FigureDrawing {...look} outline={outlineAt(look.figure, at, look.timing)} />
}
