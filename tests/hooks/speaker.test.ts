import { describe, expect, it } from 'vitest'
import { createSpeaker } from '@/hooks/player/speaker'
import type { Cue, Format } from '@/server/engine/spec/schema'
import { apply, newRun, positionAt } from '@/server/engine/timeline/run'
import type { Command, Run } from '@/server/engine/timeline/run-types'
import { block, versionOf } from '../engine/classes'

const START_MS = 20_000
const WORK: Format = {
  type: 'rounds',
  seconds: 60,
  stations: [{ movement: 'goblet-squat', reps: 5 }],
}
const cue = (id: string, s: number, more: Partial<Cue> = {}): Cue => ({
  id,
  text: `Cue ${id}`,
  kind: 'form',
  at: { from: 'start', s },
  ...more,
})
const words = (count: number) => Array.from({ length: count }, () => 'word').join(' ')

interface Said {
  text: string
  atSeconds: number
  level: number
  endSeconds: number | null
  isCut: boolean
}

/** One block in a class that runs, and a voice that takes `secondsAWord`, or never ends (null), or is not there. */
function classWith(
  cues: Cue[],
  voice: { secondsAWord?: number | null; isMissing?: boolean } = {},
  more: { brief?: string; briefSeconds?: number; countIn?: number } = {},
) {
  const version = versionOf([block('work', WORK, { countIn: 0, cues, ...more })])
  const said: (Said & { done: () => void; hasEnded: boolean })[] = []
  const captions: { atSeconds: number; text: string | null }[] = []
  let now = START_MS
  const seconds = () => (now - START_MS) / 1_000
  const speaker = createSpeaker(
    version,
    {
      say(text, level, done) {
        if (voice.isMissing) return null
        const one = {
          text,
          atSeconds: seconds(),
          level,
          endSeconds: null as number | null,
          isCut: false,
          hasEnded: false,
          done,
        }
        said.push(one)
        return () => {
          one.isCut = true
          one.endSeconds = seconds()
        }
      },
    },
    (text) => captions.push({ atSeconds: seconds(), text }),
  )
  let run: Run = newRun(version, 'v1', { waitAtBriefs: false, changeExtraMs: 0 })
  const send = (command: Command) => {
    run = apply(run, command, now).run
    speaker.tick(run, positionAt(run, now), now)
  }
  speaker.begin(now)
  send({ type: 'start', versionId: 'v1', counting: 'press', options: [] })
  return {
    said,
    captions,
    send,
    to(untilSeconds: number) {
      while (seconds() < untilSeconds) {
        now += 50
        const perWord = voice.secondsAWord === undefined ? 0.4 : voice.secondsAWord
        for (const one of said) {
          if (one.hasEnded || one.isCut || perWord === null) continue
          if (seconds() >= one.atSeconds + perWord * one.text.split(' ').length) {
            one.hasEnded = true
            one.endSeconds = seconds()
            one.done()
          }
        }
        speaker.tick(run, positionAt(run, now), now)
      }
    },
    /** Nothing of the page runs for so long. */
    sleep(forSeconds: number) {
      now += forSeconds * 1_000
      speaker.tick(run, positionAt(run, now), now)
    },
    texts: () => said.map((one) => one.text),
  }
}

describe('the voice in class', () => {
  it('says calls, cues and announcements as they fall due, a cue in its spoken words', () => {
    const own = classWith([cue('a', 10, { spoken: 'Ribs down' }), cue('b', 20, { say: false })])
    own.to(60)
    expect(own.said.map((one) => [one.atSeconds, one.text])).toEqual([
      [10, 'Ribs down'],
      [30, '30 seconds'],
      [50, '10 seconds'],
    ])
  })

  it('never says two things at once, whatever the voice takes, and lets go what is 5 s late', () => {
    const own = classWith(
      [
        cue('a', 10, { text: words(5) }),
        cue('b', 11, { text: 'b' }),
        cue('c', 12, { text: words(4) }),
        cue('late', 12, { text: 'late' }),
      ],
      { secondsAWord: 1.2 },
    )
    own.to(28)
    expect(own.texts()).toEqual([words(5), 'b'])
    for (const [index, one] of own.said.entries()) {
      const next = own.said[index + 1]
      if (next) expect(next.atSeconds).toBeGreaterThanOrEqual(one.endSeconds ?? Infinity)
    }
    expect(own.captions.filter((one) => one.text === 'late')).toEqual([])
  })

  it('takes the call before the cue of one moment', () => {
    const own = classWith([cue('a', 30)])
    own.to(40)
    expect(own.texts()).toEqual(['30 seconds', 'Cue a'])
  })

  it('is cut by a safety cue, and never cuts one', () => {
    const own = classWith([
      cue('long', 10, { text: words(20) }),
      cue('safe', 12, { kind: 'safety', text: words(6) }),
      cue('more', 13, { kind: 'safety', text: 'Stop' }),
    ])
    own.to(20)
    expect(own.said.map((one) => [one.text, one.isCut])).toEqual([
      [words(20), true],
      [words(6), false],
      ['Stop', false],
    ])
    expect(own.said[1]?.atSeconds).toBe(12)
    expect(own.said[2]?.atSeconds).toBeGreaterThanOrEqual(own.said[1]?.endSeconds ?? Infinity)
  })

  it('is soft where a beep falls into it, and only there', () => {
    const own = classWith([cue('free', 20), cue('under', 54, { text: words(4) })])
    own.to(60)
    const levelOf = (text: string) => own.said.find((one) => one.text === text)?.level
    expect(levelOf('Cue free')).toBe(1)
    expect(levelOf(words(4))).toBeLessThan(0.6)
  })

  it('says a brief sentence by sentence, and stops with it', () => {
    const own = classWith([], {}, { brief: `Set up. ${words(20)}. And go.`, briefSeconds: 6 })
    own.to(7)
    expect(own.texts()).toEqual(['Set up.', `${words(20)}.`])
    expect(own.said[1]?.isCut).toBe(true)
    expect(own.captions.at(-1)?.text).toBeNull()
  })

  it('is cut by a pause, and what fell due before it is not said after it', () => {
    const own = classWith([cue('a', 10, { text: words(10) }), cue('b', 11)])
    own.to(12)
    own.send({ type: 'pause' })
    expect(own.said[0]?.isCut).toBe(true)
    own.to(20)
    own.send({ type: 'resume' })
    own.to(27)
    expect(own.texts()).toEqual([words(10)])
  })

  it('captions all that it says, for as long as it says it', () => {
    const own = classWith([cue('a', 10, { text: words(5) })], { secondsAWord: 0.6 })
    own.to(20)
    expect(own.captions).toEqual([
      { atSeconds: 10, text: words(5) },
      { atSeconds: 13, text: null },
    ])
  })

  it('without a voice captions the same for the time that it would take to say', () => {
    const own = classWith([cue('a', 10, { text: words(5) }), cue('b', 11)], { isMissing: true })
    own.to(20)
    expect(own.captions).toEqual([
      { atSeconds: 10, text: words(5) },
      { atSeconds: 12, text: null },
      { atSeconds: 12, text: 'Cue b' },
      { atSeconds: 13, text: null },
    ])
  })

  it('goes on after a voice that never says that it has done', () => {
    const own = classWith([cue('a', 2), cue('b', 20)], { secondsAWord: null })
    own.to(29)
    expect(own.texts()).toEqual(['Cue a', 'Cue b'])
    expect(own.said[0]?.isCut).toBe(true)
  })

  it('after a short sleep says nothing that is more than 5 s past', () => {
    const own = classWith([cue('a', 10), cue('b', 18)])
    own.to(9)
    own.sleep(11)
    own.to(25)
    expect(own.texts()).toEqual(['Cue b'])
  })
})
