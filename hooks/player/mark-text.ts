/** Marks as they are read and heard. */
import type { PublishedVersion } from '@/server/engine/spec/version'
import { callText, nextText } from '@/server/engine/timeline/speech'
import type { Mark, Segment } from '@/server/engine/timeline/types'
import type { SoundName } from './ports'

/** What a call, cue or announcement says; null for a beep and for a cue that is not there. */
export function markText(
  version: PublishedVersion,
  segments: readonly Segment[],
  mark: Mark,
): string | null {
  switch (mark.what) {
    case 'beep':
      return null
    case 'call':
      return callText(mark.left, mark.half === true)
    case 'cue':
      return (
        version.spec.blocks
          .find((block) => block.id === mark.block)
          ?.cues?.find((cue) => cue.id === mark.id)?.text ?? null
      )
    case 'next':
      return nextText(version, segments, mark)
  }
}

/** The sound of a mark; null where it is only seen. Half-way has its beep. */
export function markSound(mark: Mark): SoundName | null {
  if (mark.what === 'beep') {
    return ({ short: 'knock', double: 'half', start: 'bell', end: 'bell-low' } as const)[mark.sound]
  }
  if (mark.what !== 'call' || mark.half) return null
  return mark.left === 60
    ? 'call-60'
    : mark.left === 30
      ? 'call-30'
      : mark.left === 10
        ? 'call-10'
        : null
}
