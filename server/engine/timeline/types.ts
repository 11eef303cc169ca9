/** The compiled class. All times are whole milliseconds of class time. */

export type SegmentKind = 'brief' | 'count-in' | 'work' | 'switch' | 'rest'
export type Side = 'left' | 'right'

export interface Segment {
  kind: SegmentKind
  block: string
  startMs: number
  endMs: number
  /** From 1; on work, switch and rest of `intervals`, `every` and `holds`. */
  round?: number
  /** From 0; as `round`. */
  station?: number
  side?: Side
  /** Only where the work has one station. */
  movement?: string
}

export type BeepSound = 'short' | 'double' | 'start' | 'end'

export type Mark =
  | { atMs: number; what: 'beep'; sound: BeepSound }
  | { atMs: number; what: 'call'; left: number; half?: true }
  | { atMs: number; what: 'cue'; block: string; id: string }
  | { atMs: number; what: 'next'; block: string; round?: number; station?: number }

/** A cue whose moment is the member's own: due as that round, or station of it, begins. */
export interface PendingCue {
  block: string
  id: string
  round: number
  station?: number
}

export interface Timeline {
  lengthMs: number
  segments: Segment[]
  marks: Mark[]
  pending: PendingCue[]
}
