import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compile } from '@/server/engine/timeline/compile'
import {
  callText,
  nextText,
  sentencesOf,
  speak,
  speechMs,
  utterancesOf,
  type Utterance,
} from '@/server/engine/timeline/speech'
import { block, versionOf } from './classes'

const words = (count: number) => Array.from({ length: count }, () => 'word').join(' ')
const say = (what: Utterance['what'], seconds: number, count: number): Utterance => ({
  atMs: seconds * 1_000,
  what,
  text: words(count),
})
/** Each as its seconds from and to, `cut` behind it, or as not said. */
const spoken = (...utterances: Utterance[]) =>
  speak(utterances).map((one) =>
    one.isSaid
      ? `${one.startMs / 1_000}–${one.endMs / 1_000}${one.isCut ? ' cut' : ''}`
      : 'shown only',
  )

describe('a text', () => {
  it.each([
    ['one', 1_000],
    ['one two', 1_000],
    ['one two three', 1_200],
    [words(10), 4_000],
  ])('takes 0.4 s a word, a second at least', (text, ms) => {
    expect(speechMs(text)).toBe(ms)
  })
})

describe('one voice', () => {
  it('says the next when it has done, and shows only what cannot start within 5 s', () => {
    expect(spoken(say('cue', 0, 10), say('cue', 1, 1))).toEqual(['0–4', '4–5'])
    expect(spoken(say('cue', 0, 15), say('cue', 1, 1))).toEqual(['0–6', '6–7'])
    expect(spoken(say('cue', 0, 16), say('cue', 1, 1))).toEqual(['0–6.4', 'shown only'])
  })
  it('takes the time call before the cue before the announcement, of equals the earlier', () => {
    expect(spoken(say('next', 5, 1), say('cue', 5, 1), say('call', 5, 1))).toEqual([
      '7–8',
      '6–7',
      '5–6',
    ])
    expect(
      spoken(say('cue', 0, 5), say('cue', 0.5, 1), say('cue', 1, 1), say('call', 1.5, 1)),
    ).toEqual(['0–2', '3–4', '4–5', '2–3'])
  })
  it('cuts for safety, but not safety for safety', () => {
    expect(spoken(say('cue', 0, 10), say('safety', 1, 5))).toEqual(['0–1 cut', '1–3'])
    expect(spoken(say('safety', 0, 10), say('safety', 1, 5))).toEqual(['0–4', '4–6'])
  })
  it('never says two things at once, nor anything late or out of its turn', () => {
    const utteranceArb = fc.record({
      seconds: fc.integer({ min: 0, max: 40 }),
      what: fc.constantFrom<Utterance['what'][]>('safety', 'call', 'cue', 'next'),
      count: fc.integer({ min: 1, max: 25 }),
    })
    fc.assert(
      fc.property(fc.array(utteranceArb, { maxLength: 12 }), (drafts) => {
        const utterances = drafts
          .map((one) => say(one.what, one.seconds, one.count))
          .sort((a, b) => a.atMs - b.atMs)
        const said = speak(utterances)
          .flatMap((one) => (one.isSaid ? [one] : []))
          .sort((a, b) => a.startMs - b.startMs)
        said.forEach((one, index) => {
          expect(one.startMs).toBeGreaterThanOrEqual(one.atMs)
          expect(one.startMs).toBeLessThanOrEqual(one.atMs + 5_000)
          expect(one.isCut || one.endMs - one.startMs === speechMs(one.text)).toBe(true)
          expect(said[index + 1]?.startMs ?? Infinity).toBeGreaterThanOrEqual(one.endMs)
          if (one.isCut) expect(said[index + 1]?.what).toBe('safety')
        })
      }),
      { numRuns: 200 },
    )
  })
})

describe('what a class says', () => {
  const version = versionOf([
    block(
      'a',
      { type: 'rounds', seconds: 60, stations: [{ movement: 'goblet-squat', reps: 5 }] },
      {
        kind: 'mobility',
        cues: [
          { id: 'shown', text: 'Tall', kind: 'form', say: false, at: { from: 'start', s: 1 } },
          { id: 'pending', text: 'Breathe', kind: 'breath', at: { round: 2 } },
          {
            id: 'said',
            text: 'Low',
            spoken: 'Sit low',
            kind: 'safety',
            at: { from: 'start', s: 9 },
          },
        ],
      },
    ),
    block('h', { type: 'holds', stations: [{ movement: 'floor-press', seconds: 20 }] }),
    block('r', { type: 'rest', seconds: 20 }),
  ])
  it('is its calls, spoken cues and announcements, at their marks', () => {
    expect(utterancesOf(version, compile(version))).toEqual([
      { atMs: 9_000, what: 'safety', text: 'Sit low', cue: { block: 'a', id: 'said' } },
      { atMs: 30_000, what: 'call', text: '30 seconds' },
      { atMs: 45_000, what: 'next', text: 'Next: Floor press' },
      { atMs: 50_000, what: 'call', text: '10 seconds' },
      { atMs: 75_000, what: 'call', text: '10 seconds' },
      { atMs: 95_000, what: 'call', text: '10 seconds' },
    ])
  })
  it('names the rest between two pieces of a block, the movement after it, and the side that comes', () => {
    const pieces = versionOf([
      block(
        'i',
        {
          type: 'intervals',
          rounds: 1,
          stations: [
            { movement: 'goblet-squat', work: 30, rest: 20 },
            { movement: 'floor-press', work: 30, rest: 0, sides: 'each' },
          ],
        },
        { countIn: 0 },
      ),
    ])
    const timeline = compile(pieces)
    const next = utterancesOf(pieces, timeline).filter((one) => one.what === 'next')
    expect(next.map((one) => `${one.atMs / 1_000} ${one.text}`)).toEqual([
      '15 Next: rest',
      '30 Next: Floor press, left',
      '65 Next: Floor press, right',
    ])
  })
  it('names a rest, and calls time as session-spec has it', () => {
    const { segments } = compile(version)
    expect(nextText(version, segments, { atMs: 0, what: 'next', block: 'r' })).toBe('Next: rest')
    expect([callText(60, false), callText(30, false), callText(90, true)]).toEqual([
      '1 minute',
      '30 seconds',
      'Half-way',
    ])
  })
})

describe('a long text', () => {
  it('is said sentence by sentence, and no part is longer than 160 letters', () => {
    expect(sentencesOf('Sit low. Then stand up tall!  Breathe out')).toEqual([
      'Sit low.',
      'Then stand up tall!',
      'Breathe out',
    ])
    const parts = sentencesOf(words(80))
    expect(parts.join(' ')).toBe(words(80))
    expect(Math.max(...parts.map((part) => part.length))).toBeLessThanOrEqual(160)
  })
})
