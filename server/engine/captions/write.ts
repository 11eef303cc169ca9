/** A class as WebVTT (W3C): what is said and shown, in class time, and its blocks as chapters. */
import { blockPlan, type BlockPlan } from '../pace/block-plan'
import { FROM_THE_START, TIRING, walk } from '../pace/walk'
import type { Block, Cue } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import { compile } from '../timeline/compile'
import { callText, nextText, speechMs } from '../timeline/speech'
import type { Segment, Timeline } from '../timeline/types'

/** At the top left, so that a chapter's title, which stays for a whole block, covers no caption. */
const CHAPTER_SETTINGS = ' line:0 position:0% align:left'

/** One cue of the file; `text` is plain and not yet escaped. */
interface CaptionCue {
  id: string
  startMs: number
  endMs: number
  text: string
  settings?: string
}

/**
 * `text` on one line: line breaks, control characters and runs of spaces become one space, half
 * surrogates (which UTF-8 cannot hold) U+FFFD. May be empty.
 */
export function oneLine(text: string): string {
  return text
    .replace(/[\p{Cc}\p{Zl}\p{Zp} ]+/gu, ' ')
    .replace(/\p{Cs}/gu, '\uFFFD')
    .trim()
}

/** A payload is never empty: some readers drop a cue without one. */
function shown(text: string): string {
  return oneLine(text) || '…'
}

/** With `>` written as a reference no text can hold the arrow that begins a cue. */
function escaped(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;')
}

/** `hh:mm:ss.ttt` */
function timestamp(ms: number): string {
  const two = (value: number) => String(Math.floor(value)).padStart(2, '0')
  const fraction = String(ms % 1_000).padStart(3, '0')
  return `${two(ms / 3_600_000)}:${two((ms / 60_000) % 60)}:${two((ms / 1_000) % 60)}.${fraction}`
}

/** The notes, then the cues by their start; of one start as given. */
function fileOf(notes: readonly string[], cues: readonly CaptionCue[]): string {
  const sorted = [...cues].sort((a, b) => a.startMs - b.startMs)
  const blocks = sorted.map(({ id, startMs, endMs, text, settings = '' }) => {
    const timing = `${timestamp(startMs)} --> ${timestamp(endMs)}${settings}`
    return `${id}\n${timing}\n${escaped(text)}`
  })
  return `${['WEBVTT', ...notes.map((note) => `NOTE ${note}`), ...blocks].join('\n\n')}\n`
}

function saidCue(id: string, startMs: number, text: string): CaptionCue {
  const line = shown(text)
  return { id, startMs, endMs: startMs + speechMs(line), text: line }
}

/** A cue for each block, over all its segments; end to end, as a menu of chapters asks. */
function chapterCues(version: PublishedVersion, timeline: Timeline): CaptionCue[] {
  return version.spec.blocks.flatMap((block): CaptionCue[] => {
    const own = timeline.segments.filter((segment) => segment.block === block.id)
    const startMs = own[0]?.startMs
    if (startMs === undefined) return []
    // A cue must be longer than 0.
    const endMs = Math.max(startMs + 1, own.at(-1)?.endMs ?? 0)
    return [{ id: `chapter/${block.id}`, startMs, endMs, text: shown(block.title) }]
  })
}

function movementName(version: PublishedVersion, slug: string): string {
  const name = version.movements.find((one) => one.slug === slug)?.name
  if (name !== undefined) return name
  const words = slug.replace(/-+/g, ' ').trim()
  return words.charAt(0).toUpperCase() + words.slice(1)
}

/** What a segment is, in the trade's words. */
function segmentText(version: PublishedVersion, block: Block, segment: Segment): string {
  switch (segment.kind) {
    case 'brief':
      return block.brief ?? block.title
    case 'count-in':
      return 'Count-in'
    case 'switch':
      return 'Change sides'
    case 'rest': {
      const seconds = (segment.endMs - segment.startMs) / 1_000
      return `Rest, ${seconds === 1 ? '1 second' : callText(seconds, false)}`
    }
    case 'work': {
      const { movement, side } = segment
      if (movement !== undefined) {
        return `${movementName(version, movement)}${side === undefined ? '' : `, ${side}`}`
      }
      const stations = block.format.type === 'rest' ? [] : block.format.stations
      const names = stations.map((station) => movementName(version, station.movement))
      return `${block.title}: ${names.join(', ')}`
    }
  }
}

/**
 * Where the expected lead, begun with the block, begins each station of each round that it reaches:
 * milliseconds into the body, by `round/station`.
 */
function expectedStarts(plan: BlockPlan): ReadonlyMap<string, number> {
  const starts = new Map<string, number>()
  walk(plan, TIRING.expected, FROM_THE_START, {
    step({ kind, round, station, rep, startSeconds }) {
      const isFirst = kind === 'rep' && rep === 1
      if (!isFirst || startSeconds >= plan.seconds) return
      starts.set(`${round}/${station}`, Math.round(startSeconds * 1_000))
    },
  })
  return starts
}

/** Coach's cues that wait for the member: those the expected lead reaches, and a line on each other. */
function pendingCues(
  version: PublishedVersion,
  timeline: Timeline,
  cues: ReadonlyMap<string, Cue>,
): { reached: CaptionCue[]; others: string[] } {
  const reached: CaptionCue[] = []
  const others: string[] = []
  const bodies = new Map(
    version.spec.blocks.map((block) => {
      const body = timeline.segments.find((one) => one.block === block.id && one.kind === 'work')
      const plan = block.cues === undefined ? null : blockPlan(version, block)
      const starts = plan ? expectedStarts(plan) : new Map<string, number>()
      return [block.id, { starts, startMs: body?.startMs ?? 0 }] as const
    }),
  )
  for (const { block, id, round, station } of timeline.pending) {
    const text = cues.get(`${block}/${id}`)?.text ?? ''
    const body = bodies.get(block)
    const intoMs = body?.starts.get(`${round}/${station ?? 0}`)
    if (body && intoMs !== undefined) {
      reached.push(saidCue(cueId(block, id), body.startMs + intoMs, text))
    } else {
      const where = `round ${round}${station === undefined ? '' : `, station ${station + 1}`}`
      others.push(`${block}/${id} (${where}): ${escaped(shown(text))}`)
    }
  }
  return { reached, others }
}

function cueId(block: string, id: string): string {
  return `cue/${block}/${id}`
}

/**
 * A sound class (see `check`) as WebVTT in class time: a chapter a block, and a cue for each segment,
 * time call, coach's cue and announcement. A cue stays as long as its text takes to say. Cues that wait
 * for the member's own round stand where the expected lead begins it, options as planned; those it
 * never reaches are listed in a comment.
 */
export function captionsOf(version: PublishedVersion): string {
  const { spec } = version
  const timeline = compile(version)
  const blocks = new Map(spec.blocks.map((block) => [block.id, block]))
  const coachCues = new Map(
    spec.blocks.flatMap((block) =>
      (block.cues ?? []).map((cue) => [`${block.id}/${cue.id}`, cue] as const),
    ),
  )
  const segments = timeline.segments.flatMap((segment, index) => {
    const block = blocks.get(segment.block)
    if (!block) return []
    const text = segmentText(version, block, segment)
    return [saidCue(`segment/${index + 1}`, segment.startMs, text)]
  })
  const calls: CaptionCue[] = []
  const cues: CaptionCue[] = []
  const nexts: CaptionCue[] = []
  for (const mark of timeline.marks) {
    const { atMs } = mark
    if (mark.what === 'call') {
      const text = callText(mark.left, mark.half === true)
      calls.push(saidCue(`call/${calls.length + 1}`, atMs, text))
    } else if (mark.what === 'cue') {
      const text = coachCues.get(`${mark.block}/${mark.id}`)?.text ?? ''
      cues.push(saidCue(cueId(mark.block, mark.id), atMs, text))
    } else if (mark.what === 'next') {
      nexts.push(
        saidCue(`next/${nexts.length + 1}`, atMs, nextText(version, timeline.segments, mark) ?? ''),
      )
    }
  }
  const chapters = chapterCues(version, timeline).map((chapter) => ({
    ...chapter,
    settings: CHAPTER_SETTINGS,
  }))
  const { reached, others } = pendingCues(version, timeline, coachCues)
  const notes = [escaped(shown(spec.title))]
  if (others.length > 0) notes.push(`Not reached at the expected pace:\n${others.join('\n')}`)
  return fileOf(notes, [...chapters, ...segments, ...calls, ...cues, ...reached, ...nexts])
}

/** The blocks of a sound class alone, for a track of kind `chapters`; the same times as in `captionsOf`. */
export function chaptersOf(version: PublishedVersion): string {
  const notes = [escaped(shown(version.spec.title))]
  return fileOf(notes, chapterCues(version, compile(version)))
}
