/** Marks as they are read. */
import type { PublishedVersion } from '@/server/engine/spec/version'
import { callText, nextText } from '@/server/engine/timeline/speech'
import type { Mark, Segment } from '@/server/engine/timeline/types'

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
