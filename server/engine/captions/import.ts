/** A WebVTT file as coach's cues of one block. */
import type { Block, Cue, SessionSpec } from '../spec/schema'
import type { PublishedVersion } from '../spec/version'
import { segmentsOf } from '../timeline/compile'
import { readCaptions, type ReadCue } from './read'
import { oneLine } from './write'

/** The limits of a block and a cue; see the session spec. */
const MOST_CUES = 60
const MOST_TEXT = 80
const MOST_SPOKEN = 200

export interface NotCarried {
  /** In the file, from 1; absent where it is about the file as a whole. */
  line?: number
  what: string
}

export interface ImportedCues {
  /** To be added to the block's own, in order of time. */
  cues: Cue[]
  /** By line; what is about the whole file last. */
  notCarried: NotCarried[]
}

interface ImportOptions {
  /** What the file's 0 is: the start of the block's body (after brief and count-in), or of the class. */
  timesFrom: 'block' | 'class'
}

/** By characters as people count them; as the limits of a class do. */
function lengthOf(text: string): number {
  return [...text].length
}

/** `text` within `most` characters, cut after a word where there is one in its later half. */
function shortened(text: string, most: number): string {
  const characters = [...text]
  if (characters.length <= most) return text
  const kept = characters.slice(0, most - 1).join('')
  const isWordEnd = characters[most - 1] === ' '
  const space = kept.lastIndexOf(' ')
  const words = !isWordEnd && space >= kept.length / 2 ? kept.slice(0, space) : kept
  return `${words.trimEnd()}…`
}

type Origin =
  | { from: 'elsewhere' }
  /** A segment, chapter, call or announcement that a class makes by itself. */
  | { from: 'automatic' }
  | { from: 'cue'; block: Block | undefined; id: string; cue: Cue | undefined }

/** Whether a cue is one that we exported, by its identifier. */
function originOf(spec: SessionSpec, { id }: ReadCue): Origin {
  if (/^(?:chapter\/[a-z0-9-]{1,40}|(?:segment|call|next)\/\d{1,6})$/.test(id)) {
    return { from: 'automatic' }
  }
  const [, blockId, cueId] = /^cue\/([a-z0-9-]{1,40})\/([a-z0-9-]{1,40})$/.exec(id) ?? []
  if (blockId === undefined || cueId === undefined) return { from: 'elsewhere' }
  const block = spec.blocks.find((one) => one.id === blockId)
  return { from: 'cue', block, id: cueId, cue: block?.cues?.find((one) => one.id === cueId) }
}

/** Ids that no cue of the block has: the wanted one where it is free, else the next number. */
function idGiver(block: Block): (wanted: string | null) => string {
  const taken = new Set((block.cues ?? []).map((cue) => cue.id))
  let count = 0
  return (wanted) => {
    let id = wanted ?? ''
    while (id === '' || taken.has(id)) {
      count += 1
      id = `caption-${count}`
    }
    taken.add(id)
    return id
  }
}

/** What of a cue is kept beside its text and time, where it is one of ours. */
function keptOf(origin: Origin, block: Block, text: string): Partial<Cue> & Pick<Cue, 'kind'> {
  const cue = origin.from === 'cue' ? origin.cue : undefined
  if (!cue) return { kind: 'form' }
  const { kind, say, spoken, show } = cue
  // What is said and shown with a text goes with that text only; a figure is of a station of its block.
  const isSame = oneLine(cue.text) === text
  const isAtHome = origin.from === 'cue' && origin.block === block
  return {
    kind,
    ...(say === undefined ? {} : { say }),
    ...(isSame && spoken !== undefined ? { spoken } : {}),
    ...(isSame && isAtHome && show !== undefined ? { show } : {}),
  }
}

const UNREAD = {
  settings: 'Where cues stand on the picture (their settings) is not carried over.',
  voice: 'Who speaks (voice tags) is not carried over; the words are.',
  style: 'Styles are not carried over.',
  region: 'Regions are not carried over.',
} as const

function counted(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`
}

function clockText(ms: number): string {
  const seconds = Math.floor(ms / 1_000)
  return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`
}

/**
 * The cues of a WebVTT file for block `blockId` of a sound class, which stays sound when they are added
 * to the block; and everything that could not be carried over, in sentences for a coach. Takes any text.
 * Times become whole seconds from the start of the block's body. Of a class's own export, coach's cues
 * keep their kind, and their id where it is free; what a class says by itself is left out.
 */
export function cuesFromCaptions(
  input: SessionSpec | Pick<PublishedVersion, 'spec'>,
  blockId: string,
  text: string,
  { timesFrom }: ImportOptions,
): ImportedCues {
  const spec = 'blocks' in input ? input : input.spec
  const block = spec.blocks.find((one) => one.id === blockId)
  if (!block) return { cues: [], notCarried: [{ what: `The class has no block ${blockId}.` }] }
  const body = segmentsOf(spec).filter(
    ({ block: id, kind }) => id === blockId && kind !== 'brief' && kind !== 'count-in',
  )
  const bodyStartMs = body[0]?.startMs ?? 0
  const lengthMs = (body.at(-1)?.endMs ?? 0) - bodyStartMs
  const offsetMs = timesFrom === 'class' ? bodyStartMs : 0

  const { cues: read, problems, styleLine, regionLine } = readCaptions(text)
  const notCarried: NotCarried[] = problems.map(({ line, message }) => ({ line, what: message }))
  const cues: Cue[] = []
  const newId = idGiver(block)
  const room = Math.max(0, MOST_CUES - (block.cues ?? []).length)
  const left = { automatic: 0, ofOtherBlocks: 0, rounded: 0 }
  /** The first line of each. */
  const unread: Partial<Record<keyof typeof UNREAD, number | undefined>> = {
    style: styleLine,
    region: regionLine,
  }

  for (const one of read.sort((a, b) => a.startMs - b.startMs)) {
    const { line } = one
    const tell = (what: string) => notCarried.push({ line, what })
    const origin = originOf(spec, one)
    if (origin.from === 'automatic') {
      left.automatic += 1
      continue
    }
    // In class time a cue at the end of one block is at the start of the next, and belongs to one.
    const isOfOther = origin.from === 'cue' && origin.block !== undefined && origin.block !== block
    if (isOfOther && timesFrom === 'class') {
      left.ofOtherBlocks += 1
      continue
    }
    const whole = oneLine(one.text)
    if (whole === '') {
      tell('This cue has no words.')
      continue
    }
    const atMs = one.startMs - offsetMs
    if (atMs < 0 || atMs > lengthMs) {
      const when = clockText(one.startMs)
      tell(`This cue, at ${when}, is outside the block, whose work lasts ${clockText(lengthMs)}.`)
      continue
    }
    if (cues.length >= room) {
      tell(`The block has ${MOST_CUES} cues, the most it may have. This one was left out.`)
      continue
    }
    if (one.hasSettings) unread.settings ??= line
    if (one.hasVoice) unread.voice ??= line
    const s = Math.round(atMs / 1_000)
    if (s * 1_000 !== atMs) left.rounded += 1
    const shownText = shortened(whole, MOST_TEXT)
    const spoken = shownText === whole ? {} : { spoken: shortened(whole, MOST_SPOKEN) }
    if (lengthOf(whole) > MOST_SPOKEN) {
      tell(
        `This text was shortened to ${MOST_TEXT} characters, and what is said to ${MOST_SPOKEN}.`,
      )
    } else if (shownText !== whole) {
      tell(`This text was shortened to ${MOST_TEXT} characters. The whole of it is said.`)
    }
    cues.push({
      id: newId(origin.from === 'cue' ? origin.id : null),
      text: shownText,
      ...spoken,
      ...keptOf(origin, block, whole),
      at: { from: 'start', s },
    })
  }

  for (const what of ['settings', 'voice', 'style', 'region'] as const) {
    const line = unread[what]
    if (line !== undefined) notCarried.push({ line, what: UNREAD[what] })
  }
  if (left.rounded > 0) {
    notCarried.push({
      what: `Times were rounded to whole seconds (${counted(left.rounded, 'cue')}).`,
    })
  }
  if (left.automatic > 0) {
    const count = counted(left.automatic, 'cue')
    notCarried.push({
      what: `${count} of chapters, segments, calls and announcements were left out: a class makes its own.`,
    })
  }
  if (left.ofOtherBlocks > 0) {
    notCarried.push({
      what: `${counted(left.ofOtherBlocks, 'cue')} of other blocks of this class left out.`,
    })
  }
  const lineOf = ({ line }: NotCarried) => line ?? Number.MAX_SAFE_INTEGER
  return { cues, notCarried: notCarried.sort((a, b) => lineOf(a) - lineOf(b)) }
}
