import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import webvtt from 'webvtt-parser'
import { cuesFromCaptions } from '@/server/engine/captions/import'
import { readCaptions } from '@/server/engine/captions/read'
import { captionsOf, chaptersOf, oneLine } from '@/server/engine/captions/write'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { FROM_THE_START } from '@/server/engine/pace/walk'
import { leadSchedule } from '@/server/engine/pace/lead'
import { check } from '@/server/engine/spec/problems'
import type { Block, Cue, Format } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'
import { speechMs } from '@/server/engine/timeline/speech'
import { block, press, squat, versionOf } from './classes'

type ParsedNode = ReturnType<typeof parsed>['cues'][number]['tree']

/** HTML's, of which the reference parser's own short list leaves the semicolon standing. */
const REFERENCES = {
  '&amp;': '&',
  '&lt;': '<',
  '&gt;': '>',
  '&nbsp;': '\u00A0',
  '&lrm;': '\u200E',
  '&rlm;': '\u200F',
}

/** By the W3C's own parser and validator (webvtt-parser, by Anne van Kesteren). */
function parsed(text: string, mode: 'captions' | 'chapters' = 'captions') {
  return new webvtt.WebVTTParser(REFERENCES).parse(text, mode)
}

function textOf(node: ParsedNode): string {
  if (node.type === 'text') return String(node.value)
  return (node.children ?? []).map(textOf).join('')
}

const ms = (seconds: number) => Math.round(seconds * 1_000)
const bySpan = (a: { startMs: number; endMs: number }, b: { startMs: number; endMs: number }) =>
  a.startMs - b.startMs || b.endMs - a.endMs

/** The cues of a file without an error, by the reference parser. */
function soundCues(text: string, mode: 'captions' | 'chapters' = 'captions') {
  const { cues, errors } = parsed(text, mode)
  expect(errors).toEqual([])
  return cues.map(({ id, startTime, endTime, tree }) => ({
    id,
    startMs: ms(startTime),
    endMs: ms(endTime),
    text: textOf(tree),
  }))
}

const cue = (id: string, at: Cue['at'], more: Partial<Cue> = {}): Cue => ({
  id,
  text: `Cue ${id}`,
  kind: 'form',
  at,
  ...more,
})
const squats = { movement: 'goblet-squat', reps: 5 }
const presses = { movement: 'floor-press', reps: 5 }

// ---------------------------------------------------------------------------------------------
// Writing

describe('captions of a class', () => {
  const version = versionOf([
    block(
      'warm',
      {
        type: 'holds',
        stations: [{ movement: 'goblet-squat', seconds: 20, sides: 'each' }],
      },
      {
        kind: 'warm-up',
        title: 'Warm-up & more',
        brief: 'Easy does it.\nOne side, then the other.',
        cues: [cue('breathe', { from: 'start', s: 4 }, { text: 'Breathe <out>' })],
      },
    ),
    block('pause', { type: 'rest', seconds: 20 }),
    block(
      'main',
      { type: 'rounds', seconds: 60, stations: [squats, presses] },
      { title: 'Ladder', countIn: 5, cues: [cue('two', { round: 2 }), cue('far', { round: 90 })] },
    ),
  ])

  // Round 2 of the ladder: 5 × 3 s, 4 s, 5 × 3 s, 4 s, each × (1 + 0.25·t/60), summed apart: 40.879 s.
  it('are this file', () => {
    expect(captionsOf(version)).toBe(`WEBVTT

NOTE Test class

NOTE Not reached at the expected pace:
main/far (round 90): Cue far

chapter/warm
00:00:00.000 --> 00:00:45.000 line:0 position:0% align:left
Warm-up &amp; more

segment/1
00:00:00.000 --> 00:00:03.200
Easy does it. One side, then the other.

segment/2
00:00:00.000 --> 00:00:01.200
Goblet squat, left

cue/warm/breathe
00:00:04.000 --> 00:00:05.000
Breathe &lt;out&gt;

call/1
00:00:10.000 --> 00:00:11.000
10 seconds

segment/3
00:00:20.000 --> 00:00:21.000
Change sides

segment/4
00:00:25.000 --> 00:00:26.200
Goblet squat, right

call/2
00:00:35.000 --> 00:00:36.000
10 seconds

chapter/pause
00:00:45.000 --> 00:01:05.000 line:0 position:0% align:left
pause

segment/5
00:00:45.000 --> 00:00:46.200
Rest, 20 seconds

next/1
00:00:45.000 --> 00:00:46.000
Next: Ladder

call/3
00:00:55.000 --> 00:00:56.000
10 seconds

chapter/main
00:01:05.000 --> 00:02:10.000 line:0 position:0% align:left
Ladder

segment/6
00:01:05.000 --> 00:01:06.000
Count-in

segment/7
00:01:10.000 --> 00:01:12.000
Ladder: Goblet squat, Floor press

call/4
00:01:40.000 --> 00:01:41.000
30 seconds

cue/main/two
00:01:50.879 --> 00:01:51.879
Cue two

call/5
00:02:00.000 --> 00:02:01.000
10 seconds
`)
  })

  it('put chapters at the top, over nothing that is said', () => {
    const { cues, errors } = parsed(captionsOf(version))
    expect(errors).toEqual([])
    for (const one of cues) {
      const isChapter = one.id.startsWith('chapter/')
      expect([one.linePosition, one.textPosition, one.alignment]).toEqual(
        isChapter ? [0, 0, 'left'] : ['auto', 'auto', 'center'],
      )
    }
  })

  it('say rests in the trade’s words and a movement without a name by its slug', () => {
    const texts = soundCues(
      captionsOf(
        versionOf(
          [
            block('a', { type: 'rest', seconds: 1 }),
            block('b', { type: 'rest', seconds: 60 }),
            block('c', { type: 'rounds', seconds: 20, stations: [squats] }),
          ],
          [],
        ),
      ),
    ).filter(({ id }) => id.startsWith('segment/'))
    expect(texts.map(({ text }) => text)).toEqual([
      'Rest, 1 second',
      'Rest, 1 minute',
      'Goblet squat',
    ])
  })

  // The example of a chapter file in the WebVTT specification (W3C, editor's draft of May 2026): slides
  // that follow each other, 0 – 10.7 – 47.6 – 110.1 – 213 s. Blocks have whole seconds.
  it('have chapters end to end like the specification’s slides, of which the file of chapters is made', () => {
    const slides = versionOf(
      [11, 37, 62, 103].map((seconds, index) =>
        block(`slide-${index + 1}`, { type: 'rest', seconds }, { title: `Slide ${index + 1}` }),
      ),
    )
    expect(soundCues(chaptersOf(slides), 'chapters')).toEqual([
      { id: 'chapter/slide-1', startMs: 0, endMs: 11_000, text: 'Slide 1' },
      { id: 'chapter/slide-2', startMs: 11_000, endMs: 48_000, text: 'Slide 2' },
      { id: 'chapter/slide-3', startMs: 48_000, endMs: 110_000, text: 'Slide 3' },
      { id: 'chapter/slide-4', startMs: 110_000, endMs: 213_000, text: 'Slide 4' },
    ])
  })

  it('write hours in two digits for a class of three', () => {
    const long = versionOf([block('a', { type: 'rest', seconds: 10_800 })])
    expect(captionsOf(long)).toContain('\n02:59:50.000 --> 02:59:51.000\n10 seconds\n')
  })

  it('put a cue that waits for a round where the lead begins it, however many rounds come before', () => {
    const cues = [1, 2, 3, 17, 40].flatMap((round) => [
      cue(`r${round}`, { round }),
      cue(`s${round}`, { station: 1, round }),
    ])
    for (const stations of [[squats, presses], [squats]]) {
      const own = stations.length === 1 ? cues.filter(({ at }) => !('station' in at)) : cues
      const format: Format = { type: 'for-time', rounds: 50, cap: 1_000, stations }
      const one = versionOf([block('a', format, { countIn: 3, cues: own })])
      expect(check(one.spec)).toEqual([])
      const plan = blockPlan(one, block('a', format))
      if (!plan) throw new Error('no plan')
      const { steps } = leadSchedule(plan, FROM_THE_START)
      const expected = own.flatMap(({ id, at }) => {
        if ('from' in at) return []
        const station = 'station' in at ? at.station : 0
        const first = steps.find(
          (step) =>
            step.kind === 'rep' &&
            step.rep === 1 &&
            step.round === at.round &&
            step.station === station,
        )
        return first && first.startMs < 1_000_000
          ? [[`cue/a/${id}`, 3_000 + Math.round(first.startMs)]]
          : []
      })
      const found = soundCues(captionsOf(one)).filter(({ id }) => id.startsWith('cue/'))
      expect(found.map(({ id, startMs }) => [id, startMs]).sort()).toEqual(expected.sort())
      expect(found.length).toBeGreaterThan(2)
    }
  })

  it('leave out a cue of a station that would begin as the block ends', () => {
    const at = (seconds: number) => {
      const stations = [{ ...squats, reps: 1, change: 0 }, presses]
      const format: Format = { type: 'rounds', seconds, stations }
      return captionsOf(versionOf([block('a', format, { cues: [cue('c', { station: 1 })] })]))
    }
    expect(at(4)).toContain('\ncue/a/c\n00:00:08.000 --> ')
    expect(at(3)).toContain('\na/c (round 1, station 2): Cue c\n')
    expect(at(3)).not.toContain('cue/a/c')
  })
})

const NASTY = [
  '-->',
  '00:00:01.000 --> 00:00:02.000',
  '<b>bold</b>',
  '<v Coach>',
  '&amp;',
  '&',
  'a\n\nb',
  'a\r\n\r\nNOTE b',
  '\u2028\u2029\u0085',
  ' ',
  '\0',
  '\uD800',
  '🏋️‍♀️ 💪🏽',
  'תרגיל \u202E שמאל',
  '\uFEFFWEBVTT',
  'STYLE',
]
const lineArb = (most: number) =>
  fc
    .oneof(
      fc.constantFrom(...NASTY),
      fc.array(fc.constantFrom(...NASTY, 'squat', ' '), { minLength: 1, maxLength: 3 }),
      fc.string({ minLength: 1, maxLength: most, unit: 'binary' }),
    )
    .map((text) => [...(Array.isArray(text) ? text.join(' ') : text)].slice(0, most).join(''))
const stationArb = fc.record({
  movement: fc.constantFrom('goblet-squat', 'floor-press', 'odd-one', '---'),
  reps: fc.integer({ min: 1, max: 12 }),
  sides: fc.constantFrom('each' as const, 'together' as const, 'alternate' as const),
})
const some = <T>(one: fc.Arbitrary<T>) => fc.array(one, { minLength: 1, maxLength: 3 })
const formatArb: fc.Arbitrary<Format> = fc.oneof(
  fc.record({
    type: fc.constant('rounds' as const),
    seconds: fc.integer({ min: 1, max: 400 }),
    stations: some(stationArb),
  }),
  fc.record({
    type: fc.constant('for-time' as const),
    rounds: fc.integer({ min: 2, max: 9 }),
    cap: fc.integer({ min: 1, max: 400 }),
    stations: some(stationArb),
  }),
  fc.record({
    type: fc.constant('intervals' as const),
    rounds: fc.integer({ min: 2, max: 4 }),
    roundRest: fc.integer({ min: 0, max: 40 }),
    stations: some(
      fc.record({
        movement: fc.constantFrom('goblet-squat', 'odd-one'),
        work: fc.integer({ min: 1, max: 60 }),
        rest: fc.integer({ min: 0, max: 40 }),
        sides: fc.constantFrom('each' as const, 'together' as const),
        switch: fc.integer({ min: 0, max: 6 }),
      }),
    ),
  }),
  fc.record({
    type: fc.constant('every' as const),
    seconds: fc.integer({ min: 1, max: 90 }),
    times: fc.integer({ min: 6, max: 9 }),
    stations: some(stationArb),
  }),
  fc.record({ type: fc.constant('rest' as const), seconds: fc.integer({ min: 1, max: 120 }) }),
)
const cueTextArb = fc.record(
  { text: lineArb(80), spoken: lineArb(200), say: fc.boolean() },
  { requiredKeys: ['text'] },
)
const blockArb = fc.record({
  format: formatArb,
  title: lineArb(80),
  brief: fc.option(lineArb(400), { nil: undefined }),
  cues: fc.array(cueTextArb, { maxLength: 4 }),
})
const PLACES: Cue['at'][] = [
  { from: 'start', s: 0 },
  { from: 'end', s: 0 },
  { round: 2 },
  { station: 0, round: 1 },
]
/** Sound classes of every format, with texts that would break a file that is written carelessly. */
const versionArb: fc.Arbitrary<PublishedVersion> = fc
  .tuple(fc.array(blockArb, { minLength: 1, maxLength: 4 }), lineArb(60), lineArb(80))
  .map(([blocks, name, title]) => {
    const version = versionOf(
      blocks.map(({ format, title: blockTitle, brief, cues }, index): Block => {
        const isRest = format.type === 'rest'
        return block(`b-${index}`, format, {
          title: blockTitle,
          ...(brief === undefined ? {} : { brief }),
          cues: cues.map((texts, place) => ({
            id: `c${place}`,
            kind: (['form', 'safety', 'next', 'breath'] as const)[place % 4] ?? 'form',
            at: PLACES[isRest ? place % 2 : place % 4] ?? { from: 'start', s: 0 },
            ...texts,
          })),
        })
      }),
      [{ ...squat, name }, press],
    )
    return { ...version, spec: { ...version.spec, title } }
  })

describe('the captions of any sound class', () => {
  it('are valid, with every segment and mark of the compiled class at its time', () => {
    fc.assert(
      fc.property(versionArb, (version) => {
        expect(check(version.spec)).toEqual([])
        const text = captionsOf(version)
        const cues = soundCues(text)
        const ids = cues.map(({ id }) => id)
        expect(new Set(ids).size).toBe(ids.length)
        const { segments, marks, pending } = compile(version)
        const starts = (kind: string) =>
          cues.filter(({ id }) => id.startsWith(`${kind}/`)).map(({ startMs }) => startMs)
        const marksAt = (what: string) =>
          marks.filter((mark) => mark.what === what).map(({ atMs }) => atMs)
        expect(starts('segment')).toEqual(segments.map(({ startMs }) => startMs))
        expect(starts('call')).toEqual(marksAt('call'))
        expect(starts('next')).toEqual(marksAt('next'))
        expect(starts('chapter')).toHaveLength(version.spec.blocks.length)
        for (const mark of marks) {
          if (mark.what !== 'cue') continue
          const own = cues.find(({ id }) => id === `cue/${mark.block}/${mark.id}`)
          expect(own?.startMs).toBe(mark.atMs)
        }
        const notes = text.split('\n').filter((line) => /^b-\d\/c\d \(/.test(line))
        expect(starts('cue').length + notes.length).toBe(marksAt('cue').length + pending.length)
        for (const one of cues) {
          if (!one.id.startsWith('chapter/')) {
            expect(one.endMs - one.startMs).toBe(speechMs(one.text))
          }
        }
        const texts = new Map<string, string>(
          version.spec.blocks.flatMap((one) =>
            (one.cues ?? []).map(({ id, text: said }) => [`cue/${one.id}/${id}`, said] as const),
          ),
        )
        for (const { id, text: said } of cues) {
          const written = texts.get(id)
          if (written !== undefined) expect(said).toBe(oneLine(written) || '…')
        }
      }),
      { numRuns: 300 },
    )
  })

  it('have chapters that are valid by themselves, end to end over the whole class', () => {
    fc.assert(
      fc.property(versionArb, (version) => {
        const chapters = soundCues(chaptersOf(version), 'chapters')
        const inCaptions = soundCues(captionsOf(version)).filter(({ id }) =>
          id.startsWith('chapter/'),
        )
        expect(chapters).toEqual(inCaptions)
        let atMs = 0
        for (const one of chapters) {
          expect(one.startMs).toBe(atMs)
          expect(one.endMs).toBeGreaterThan(one.startMs)
          atMs = one.endMs
        }
        expect(atMs).toBe(compile(version).lengthMs)
      }),
    )
  })

  it('are read back as the reference parser reads them, without a problem', () => {
    fc.assert(
      fc.property(versionArb, (version) => {
        const text = captionsOf(version)
        const { cues, problems } = readCaptions(text)
        expect(problems).toEqual([])
        const read = cues.map(({ id, startMs, endMs, text: said }) => ({
          id,
          startMs,
          endMs,
          text: said,
        }))
        expect(read.sort(bySpan)).toEqual(soundCues(text))
      }),
    )
  })
})

// ---------------------------------------------------------------------------------------------
// Reading

/** Cues as `start end id text`, in the order of the file. */
const read = (text: string) =>
  readCaptions(text).cues.map(({ startMs, endMs, id, text: said }) =>
    [startMs, endMs, id, said].join(' ').trim(),
  )
const T = '00:01.000 --> 00:02.000'
const X = `${T}\nx`
const WITH_X = ['1000 2000  x']

describe('the reader', () => {
  // Examples of the WebVTT specification (W3C, editor's draft of May 2026): nested chapters, and slides.
  it('reads the specification’s chapters, nested and not', () => {
    const nested = [
      [0, 84, 'Introduction'],
      [0, 44, 'Topics'],
      [44, 79, 'Presenters'],
      [84, 300, 'Scrolling Effects'],
      [95, 180, "Achim's Demo"],
      [180, 300, 'Timeline Panel'],
    ] as const
    const stamp = (seconds: number) =>
      `${String(Math.floor(seconds / 60)).padStart(2, '0')}:${String(seconds % 60).padStart(2, '0')}.000`
    const file = nested.map(([from, to, title]) => `${stamp(from)} --> ${stamp(to)}\n${title}`)
    expect(read(`WEBVTT\n\n${file.join('\n\n')}\n`)).toEqual(
      nested.map(([from, to, title]) => `${from * 1_000} ${to * 1_000}  ${title}`),
    )
    expect(
      read(`WEBVTT

NOTE
This is from a talk Silvia gave about WebVTT.

Slide 1
00:00:00.000 --> 00:00:10.700
Title Slide

Slide 4
00:01:50.100 --> 00:03:33.000
Timestamps`),
    ).toEqual(['0 10700 Slide 1 Title Slide', '110100 213000 Slide 4 Timestamps'])
  })

  // Cases of our own after the kinds in web-platform-tests, webvtt/parsing/file-parsing. What is
  // expected was worked out from the specification's algorithm; where the reference parser has no
  // error, it must give the same.
  const HOSTILE: [kind: string, text: string, cues: string[], problemLines: number[]][] = [
    ['signature: alone', 'WEBVTT', [], []],
    ['signature: with a BOM', `\uFEFFWEBVTT\n\n${X}`, WITH_X, []],
    ['signature: two BOMs', `\uFEFF\uFEFFWEBVTT\n\n${X}`, [], [1]],
    ['signature: with text after a space', `WEBVTT hi there\n\n${X}`, WITH_X, []],
    ['signature: with text after a tab', `WEBVTT\thi\n\n${X}`, WITH_X, []],
    ['signature: run together', `WEBVTTX\n\n${X}`, [], [1]],
    ['signature: small letters', `webvtt\n\n${X}`, [], [1]],
    ['signature: an older one', `WEBSRT\n\n${X}`, [], [1]],
    ['signature: space before', ` WEBVTT\n\n${X}`, [], [1]],
    ['signature: blank line before', `\nWEBVTT\n\n${X}`, [], [1]],
    ['signature: cut short', 'WEBVT', [], [1]],
    ['signature: no text at all', '', [], [1]],
    ['signature: an SRT file', '1\n00:00:01,000 --> 00:00:02,000\nx', [], [1]],
    ['header: lines of metadata', `WEBVTT\nKind: captions\n\n${X}`, WITH_X, [2]],
    ['header: timings at once', `WEBVTT\n${X}`, WITH_X, [2]],
    ['header: an identifier at once is lost', `WEBVTT\nid\n${X}`, WITH_X, [2]],
    ['header: many blank lines', `WEBVTT\n\n\n\n\n${X}\n\n\n`, WITH_X, []],
    ['header: timings on the first line', `WEBVTT ${T}\n\n${X}`, WITH_X, []],
    ['newlines: CR', `WEBVTT\r\r${X.replace('\n', '\r')}\r`, WITH_X, []],
    ['newlines: CRLF', `WEBVTT\r\n\r\n${X.replace('\n', '\r\n')}\r\n`, WITH_X, []],
    ['newlines: mixed', `WEBVTT\r\n\r${T}\ra\r\nb\nc`, ['1000 2000  a\nb\nc'], []],
    ['newlines: LF then CR is two', `WEBVTT\n\r${X}`, WITH_X, []],
    ['newlines: U+2028 is none', `WEBVTT\n\n${T}\na\u2028b`, ['1000 2000  a\u2028b'], []],
    [
      'nul: in text and identifier',
      `WEBVTT\n\ni\0\n${T}\na\0b`,
      ['1000 2000 i\uFFFD a\uFFFDb'],
      [],
    ],
    ['nul: in timings', `WEBVTT\n\n00:01.000\0 --> 00:02.000\nx`, [], [3]],
    ['ids: any line', `WEBVTT\n\n -- > WEBVTT ü\n${X}`, ['1000 2000  -- > WEBVTT ü x'], []],
    ['ids: two lines are no identifier', `WEBVTT\n\na\nb\n${X}`, WITH_X, [3]],
    ['ids: alone', `WEBVTT\n\nalone\n\n${X}`, WITH_X, [3]],
    ['ids: of a cue with bad timings', `WEBVTT\n\nid\n00:01 --> 00:02\ny\n\n${X}`, WITH_X, [4]],
    ['notes: one line', `WEBVTT\n\nNOTE this\n\n${X}`, WITH_X, []],
    ['notes: many lines', `WEBVTT\n\nNOTE\nthis\nand this\n\n${X}`, WITH_X, []],
    ['notes: at the end', `WEBVTT\n\n${X}\n\nNOTE`, WITH_X, []],
    ['notes: NOTES is none', `WEBVTT\n\nNOTES\nthis\n\n${X}`, WITH_X, [3]],
    ['notes: as an identifier', `WEBVTT\n\nNOTE\n${X}`, ['1000 2000 NOTE x'], []],
    ['notes: in text', `WEBVTT\n\n${T}\nNOTE x`, ['1000 2000  NOTE x'], []],
    ['notes: an arrow on a later line', `WEBVTT\n\nNOTE\nthis\n${X}`, WITH_X, []],
    ['style: before the cues', `WEBVTT\n\nSTYLE\n::cue {}\n\n${X}`, WITH_X, []],
    ['style: after a cue', `WEBVTT\n\n${X}\n\nSTYLE\n::cue {}`, WITH_X, [6]],
    ['style: with an arrow in it', `WEBVTT\n\nSTYLE\na\n-->\nb\n\n${X}`, WITH_X, [5]],
    ['region: before the cues', `WEBVTT\n\nREGION\nid:fred\nwidth:40%\n\n${X}`, WITH_X, []],
    ['arrows: alone', `WEBVTT\n\n-->\n\n${X}`, WITH_X, [3]],
    ['arrows: two in a row', `WEBVTT\n\n-->\n-->\n\n${X}`, WITH_X, [3, 4, 4]],
    [
      'arrows: in the text',
      `WEBVTT\n\n${T}\na\n--> b\n\n${X}`,
      ['1000 2000  a', ...WITH_X],
      [5, 5],
    ],
    [
      'arrows: no blank line between',
      `WEBVTT\n\n${X}\n00:03.000 --> 00:04.000\ny`,
      [...WITH_X, '3000 4000  y'],
      [5],
    ],
    [
      'arrows: no blank line, an identifier becomes text',
      `WEBVTT\n\n${X}\nid\n00:03.000 --> 00:04.000\ny`,
      ['1000 2000  x\nid', '3000 4000  y'],
      [6],
    ],
    ['timings: no space', `WEBVTT\n\n00:01.000-->00:02.000\nx`, WITH_X, []],
    ['timings: tabs and form feeds', `WEBVTT\n\n\t00:01.000\f-->\t00:02.000\t\nx`, WITH_X, []],
    ['timings: a hard space', `WEBVTT\n\n00:01.000\u00A0--> 00:02.000\nx`, [], [3]],
    ['timings: comma', 'WEBVTT\n\n00:00:01,000 --> 00:00:02,000\nx', [], [3]],
    ['timings: one digit of minutes', 'WEBVTT\n\n0:01.000 --> 00:02.000\nx', [], [3]],
    ['timings: one digit of seconds', 'WEBVTT\n\n00:1.000 --> 00:02.000\nx', [], [3]],
    ['timings: one digit of hours', 'WEBVTT\n\n0:00:01.000 --> 00:02.000\nx', WITH_X, []],
    ['timings: 60 minutes', 'WEBVTT\n\n60:01.000 --> 61:02.000\nx', [], [3]],
    ['timings: 60 minutes of an hour', 'WEBVTT\n\n00:60:00.000 --> 01:02:00.000\nx', [], [3]],
    ['timings: 60 seconds', 'WEBVTT\n\n00:01.000 --> 00:60.000\nx', [], [3]],
    ['timings: two digits of fraction', 'WEBVTT\n\n00:01.00 --> 00:02.000\nx', [], [3]],
    ['timings: four digits of fraction', 'WEBVTT\n\n00:01.000 --> 00:02.0000\nx', [], [3]],
    ['timings: no fraction', 'WEBVTT\n\n00:01 --> 00:02\nx', [], [3]],
    ['timings: negative', 'WEBVTT\n\n-00:01.000 --> 00:02.000\nx', [], [3]],
    ['timings: digits of another script', 'WEBVTT\n\n٠٠:01.000 --> 00:02.000\nx', [], [3]],
    [
      'timings: hours of many digits',
      'WEBVTT\n\n100:00:00.000 --> 4000:00:00.000\nx',
      ['360000000 14400000000  x'],
      [],
    ],
    ['timings: the end is missing', `WEBVTT\n\n00:01.000 -->\nx\n\n${X}`, WITH_X, [3]],
    ['timings: the file ends in them', 'WEBVTT\n\n00:01.000 --> 00:02.000', ['1000 2000'], []],
    ['timings: garbage after', `WEBVTT\n\n${T} x:y\nx`, WITH_X, []],
    ['timings: end before start', 'WEBVTT\n\n00:02.000 --> 00:01.000\nx', ['2000 1000  x'], [3]],
    ['settings: every one', `WEBVTT\n\n${T} line:0 position:5% size:50% align:end\nx`, WITH_X, []],
    [
      'tags: stripped',
      `WEBVTT\n\n${T}\n<v Ann>a <b>b</b> <c.x>c</c></v>`,
      ['1000 2000  a b c'],
      [],
    ],
    ['tags: a time', `WEBVTT\n\n${T}\na <00:01.500>b`, ['1000 2000  a b'], []],
    ['tags: not closed', `WEBVTT\n\n${T}\na <b`, ['1000 2000  a'], []],
    ['tags: over two lines', `WEBVTT\n\n${T}\n<v\nAnn>a</v>`, ['1000 2000  a'], []],
    [
      'references: the six',
      `WEBVTT\n\n${T}\n&amp;&lt;b&gt;&nbsp;&lrm;&rlm;.`,
      ['1000 2000  &<b>\u00A0\u200E\u200F.'],
      [],
    ],
    ['references: written twice', `WEBVTT\n\n${T}\n&amp;lt;`, ['1000 2000  &lt;'], []],
    ['references: numbers', `WEBVTT\n\n${T}\n&#65;&#x20AC;&#x1F600;`, ['1000 2000  A€😀'], []],
    ['references: old ones', `WEBVTT\n\n${T}\n&ltx&ampy`, ['1000 2000  <x&y'], []],
    [
      'references: no characters',
      `WEBVTT\n\n${T}\n&#0;&#xD800;&#x110000;&#99999999999;`,
      ['1000 2000  \uFFFD\uFFFD\uFFFD\uFFFD'],
      [],
    ],
    [
      'references: unknown',
      `WEBVTT\n\n${T}\n& &; &x; &#; &#x;`,
      ['1000 2000  & &; &x; &#; &#x;'],
      [],
    ],
  ]
  it.each(HOSTILE)('%s', (_kind, text, cues, problemLines) => {
    expect(read(text)).toEqual(cues)
    expect(readCaptions(text).problems.map(({ line }) => line)).toEqual(problemLines)
    const reference = parsed(text)
    if (reference.errors.length > 0 || problemLines.length > 0) return
    expect(read(text)).toEqual(
      reference.cues.map(({ startTime, endTime, id, tree }) =>
        [ms(startTime), ms(endTime), id, textOf(tree)].join(' ').trim(),
      ),
    )
  })

  it('is held to the reference parser by a good part of the table', () => {
    const both = HOSTILE.filter(
      ([, text, , lines]) => lines.length === 0 && parsed(text).errors.length === 0,
    )
    expect(both.length).toBeGreaterThan(20)
  })

  const PIECES = [
    'WEBVTT',
    '\uFEFF',
    '\n',
    '\n\n',
    '\r\n',
    '-->',
    ' --> ',
    '00:01.000',
    '01:00:02.500',
    T,
    X,
    'NOTE',
    'STYLE',
    'REGION',
    '<',
    '>',
    '<v ',
    '&amp;',
    '&#',
    '\0',
    ' ',
    'id',
    'line:0',
  ]
  /** Mostly sound, so that the two can be held against each other. */
  const fileArb = fc
    .tuple(
      fc.array(
        fc.tuple(
          fc.constantFrom('', 'id\n', 'NOTE a\n\n', 'NOTE\nb\n\n', ' - \n', 'STYLE\n'),
          fc.constantFrom(
            T,
            T,
            '00:01.000\t-->\t111:00:03.000 align:left',
            '00:01.0 --> 00:02.000',
          ),
          fc.array(
            fc.constantFrom('a', ' ', '\n', '&amp;', '&lt;i', '<b>c</b>', '<00:01.500>', '\0', 'é'),
            {
              maxLength: 5,
            },
          ),
        ),
        { maxLength: 4 },
      ),
      fc.constantFrom('\n', '\r', '\r\n'),
      fc.constantFrom('', '\uFEFF'),
    )
    .map(([blocks, newline, bom]) => {
      const all = blocks.map(
        ([before, timing, payload]) => `${before}${timing}\n${payload.join('')}`,
      )
      return bom + ['WEBVTT', ...all].join('\n\n').replaceAll('\n', newline)
    })
  const junkArb = fc.oneof(
    fileArb,
    fc.string({ unit: 'binary', maxLength: 200 }),
    fc.uint8Array({ maxLength: 400 }).map((bytes) => new TextDecoder().decode(bytes)),
    fc
      .array(fc.constantFrom(...PIECES), { maxLength: 40 })
      .map((pieces) => `WEBVTT\n\n${pieces.join('')}`),
  )
  it('takes any text, and agrees with the reference parser where that has no error', () => {
    let both = 0
    fc.assert(
      fc.property(junkArb, (text) => {
        const ours = readCaptions(text)
        for (const one of ours.cues) {
          expect(Number.isSafeInteger(one.startMs) && Number.isSafeInteger(one.endMs)).toBe(true)
        }
        const reference = parsed(text)
        if (reference.errors.length > 0 || ours.problems.length > 0) return
        // To the specification a keyword over timings is an identifier; to the reference a comment.
        if (/(?:NOTE|STYLE)[^\r\n]*(?:\r\n|\r|\n)[^\r\n]*-->/.test(text)) return
        both += reference.cues.length
        expect(
          ours.cues
            .sort(bySpan)
            .map(({ startMs, endMs, id, text: said }) => [startMs, endMs, id, said]),
        ).toEqual(
          reference.cues.map((one) => [
            ms(one.startTime),
            ms(one.endTime),
            one.id,
            textOf(one.tree),
          ]),
        )
      }),
      { numRuns: 3_000 },
    )
    expect(both).toBeGreaterThan(100)
  })

  const MB = 1_000_000
  it.each<[string, string]>([
    ['one line of digits', '9'.repeat(MB)],
    ['spaces before no arrow', `00:01.000${' '.repeat(MB)}`],
    ['arrows', '-->\n'.repeat(MB / 4)],
    ['arrows on one line', '-->'.repeat(MB / 3)],
    ['digits before an arrow', `${'9'.repeat(MB)} --> 00:01.000`],
    ['colons', `${'00:'.repeat(MB / 3)} -->`],
    ['tags that do not close', `${T}\n${'<'.repeat(MB)}`],
    ['tags', `${T}\n${'<v>'.repeat(MB / 3)}`],
    ['ampersands', `${T}\n${'&'.repeat(MB)}`],
    ['number references', `${T}\n${'&#'.repeat(MB / 2)}`],
    ['one long number reference', `${T}\n&#x${'f'.repeat(MB)}`],
    ['blank lines', '\n'.repeat(MB)],
    ['short cues', `${T}\nx\n\n`.repeat(MB / 27)],
    ['words', 'alone\n\n'.repeat(MB / 7)],
  ])('answers 1 MB of junk quickly: %s', (_name, junk) => {
    const text = `WEBVTT\n\n${junk}`
    const before = performance.now()
    const { cues, problems } = readCaptions(text)
    // Hundreds of times what it takes: what grows with the square of the length takes minutes.
    expect(performance.now() - before).toBeLessThan(5_000)
    expect(cues.length).toBeLessThanOrEqual(10_000)
    expect(problems.length).toBeLessThanOrEqual(201)
  })

  it('refuses more than 1 MB and stops at 10,000 cues, and says so', () => {
    const large = readCaptions(`WEBVTT\n\n${'x'.repeat(1_100_000)}`)
    expect(large).toEqual({
      cues: [],
      problems: [{ line: 1, message: expect.stringContaining('1 MB') }],
    })
    const many = readCaptions(`WEBVTT\n\n${`${T}\nx\n\n`.repeat(10_002)}`)
    expect(many.cues).toHaveLength(10_000)
    expect(many.problems).toEqual([{ line: 30_003, message: expect.stringContaining('10,000') }])
  })
})

// ---------------------------------------------------------------------------------------------
// Importing

describe('importing captions', () => {
  const rounds: Format = { type: 'rounds', seconds: 60, stations: [squats, presses] }
  const target = (more: Partial<Block> = {}) =>
    versionOf([block('first', { type: 'rest', seconds: 30 }), block('main', rounds, more)])
  const file = (...cues: string[]) => `WEBVTT\n\n${cues.join('\n\n')}`
  const whats = (found: ReturnType<typeof cuesFromCaptions>) =>
    found.notCarried.map(({ line, what }) => (line === undefined ? what : `${line}: ${what}`))
  const withCues = ({ spec }: PublishedVersion, blockId: string, cues: Cue[]) => ({
    ...spec,
    blocks: spec.blocks.map((one) =>
      one.id === blockId ? { ...one, cues: [...(one.cues ?? []), ...cues] } : one,
    ),
  })

  it('puts cues at whole seconds of the block’s body, from its own time or the class’s', () => {
    const version = target({ countIn: 5, brief: 'Set up.' })
    const text = file('00:40.400 --> 00:41.000\n<b>Ribs</b> &amp;\nhips')
    expect(cuesFromCaptions(version, 'main', text, { timesFrom: 'block' })).toEqual({
      cues: [{ id: 'caption-1', text: 'Ribs & hips', kind: 'form', at: { from: 'start', s: 40 } }],
      notCarried: [{ what: 'Times were rounded to whole seconds (1 cue).' }],
    })
    // The rest is 30 s, the count-in 5.
    expect(cuesFromCaptions(version.spec, 'main', text, { timesFrom: 'class' }).cues).toMatchObject(
      [{ at: { from: 'start', s: 5 } }],
    )
  })

  it('tells everything that it leaves out or changes, with its line', () => {
    const long = 'Press the floor away '.repeat(6).trim()
    const longer = 'Press the floor away '.repeat(12).trim()
    const found = cuesFromCaptions(
      target(),
      'main',
      file(
        'STYLE\n::cue {}',
        'REGION\nid:a',
        `00:01.000 --> 00:02.000 line:0\n<v Ann>${long}`,
        `00:02.000 --> 00:03.000\n${longer}`,
        '00:03.000 --> 00:04.000\n<i> </i>',
        '01:00.000 --> 01:02.000\nOn the end',
        '01:00.001 --> 01:02.000\nAfter the end',
        '00:05 --> 00:06\nBad timings',
      ),
      { timesFrom: 'block' },
    )
    expect(found.cues.map(({ at }) => at)).toEqual([
      { from: 'start', s: 1 },
      { from: 'start', s: 2 },
      { from: 'start', s: 60 },
    ])
    expect(found.cues[0]?.text).toBe(
      'Press the floor away Press the floor away Press the floor away Press the floor…',
    )
    expect(found.cues[0]?.spoken).toBe(long)
    expect([...(found.cues[1]?.spoken ?? '')].length).toBeLessThanOrEqual(200)
    expect(whats(found)).toEqual([
      '3: Styles are not carried over.',
      '6: Regions are not carried over.',
      '9: This text was shortened to 80 characters. The whole of it is said.',
      '9: Where cues stand on the picture (their settings) is not carried over.',
      '9: Who speaks (voice tags) is not carried over; the words are.',
      '12: This text was shortened to 80 characters, and what is said to 200.',
      '15: This cue has no words.',
      '21: This cue, at 1:00, is outside the block, whose work lasts 1:00.',
      expect.stringMatching(/^24: These timings cannot be read/),
    ])
  })

  it('fills a block up to 60 cues, with ids that are new', () => {
    const taken = Array.from({ length: 58 }, (_, index) =>
      cue(`caption-${index + 2}`, { from: 'start', s: 1 }),
    )
    const version = target({ cues: taken })
    const found = cuesFromCaptions(version, 'main', file(X, X, X), { timesFrom: 'block' })
    expect(found.cues.map(({ id }) => id)).toEqual(['caption-1', 'caption-60'])
    expect(whats(found)).toEqual([
      '9: The block has 60 cues, the most it may have. This one was left out.',
    ])
    expect(check(withCues(version, 'main', found.cues))).toEqual([])
  })

  it('says so where there is no such block, or no such file', () => {
    expect(cuesFromCaptions(target(), 'gone', file(X), { timesFrom: 'block' })).toEqual({
      cues: [],
      notCarried: [{ what: 'The class has no block gone.' }],
    })
    const { cues, notCarried } = cuesFromCaptions(target(), 'main', 'x', { timesFrom: 'block' })
    expect([cues, notCarried.length]).toEqual([[], 1])
  })

  it('takes back what was exported: each block its own cues, with kind, id and what is said', () => {
    fc.assert(
      fc.property(versionArb, (version) => {
        const text = captionsOf(version)
        const { marks } = compile(version)
        const bare = {
          ...version.spec,
          blocks: version.spec.blocks.map((one) => ({ ...one, cues: [] })),
        }
        for (const one of version.spec.blocks) {
          // Into the class as it was: the ids are taken, all else comes back.
          const { cues, notCarried } = cuesFromCaptions(version, one.id, text, {
            timesFrom: 'class',
          })
          const exported = readCaptions(text).cues.filter(({ id }) =>
            id.startsWith(`cue/${one.id}/`),
          )
          expect(cues).toHaveLength(exported.length)
          expect(notCarried.every(({ line }) => line === undefined)).toBe(true)
          const own = new Set((one.cues ?? []).map(({ id }) => id))
          expect(cues.some(({ id }) => own.has(id))).toBe(false)
          const body = compile(version).segments.find(
            ({ block: id, kind }) => id === one.id && kind !== 'brief' && kind !== 'count-in',
          )
          const startMs = body?.startMs ?? 0
          for (const written of one.cues ?? []) {
            const mark = marks.find(
              (each) => each.what === 'cue' && each.block === one.id && each.id === written.id,
            )
            if (!mark || oneLine(written.text) === '') continue
            expect(cues).toContainEqual({
              ...written,
              text: oneLine(written.text),
              id: expect.any(String),
              at: { from: 'start', s: (mark.atMs - startMs) / 1_000 },
            })
          }
          expect(check(withCues(version, one.id, cues))).toEqual([])
          // Into the same class without its cues: the ids come back too.
          const again = cuesFromCaptions(bare, one.id, text, { timesFrom: 'class' }).cues
          expect(again.map(({ id }) => `cue/${one.id}/${id}`).sort()).toEqual(
            exported.map(({ id }) => id).sort(),
          )
        }
      }),
    )
  })

  it('keeps a figure only at home, and what is said only with its text', () => {
    const more = { kind: 'safety', spoken: 'Mind the bell', show: { station: 1 } } as const
    const version = target({ cues: [cue('bell', { from: 'start', s: 3 }, more)] })
    const of = (text: string, blockId: string) =>
      cuesFromCaptions(version, blockId, file(`cue/main/bell\n${T}\n${text}`), {
        timesFrom: 'block',
      }).cues[0]
    expect(of('Cue bell', 'main')).toMatchObject(more)
    expect(of('Cue bell', 'first')).toEqual({
      id: 'bell',
      text: 'Cue bell',
      kind: 'safety',
      spoken: 'Mind the bell',
      at: { from: 'start', s: 1 },
    })
    expect(of('Another', 'first')).toEqual({
      id: 'bell',
      text: 'Another',
      kind: 'safety',
      at: { from: 'start', s: 1 },
    })
  })

  it('leaves any sound class sound, whatever the file', () => {
    const stampArb = fc
      .integer({ min: 0, max: 400_000 })
      .map(
        (at) =>
          `${String(Math.floor(at / 60_000)).padStart(2, '0')}:${String(Math.floor(at / 1_000) % 60).padStart(2, '0')}.${String(at % 1_000).padStart(3, '0')}`,
      )
    const cueArb = fc
      .tuple(fc.constantFrom('', 'cue/b-0/c0\n', 'cue/b-9/new\n', 'id\n'), stampArb, lineArb(400))
      .map(([id, stamp, text]) => `${id}${stamp} --> ${stamp}\n${text}`)
    fc.assert(
      fc.property(
        versionArb,
        fc.array(cueArb, { maxLength: 80 }),
        fc.constantFrom('block' as const, 'class' as const),
        (version, cues, timesFrom) => {
          const found = cuesFromCaptions(version, 'b-0', file(...cues), { timesFrom })
          expect(check(withCues(version, 'b-0', found.cues))).toEqual([])
        },
      ),
    )
  })
})
