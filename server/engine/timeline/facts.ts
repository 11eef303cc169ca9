/** Facts into a run: live commands and stored events change it through this one function. */
import { isRedFlag } from '../fit/stop-signs'
import { roundLimit } from '../pace/block-plan'
import { FROM_THE_START } from '../pace/walk'
import type { Format } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent } from '../tally/events'
import { blockSpans, editedSegments, withEdit } from './edits'
import { leadNow, leadPlace, ownPlace } from './lead-run'
import { lowestUndone } from './own-rounds'
import { placeMarks } from './placed-marks'
import type { EventDraft, LeadAnchor, Place, Run, RunBlock } from './run-types'

export function editedTimeline(
  version: PublishedVersion,
  base: Run['base'],
  edits: Run['edits'],
): Run['timeline'] {
  const segments = editedSegments(base.segments, edits)
  const blocks = blockSpans(version.spec, segments)
  return {
    lengthMs: segments.at(-1)?.endMs ?? 0,
    segments,
    marks: placeMarks(version.spec, base, segments, blocks, edits),
    pending: base.pending,
    blocks,
  }
}

type AnyEvent = ClassEvent | EventDraft

export function reduce(run: Run, event: AnyEvent): Run {
  switch (event.type) {
    case 'started': {
      const blocks = run.blocks.map((block) => ({ ...block, options: block.options.slice() }))
      for (const chosen of event.options) {
        const index = run.version.spec.blocks.findIndex((block) => block.id === chosen.block)
        const options = blocks[index]?.options
        if (options && chosen.station < options.length) options[chosen.station] = chosen.option
      }
      if (event.counting === 'lead') {
        run.version.spec.blocks.forEach(({ format }, index) => {
          const own = blocks[index]
          if (!own || roundLimit({ format }) === null) return
          own.lead = { ...FROM_THE_START, logs: mayLog(format) }
        })
      }
      return { ...run, counting: event.counting, blocks }
    }
    case 'brief-passed': {
      const place = run.clock?.place
      const segment = place ? run.timeline.segments[place.segment] : undefined
      if (!place || segment?.kind !== 'brief' || segment.block !== event.block) return run
      return at(run, { segment: place.segment + 1, classMs: place.classMs, briefElapsedMs: 0 })
    }
    case 'round-done': {
      const next = withLogged(run, event.block, (logged) =>
        logged.some((one) => one.round === event.round)
          ? logged
          : [...logged, { round: event.round, classMs: event.classMs }].sort(
              (a, b) => a.round - b.round,
            ),
      )
      return event.by === 'lead' ? next : leadCaughtUp(next, event.block, event.classMs)
    }
    case 'round-undone': {
      const next = withLogged(run, event.block, (logged) =>
        logged.filter((one) => one.round !== event.round),
      )
      // Who takes a round back is not where the lead thought: it counts that round anew.
      return withLead(next, event.block, (lead, index) => ({
        ...ownPlace(next, index, event.classMs, 0),
        logs: lead.logs,
      }))
    }
    case 'option-chosen': {
      const index = blockIndexOf(run, event.block)
      const block = run.blocks[index]
      if (!block || event.station >= block.options.length) return run
      const options = block.options.slice()
      options[event.station] = event.option
      const lead = block.lead && leadPlace(run, index, event.classMs)
      return { ...run, blocks: run.blocks.with(index, { ...block, options, lead }) }
    }
    case 'lead-followed': {
      const index = blockIndexOf(run, event.block)
      const format = run.version.spec.blocks[index]?.format
      if (!format || roundLimit({ format }) === null) return run
      const logs = run.counting === 'lead' && mayLog(format)
      const lead = { ...ownPlace(run, index, event.classMs), logs }
      return withBlock(run, index, (block) => ({ ...block, lead }))
    }
    case 'lead-left':
      return withLead(run, event.block, () => null)
    case 'paused':
      return run.halted ? run : { ...run, halted: 'paused', haltedClassMs: event.classMs }
    case 'resumed':
      return { ...leadAfterJump(run, event.classMs), halted: null }
    case 'stopped':
      return {
        ...run,
        halted: 'stopped',
        haltedClassMs: run.halted ? run.haltedClassMs : event.classMs,
        redFlag: run.redFlag || isRedFlag(event.sign),
      }
    case 'rest-taken': {
      const rest = { fromClassMs: event.classMs - event.ms, toClassMs: event.classMs }
      const next = withBlock(run, blockIndexOf(run, event.block), (block) => ({
        ...block,
        rests: [...block.rests, rest].sort((a, b) => a.fromClassMs - b.fromClassMs),
      }))
      return { ...next, resting: null }
    }
    case 'rest-lengthened':
    case 'rest-cut':
    case 'block-skipped':
    case 'block-finished': {
      const edits = withEdit(run.version.spec, run.base.segments, run.edits, event)
      if (edits === run.edits) return run
      const edited = { ...run, edits, timeline: editedTimeline(run.version, run.base, edits) }
      const place = run.clock?.place
      const segment = place ? run.timeline.segments[place.segment] : undefined
      const leavesBrief =
        event.type === 'block-skipped' && segment?.kind === 'brief' && segment.block === event.block
      if (!place || !leavesBrief) return edited
      const index = run.version.spec.blocks.findIndex((block) => block.id === event.block)
      const last = run.timeline.blocks[index]?.lastSegment ?? place.segment
      return at(edited, { segment: last + 1, classMs: place.classMs, briefElapsedMs: 0 })
    }
    case 'finished':
      return { ...run, ended: true, resting: null }
    case 'rated':
      // Whoever rates a stopped class has left it; the events tell it no other way.
      return run.halted === 'stopped' ? { ...run, ended: true } : run
    default:
      return run
  }
}

export function at(run: Run, place: Place): Run {
  return run.clock ? { ...run, clock: { atMs: run.clock.atMs, place } } : run
}

function blockIndexOf(run: Run, blockId: string): number {
  return run.version.spec.blocks.findIndex((block) => block.id === blockId)
}

function withBlock(run: Run, index: number, change: (block: RunBlock) => RunBlock): Run {
  const block = run.blocks[index]
  if (!block) return run
  const changed = change(block)
  return changed === block ? run : { ...run, blocks: run.blocks.with(index, changed) }
}

function withLogged(
  run: Run,
  blockId: string,
  change: (logged: RunBlock['logged']) => RunBlock['logged'],
): Run {
  return withBlock(run, blockIndexOf(run, blockId), (block) => {
    const logged = change(block.logged)
    return logged === block.logged ? block : { ...block, logged }
  })
}

/** Changes the lead of a block in which it is followed. */
function withLead(
  run: Run,
  blockId: string,
  change: (lead: LeadAnchor, index: number) => LeadAnchor | null,
): Run {
  const index = blockIndexOf(run, blockId)
  return withBlock(run, index, (block) =>
    block.lead ? { ...block, lead: change(block.lead, index) } : block,
  )
}

function mayLog(format: Format): boolean {
  return format.type !== 'rounds' || format.counted !== false
}

/** A member who logs a round before the lead has counted it is ahead: the lead goes with them. */
function leadCaughtUp(run: Run, blockId: string, classMs: number): Run {
  return withLead(run, blockId, (lead, index) => {
    const round = lowestUndone(run.blocks[index]?.logged ?? [])
    const now = leadNow(run, index, classMs)
    if (!now || now.round >= round) return lead
    return { ...ownPlace(run, index, classMs, 0), isChanging: true, logs: lead.logs }
  })
}

/** Over what the clock jumped, nobody was led: the lead goes on from the member's own place. */
function leadAfterJump(run: Run, classMs: number): Run {
  if (!run.halted || classMs <= run.haltedClassMs) return run
  return run.version.spec.blocks.reduce((next, { id }, index) => {
    const bodyStartMs = run.timeline.blocks[index]?.bodyStartMs ?? Infinity
    return bodyStartMs >= classMs
      ? next
      : withLead(next, id, (lead) => ({ ...ownPlace(next, index, classMs, 0), logs: lead.logs }))
  }, run)
}
