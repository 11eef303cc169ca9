import type { Block } from '@/server/engine/spec/schema'
import { clockText, plural } from './texts'

/** A block's shape in a line: '6:00, as many rounds as you can'. */
export function formatLine(block: Block): string {
  const format = block.format
  switch (format.type) {
    case 'rounds':
      return `${clockText(format.seconds * 1000)}, as many rounds as you can`
    case 'for-time':
      return `${plural(format.rounds, 'round')} for time, cap ${clockText(format.cap * 1000)}`
    case 'intervals':
      return `${plural(format.rounds, 'round')} of intervals`
    case 'every':
      return format.seconds === 60
        ? `every minute, ${format.times} times`
        : `every ${clockText(format.seconds * 1000)}, ${format.times} times`
    case 'holds':
      return plural(format.stations.length, 'hold')
    case 'rest':
      return clockText(format.seconds * 1000)
  }
}
