/** Marks of a run as they fall due on the clock of `now`. */
import { expectedStationStartMs } from '../pace/walk'
import { isLive } from './edits'
import { leadStartMs } from './lead-run'
import { lowestUndone, planOf } from './own-rounds'
import { briefLengthMs } from './place'
import type { DueMark, Place, Run } from './run-types'
import type { PendingCue, Segment } from './types'

const RANK = { beep: 0, call: 1, cue: 2, next: 3 } as const

/**
 * The marks from `fromMs` up to, not including, `toMs` where the class runs on from `place` at `atMs`;
 * none lies beyond a brief that waits for the member.
 */
export function dueMarks(
  run: Run,
  place: Place,
  atMs: number,
  fromMs: number,
  toMs: number,
): DueMark[] {
  const { segments, marks } = run.timeline
  const found: DueMark[] = []
  let clockMs = atMs
  let { classMs, briefElapsedMs } = place
  let next = marks.findIndex((mark) => mark.segmentIndex >= place.segment)
  if (next < 0) next = marks.length
  const add = (mark: DueMark) => {
    if (mark.dueAtMs >= fromMs && mark.dueAtMs < toMs) found.push(mark)
  }
  for (let index = place.segment; index < segments.length && clockMs < toMs; index += 1) {
    const segment = segments[index]
    if (!segment) break
    if (segment.kind === 'brief') {
      if (run.settings.waitAtBriefs) break
      clockMs += Math.max(0, briefLengthMs(run, segment) - briefElapsedMs)
      briefElapsedMs = 0
      continue
    }
    briefElapsedMs = 0
    const offsetMs = clockMs - classMs
    if (
      segment.kind === 'work' &&
      isLive(segment) &&
      classMs === segment.startMs &&
      comesUnannounced(segments, index)
    ) {
      add({
        atMs: classMs,
        what: 'beep',
        sound: 'start',
        key: `${index}/begin`,
        segmentIndex: index,
        dueAtMs: clockMs,
      })
    }
    for (let mark = marks[next]; mark && mark.segmentIndex <= index; mark = marks[next]) {
      next += 1
      if (mark.segmentIndex === index && mark.atMs >= classMs) {
        add({ ...mark, dueAtMs: mark.atMs + offsetMs })
      }
    }
    if (segment.kind === 'work') {
      for (const cue of run.timeline.pending) {
        if (cue.block !== segment.block) continue
        const cueMs = pendingMs(run, cue)
        if (cueMs === null || cueMs < classMs || cueMs >= segment.endMs) continue
        add({
          atMs: cueMs,
          what: 'cue',
          block: cue.block,
          id: cue.id,
          key: `cue/${cue.block}/${cue.id}`,
          segmentIndex: index,
          dueAtMs: cueMs + offsetMs,
        })
      }
    }
    clockMs += Math.max(0, segment.endMs - classMs)
    classMs = Math.max(classMs, segment.endMs)
  }
  return found.sort((a, b) => a.dueAtMs - b.dueAtMs || RANK[a.what] - RANK[b.what])
}

/** True where no end of a segment sounds the start of this one. */
function comesUnannounced(segments: readonly Segment[], index: number): boolean {
  for (let before = index - 1; before >= 0; before -= 1) {
    const segment = segments[before]
    if (segment && isLive(segment)) return segment.kind === 'brief'
  }
  return true
}

/**
 * Class time at which a pending cue falls due: as the lead, if followed, begins its place, else as the
 * member does; null where neither gets there.
 */
function pendingMs(run: Run, cue: PendingCue): number | null {
  const blockIndex = run.version.spec.blocks.findIndex((block) => block.id === cue.block)
  const lead = run.blocks[blockIndex]?.lead
  const ownMs = ownPendingMs(run, cue, blockIndex)
  if (!lead) return ownMs
  const byLeadMs = leadStartMs(run, blockIndex, cue.round, cue.station ?? 0)
  if (byLeadMs !== null) return byLeadMs
  const joinedMs = (run.timeline.blocks[blockIndex]?.bodyStartMs ?? 0) + lead.atSeconds * 1_000
  return ownMs !== null && ownMs < joinedMs ? ownMs : null
}

/**
 * Null while the cue's round has not begun. A station inside a round is where the expected pace, from
 * the member's own start of the round, puts it; a round logged before that passes the cue by.
 */
function ownPendingMs(run: Run, cue: PendingCue, blockIndex: number): number | null {
  const span = run.timeline.blocks[blockIndex]
  if (!span) return null
  const startMs = roundStartMs(run, blockIndex, cue.round)
  if (startMs === null) return null
  if (cue.station === undefined || cue.station === 0) return startMs
  const plan = planOf(run, blockIndex)
  if (!plan) return null
  const offsetMs = expectedStationStartMs(plan, cue.round, cue.station, startMs - span.bodyStartMs)
  if (offsetMs === null) return null
  const nextRoundMs = roundStartMs(run, blockIndex, cue.round + 1)
  const dueMs = span.bodyStartMs + offsetMs
  return nextRoundMs !== null && dueMs >= nextRoundMs ? null : dueMs
}

function roundStartMs(run: Run, blockIndex: number, round: number): number | null {
  const span = run.timeline.blocks[blockIndex]
  const logged = run.blocks[blockIndex]?.logged ?? []
  if (!span || round > lowestUndone(logged)) return null
  let startMs = span.bodyStartMs
  for (const one of logged) if (one.round < round) startMs = Math.max(startMs, one.classMs)
  return startMs
}
