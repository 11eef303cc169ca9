/**
 * A forgiving reader of WebVTT, after the parsing algorithm of the W3C's specification
 * (https://www.w3.org/TR/webvtt1/#file-parsing): what it leaves out, it tells.
 */

/** Characters; about what a file of 1 MB holds. */
const MOST_CHARACTERS = 1_048_576
const MOST_CUES = 10_000
/** So that a file of junk does not answer with a list as long as itself. */
const MOST_PROBLEMS = 200

export interface ReadCue {
  startMs: number
  endMs: number
  /** Empty where there is none. */
  id: string
  /** Without tags, character references decoded; its lines parted by `\n`. May be empty. */
  text: string
  /** Of its timings, from 1. */
  line: number
  /** Where it stands on the picture, and who speaks: not among what is read. */
  hasSettings: boolean
  hasVoice: boolean
}

interface ReadProblem {
  /** From 1. */
  line: number
  message: string
}

interface ReadCaptions {
  /** Both in the order of the file. */
  cues: ReadCue[]
  problems: ReadProblem[]
  /** The line of the first style sheet and region, which are passed over; absent where there is none. */
  styleLine?: number
  regionLine?: number
}

interface Timings {
  startMs: number
  endMs: number
  hasSettings: boolean
}

const TIMINGS = new RegExp(
  [
    String.raw`^[\t\f ]*(?<start>(\d+):\d\d(?::\d\d)?\.\d{3})(?!\d)`,
    String.raw`[\t\f ]*-->[\t\f ]*`,
    String.raw`(?<end>(\d+):\d\d(?::\d\d)?\.\d{3})(?!\d)(?<settings>.*)$`,
  ].join(''),
  's',
)

/** Milliseconds of a timestamp of the right shape; null for 60 minutes or seconds and the like. */
function msOf(timestamp: string): number | null {
  const [clock = '', fraction = ''] = timestamp.split('.')
  const parts = clock.split(':')
  // Without hours, minutes have two digits; with them, hours have as many as they like.
  if (parts.length === 2 && parts[0]?.length !== 2) return null
  const [seconds = 0, minutes = 0, hours = 0] = parts.map(Number).reverse()
  if (minutes > 59 || seconds > 59) return null
  const ms = ((hours * 60 + minutes) * 60 + seconds) * 1_000 + Number(fraction)
  return Math.min(ms, Number.MAX_SAFE_INTEGER)
}

function timingsOf(line: string): Timings | null {
  const found = TIMINGS.exec(line)?.groups
  const startMs = msOf(found?.['start'] ?? '')
  const endMs = msOf(found?.['end'] ?? '')
  if (!found || startMs === null || endMs === null) return null
  return { startMs, endMs, hasSettings: (found['settings'] ?? '').trim() !== '' }
}

const NAMED: Readonly<Record<string, string>> = {
  amp: '&',
  lt: '<',
  gt: '>',
  nbsp: '\u00A0',
  quot: '"',
  lrm: '\u200E',
  rlm: '\u200F',
  apos: "'",
}

/** The references WebVTT names, quotes, and numbers. HTML's old ones stand without their semicolon too. */
const REFERENCE = /&(?:#(\d+);?|#[xX]([\da-fA-F]+);?|(amp|lt|gt|nbsp|quot);?|(lrm|rlm|apos);)/g

function characterOf(code: number): string {
  const isCharacter = code > 0 && code <= 0x10_ff_ff && !(code >= 0xd8_00 && code <= 0xdf_ff)
  return isCharacter ? String.fromCodePoint(code) : '\uFFFD'
}

function decoded(text: string): string {
  return text.replace(
    REFERENCE,
    (_, decimal?: string, hex?: string, old?: string, named?: string) =>
      decimal === undefined && hex === undefined
        ? (NAMED[old ?? named ?? ''] ?? '')
        : characterOf(parseInt(decimal ?? hex ?? '', decimal === undefined ? 16 : 10)),
  )
}

/** A payload without its tags; one that is not closed reaches to the end. */
function plainText(payload: string): { text: string; hasVoice: boolean } {
  let text = ''
  let hasVoice = false
  let at = 0
  while (at < payload.length) {
    const open = payload.indexOf('<', at)
    if (open === -1) break
    text += decoded(payload.slice(at, open))
    const close = payload.indexOf('>', open)
    at = close === -1 ? payload.length : close + 1
    hasVoice ||= /^<v[\s.]/.test(payload.slice(open, open + 3))
  }
  return { text: text + decoded(payload.slice(at)), hasVoice }
}

const ARROW = '-->'
const BAD_TIMINGS =
  'These timings cannot be read. Write them as 00:01:30.000 --> 00:01:34.000. The cue was left out.'

class Reader {
  readonly cues: ReadCue[] = []
  readonly problems: ReadProblem[] = []
  readonly passedOver: Pick<ReadCaptions, 'styleLine' | 'regionLine'> = {}
  /** Of the line that is read next, from 0. */
  private at = 0

  constructor(private readonly lines: readonly string[]) {}

  tell(line: number, message: string): void {
    if (this.problems.length < MOST_PROBLEMS) this.problems.push({ line, message })
    else if (this.problems.length === MOST_PROBLEMS) {
      this.problems.push({ line, message: 'There is more from here on; it is not listed.' })
    }
  }

  private get line(): string | undefined {
    return this.lines[this.at]
  }

  private skipBlank(): void {
    while (this.line === '') this.at += 1
  }

  /** Lines up to a blank one or an arrow. */
  private collect(): string[] {
    const from = this.at
    while (this.line !== undefined && this.line !== '' && !this.line.includes(ARROW)) this.at += 1
    return this.lines.slice(from, this.at)
  }

  /** What follows the first line. */
  private header(): void {
    if (this.line === undefined || this.line === '') return
    this.tell(this.at + 1, 'A blank line is missing under WEBVTT.')
    this.collect()
  }

  private cue(id: string): void {
    const line = this.at + 1
    const timings = timingsOf(this.line ?? '')
    this.at += 1
    const payload = this.collect()
    if (this.line?.includes(ARROW) === true) {
      this.tell(this.at + 1, 'A blank line is missing before this cue.')
    }
    if (!timings) {
      this.tell(line, BAD_TIMINGS)
      return
    }
    const { startMs, endMs, hasSettings } = timings
    if (endMs <= startMs) this.tell(line, 'This cue ends before it has begun.')
    const { text, hasVoice } = plainText(payload.join('\n'))
    this.cues.push({ startMs, endMs, id, text, line, hasSettings, hasVoice })
  }

  /** One block: a cue, or something else that ends with a blank line. */
  private block(): void {
    const first = this.line ?? ''
    if (first.includes(ARROW)) {
      this.cue('')
      return
    }
    const from = this.at
    this.at += 1
    // Only a second line may be the timings of a first one; even NOTE can be an identifier.
    if (this.line?.includes(ARROW) === true) {
      this.cue(first)
      return
    }
    this.collect()
    if (/^NOTE(?:[ \t]|$)/.test(first)) return
    const isKeyword = (word: string) =>
      first.startsWith(word) && first.slice(word.length).trim() === ''
    if (this.cues.length === 0 && isKeyword('STYLE')) this.passedOver.styleLine ??= from + 1
    else if (this.cues.length === 0 && isKeyword('REGION')) this.passedOver.regionLine ??= from + 1
    else this.tell(from + 1, 'This text stands under no timings. It was left out.')
  }

  read(): void {
    const signature = /^\uFEFF?WEBVTT(?:[ \t]|$)/
    if (!signature.test(this.lines[0] ?? '')) {
      this.tell(1, 'This is no WebVTT file: its first line must be WEBVTT.')
      return
    }
    this.at = 1
    this.header()
    this.skipBlank()
    while (this.line !== undefined) {
      if (this.cues.length >= MOST_CUES) {
        this.tell(this.at + 1, 'There are more than 10,000 cues. The rest was left out.')
        return
      }
      this.block()
      this.skipBlank()
    }
  }
}

/**
 * Reads a WebVTT file of up to 1 MB and 10,000 cues; takes any text and never throws. What breaks the
 * format is left out or mended as the specification says, and told with its line. Comments are passed
 * over. Time is linear in the length of the text.
 */
export function readCaptions(text: string): ReadCaptions {
  if (text.length > MOST_CHARACTERS) {
    const message = 'The file is larger than 1 MB. Split it and import one part at a time.'
    return { cues: [], problems: [{ line: 1, message }] }
  }
  const reader = new Reader(text.replace(/\0/g, '\uFFFD').split(/\r\n|\r|\n/))
  reader.read()
  const { cues, problems, passedOver } = reader
  return { cues, problems: problems.sort((a, b) => a.line - b.line), ...passedOver }
}
