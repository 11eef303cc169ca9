/** Which of the player's sounds a mark makes. The files are `public/sounds/<name>.wav`. */
import type { Mark, SegmentKind, Timeline } from './types'

export const SOUND_NAMES = [
  'knock',
  'bell',
  'bell-low',
  'rest-end',
  'half',
  'logged',
  'call-60',
  'call-30',
  'call-10',
] as const
export type SoundName = (typeof SOUND_NAMES)[number]

/**
 * The sound of a mark in or at the end of a segment of `kind`; null where it is only seen and said.
 * Half-way has its beep.
 */
export function markSound(mark: Mark, kind: SegmentKind | undefined): SoundName | null {
  if (mark.what === 'beep') {
    if (mark.sound === 'short') return 'knock'
    if (mark.sound === 'double') return 'half'
    if (kind === 'rest') return 'rest-end'
    return mark.sound === 'start' ? 'bell' : 'bell-low'
  }
  if (mark.what !== 'call' || mark.half) return null
  const name = `call-${mark.left}`
  return SOUND_NAMES.find((one) => one === name) ?? null
}

/** Every sound of a compiled class with its instant (milliseconds of class time), in order. */
export function soundsOf(timeline: Timeline): { atMs: number; name: SoundName; mark: Mark }[] {
  const timed = timeline.segments.filter((segment) => segment.kind !== 'brief')
  let index = 0
  return timeline.marks.flatMap((mark) => {
    // Beeps and calls lie up to and including the end of their segment.
    while ((timed[index]?.endMs ?? Infinity) < mark.atMs) index += 1
    const name = markSound(mark, timed[index]?.kind)
    return name === null ? [] : [{ atMs: mark.atMs, name, mark }]
  })
}
