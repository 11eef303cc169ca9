/** Facts into a run: live commands and stored events change it through this one function. */
import { isRedFlag } from '../fit/stop-signs'
import type { PublishedVersion } from '../spec/version'
import type { ClassEvent } from '../tally/events'
import { blockSpans, editedSegments, withEdit } from './edits'
import { placeMarks } from './placed-marks'
import type { EventDraft, Place, Run, RunBlock } from './run-types'

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
      return { ...run, blocks }
    }
    case 'brief-passed': {
      const place = run.clock?.place
      const segment = place ? run.timeline.segments[place.segment] : undefined
      if (!place || segment?.kind !== 'brief' || segment.block !== event.block) return run
      return at(run, { segment: place.segment + 1, classMs: place.classMs, briefElapsedMs: 0 })
    }
    case 'round-done':
      return withLogged(run, event.block, (logged) =>
        logged.some((one) => one.round === event.round)
          ? logged
          : [...logged, { round: event.round, classMs: event.classMs }].sort(
              (a, b) => a.round - b.round,
            ),
      )
    case 'round-undone':
      return withLogged(run, event.block, (logged) =>
        logged.filter((one) => one.round !== event.round),
      )
    case 'option-chosen': {
      const index = run.version.spec.blocks.findIndex((block) => block.id === event.block)
      const block = run.blocks[index]
      if (!block || event.station >= block.options.length) return run
      const options = block.options.slice()
      options[event.station] = event.option
      return { ...run, blocks: run.blocks.with(index, { ...block, options }) }
    }
    case 'paused':
      return run.halted ? run : { ...run, halted: 'paused' }
    case 'resumed':
      return { ...run, halted: null }
    case 'stopped':
      return {
        ...run,
        halted: 'stopped',
        redFlag: run.redFlag || isRedFlag(event.sign),
      }
    case 'rest-taken':
      return { ...run, resting: null }
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

function withLogged(
  run: Run,
  blockId: string,
  change: (logged: RunBlock['logged']) => RunBlock['logged'],
): Run {
  const index = run.version.spec.blocks.findIndex((block) => block.id === blockId)
  const block = run.blocks[index]
  if (!block) return run
  const logged = change(block.logged)
  return logged === block.logged
    ? run
    : { ...run, blocks: run.blocks.with(index, { ...block, logged }) }
}
