/** What a member changes in the compiled class: rests, skips and early finishes, as lengths of segments. */
import type { SessionSpec } from '../spec/schema'
import type { ClassEvent } from '../tally/events'
import type { BlockSpan, EventDraft, SegmentEdit } from './run-types'
import type { Segment } from './types'

type AnyEvent = ClassEvent | EventDraft
type EditEvent = Extract<
  AnyEvent,
  { type: 'rest-lengthened' | 'rest-cut' | 'block-skipped' | 'block-finished' }
>
export type Edits = (SegmentEdit | null)[]

/** The most by which one segment may grow, so that a hostile record cannot make a class without end. */
const MOST_LENGTHENED_MS = 3_600_000

const NO_EDIT: SegmentEdit = { lengthenedMs: 0, cutMs: 0, leftAtMs: null }

/** True where the segment has a length or is a brief, which never goes. */
export function isLive(segment: Segment): boolean {
  return segment.kind === 'brief' || segment.endMs > segment.startMs
}

function editedLengthMs(segment: Segment, edit: SegmentEdit | null | undefined): number {
  const plannedMs = segment.endMs - segment.startMs
  if (!edit || segment.kind === 'brief') return plannedMs
  const changedMs = Math.max(0, plannedMs + edit.lengthenedMs - edit.cutMs)
  return edit.leftAtMs === null ? changedMs : Math.min(changedMs, edit.leftAtMs)
}

/**
 * The segments with their edits, laid end to end in class time (milliseconds). Each keeps its index;
 * one that is gone has no length.
 */
export function editedSegments(base: readonly Segment[], edits: Edits): Segment[] {
  let atMs = 0
  return base.map((segment, index) => {
    const startMs = atMs
    atMs += editedLengthMs(segment, edits[index])
    return { ...segment, startMs, endMs: atMs }
  })
}

/** Where each block of the spec and its body lie among `segments`, in the order of the spec. */
export function blockSpans(spec: SessionSpec, segments: readonly Segment[]): BlockSpan[] {
  let index = 0
  return spec.blocks.map((block) => {
    const firstSegment = index
    let bodySegment = -1
    while (index < segments.length && segments[index]?.block === block.id) {
      const kind = segments[index]?.kind
      if (bodySegment < 0 && kind !== 'brief' && kind !== 'count-in') bodySegment = index
      index += 1
    }
    const lastSegment = Math.max(firstSegment, index - 1)
    if (bodySegment < 0) bodySegment = lastSegment
    return {
      firstSegment,
      lastSegment,
      bodySegment,
      bodyStartMs: segments[bodySegment]?.startMs ?? 0,
      bodyEndMs: segments[lastSegment]?.endMs ?? 0,
    }
  })
}

/**
 * The edits after one more event. The same array comes back where the event changes nothing: an
 * unknown segment or block, a block already left, a skip of what had ended, a finish after the end.
 */
export function withEdit(
  spec: SessionSpec,
  base: readonly Segment[],
  edits: Edits,
  event: EditEvent,
): Edits {
  const next = edits.slice()
  return edit(spec, base, next, event) ? next : edits
}

/** As `withEdit`, in place; false where the event changes nothing. For folds over many events. */
export function edit(
  spec: SessionSpec,
  base: readonly Segment[],
  edits: Edits,
  event: EditEvent,
): boolean {
  if (event.type === 'rest-lengthened' || event.type === 'rest-cut') {
    const segment = base[event.segment]
    if (!segment || segment.kind === 'brief' || segment.kind === 'work') return false
    if (segment.block !== event.block || !(event.ms > 0) || !Number.isFinite(event.ms)) return false
    const before = edits[event.segment] ?? NO_EDIT
    edits[event.segment] =
      event.type === 'rest-lengthened'
        ? {
            ...before,
            lengthenedMs: Math.min(MOST_LENGTHENED_MS, before.lengthenedMs + event.ms),
          }
        : { ...before, cutMs: before.cutMs + event.ms }
    return true
  }
  return leaveBlock(spec, base, edits, event)
}

function leaveBlock(
  spec: SessionSpec,
  base: readonly Segment[],
  edits: Edits,
  event: Extract<EditEvent, { type: 'block-skipped' | 'block-finished' }>,
): boolean {
  const blockIndex = spec.blocks.findIndex((block) => block.id === event.block)
  const wasLeft = base.some(
    (segment, index) => segment.block === event.block && (edits[index]?.leftAtMs ?? null) !== null,
  )
  if (blockIndex < 0 || wasLeft) return false
  const segments = editedSegments(base, edits)
  const span = blockSpans(spec, segments)[blockIndex]
  if (!span) return false
  const leaveMs =
    event.type === 'block-skipped' ? event.classMs : span.bodyStartMs + Math.max(0, event.ms)
  if (!Number.isFinite(leaveMs)) return false
  let changed = false
  for (let index = span.firstSegment; index <= span.lastSegment; index += 1) {
    const segment = segments[index]
    if (!segment || segment.kind === 'brief' || segment.endMs <= leaveMs) continue
    edits[index] = {
      ...(edits[index] ?? NO_EDIT),
      leftAtMs: Math.max(0, leaveMs - segment.startMs),
    }
    changed = true
  }
  return changed
}
