import clsx from 'clsx'
import type { BlockKind } from '@/server/engine/spec/schema'
import { PAINT, percent, type BayPaint } from './bays'

interface LaneStripProps {
  blocks: readonly { kind: BlockKind; lengthMs: number }[]
  /** What the full width stands for, so that strips under each other can be compared. */
  fullMs: number
  className?: string
}

const FILL: Record<BayPaint, string> = {
  filled: 'inset-y-0.5 inset-x-[min(2px,12%)] bg-fill-strong',
  hatched:
    'inset-0.5 bg-[repeating-linear-gradient(-45deg,var(--fill-strong)_0_3px,transparent_3px_6px)]',
  low: 'inset-x-0.5 top-[58%] bottom-0.5 bg-fill-strong',
  open: 'hidden',
}

/** A bay of less than this part of the width keeps a finer line, or it would be nothing but lines. */
const NARROW = 0.05

/** A class as a lane of a line's height, without words: a picture beside its name in a list. */
export function LaneStrip({ blocks, fullMs, className }: LaneStripProps) {
  const lengthMs = blocks.reduce((sum, block) => sum + block.lengthMs, 0)
  if (lengthMs === 0) return null
  return (
    <div aria-hidden className={clsx('h-6', className)}>
      <div
        className="flex h-full border-2 border-line"
        style={{ width: percent(Math.min(lengthMs, fullMs), fullMs) }}
      >
        {blocks.map(({ kind, lengthMs: own }, index) =>
          own > 0 ? (
            <span
              key={index}
              className={clsx(
                'relative min-w-0 border-line',
                own / fullMs < NARROW ? 'not-last:border-r' : 'not-last:border-r-2',
              )}
              style={{ width: percent(own, lengthMs) }}
            >
              <span className={clsx('absolute', FILL[PAINT[kind]])} />
            </span>
          ) : null,
        )}
      </div>
    </div>
  )
}
