/** What a class may hold at its worst, through every part of the engine: a clear problem, or a sane answer. */
import webvtt from 'webvtt-parser'
import { describe, expect, it } from 'vitest'
import { captionsOf } from '@/server/engine/captions/write'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { forecast } from '@/server/engine/pace/forecast'
import { leadSchedule } from '@/server/engine/pace/lead'
import { FROM_THE_START } from '@/server/engine/pace/walk'
import { check } from '@/server/engine/spec/problems'
import type { Block, Cue, Format, SessionSpec } from '@/server/engine/spec/schema'
import { compile } from '@/server/engine/timeline/compile'
import { apply, newRun, positionAt } from '@/server/engine/timeline/run'
import { speak, utterancesOf } from '@/server/engine/timeline/speech'
import { block, versionOf } from './classes'

const squats = { movement: 'goblet-squat', reps: 5 }
const rounds = (more: object = {}): Format => ({
  type: 'rounds',
  seconds: 120,
  stations: [{ ...squats, ...more }],
})
const specOf = (...blocks: Block[]): SessionSpec => ({ spec: 1, title: 'Bad input', blocks })
const cue = (id: string, at: Cue['at']): Cue => ({ id, text: id, kind: 'form', at })

describe('a tempo of zero', () => {
  it('says nothing about the time of a rep, so the library’s counts, and nothing runs for ever', () => {
    const still = versionOf([block('b', rounds({ tempo: [0, 0, 0, 0] }))])
    expect(check(still.spec)).toEqual([])
    expect(forecast(still, { tiring: 0 })[0]).toMatchObject({ totalReps: 40 })
    const plan = blockPlan(still, block('b', rounds({ tempo: [0, 0, 0, 0] })))
    expect(plan && leadSchedule(plan, FROM_THE_START).steps.length).toBeGreaterThan(30)
  })
  it('in one figure is a tempo like any other', () => {
    const quick = versionOf([block('b', rounds({ tempo: [0, 0, 0.1, 0] }))])
    const [one] = forecast(quick, { tiring: 0 })
    expect(one?.totalReps).toBe(1_200)
  })
})

describe('a ladder without end', () => {
  it('ends with the block, in forecast and lead alike', () => {
    const endless: Format = {
      type: 'rounds',
      seconds: 10_800,
      stations: [
        { movement: 'goblet-squat', reps: { from: 500, step: 500 }, tempo: [0, 0, 0.1, 0] },
      ],
    }
    expect(check(specOf(block('b', endless, { countIn: 0 })))).toEqual([])
    const [one] = forecast(versionOf([block('b', endless)]), { tiring: 0 })
    expect(one?.totalReps).toBe(108_000)
    const plan = blockPlan(versionOf([block('b', endless)]), block('b', endless))
    expect(plan && leadSchedule(plan, FROM_THE_START).steps.at(-1)?.endMs).toBeGreaterThan(
      10_790_000,
    )
  })
  it('with a step that goes nowhere, or the wrong way, is a problem with its path', () => {
    for (const reps of [
      { from: 3, step: 0 },
      { from: 3, step: -1 },
      { from: 3, step: 1, to: 2 },
    ]) {
      const problems = check(specOf(block('b', rounds({ reps }) as Format)))
      expect(
        problems.map((one) => one.path.startsWith('blocks[0].format.stations[0].reps')),
      ).toContain(true)
    }
  })
})

describe('three hours of one-second intervals', () => {
  const seconds: Format = {
    type: 'intervals',
    rounds: 100,
    stations: Array.from({ length: 12 }, () => ({ movement: 'goblet-squat', work: 1, rest: 0 })),
  }
  const long = versionOf(
    Array.from({ length: 9 }, (_, index) => block(`b${index}`, seconds, { countIn: 0 })),
  )
  it('compile to as many segments, each with its own end and no beep within it', () => {
    expect(check(long.spec)).toEqual([])
    const timeline = compile(long)
    expect(timeline.lengthMs).toBe(10_800_000)
    expect(timeline.segments).toHaveLength(10_800)
    expect(timeline.marks).toHaveLength(10_800)
    expect(new Set(timeline.marks.map((mark) => mark.what))).toEqual(new Set(['beep']))
  })
  it('can be played and captioned', () => {
    const started = apply(
      newRun(long, 'v', { waitAtBriefs: false, changeExtraMs: 0 }),
      { type: 'start', versionId: 'v', counting: 'lead', options: [] },
      0,
    ).run
    expect(positionAt(started, 10_799_500)).toMatchObject({ leftMs: 500, phase: 'segment' })
    const { cues, errors } = new webvtt.WebVTTParser({}).parse(captionsOf(long), 'captions')
    expect(errors).toEqual([])
    expect(cues).toHaveLength(10_800 + 9)
  })
})

describe('sixty cues on one instant', () => {
  const cues = Array.from({ length: 60 }, (_, index) => cue(`c${index}`, { from: 'start', s: 20 }))
  const version = versionOf([block('b', rounds(), { countIn: 0, cues })])
  it('stay in the order in which they were written', () => {
    expect(check(version.spec)).toEqual([])
    const ids = compile(version).marks.flatMap((mark) => (mark.what === 'cue' ? [mark.id] : []))
    expect(ids).toEqual(cues.map((one) => one.id))
  })
  it('are said one after another until 5 s have passed; the others are shown', () => {
    const said = speak(utterancesOf(version, compile(version))).filter(
      (one) => one.what === 'cue' && one.isSaid,
    )
    expect(said.map((one) => one.text)).toEqual(['c0', 'c1', 'c2', 'c3', 'c4', 'c5'])
  })
})

describe('cues at the very edges', () => {
  it('fall on the first and on the last instant of the body', () => {
    const cues = [cue('first', { from: 'start', s: 0 }), cue('last', { from: 'end', s: 0 })]
    const version = versionOf([block('b', rounds(), { countIn: 7, cues })])
    const at = compile(version).marks.flatMap((mark) => (mark.what === 'cue' ? [mark.atMs] : []))
    expect(at).toEqual([7_000, 127_000])
  })
  it('a second outside, negative, fractional or endless are problems at their own path', () => {
    for (const s of [121, -1, 1.5, Number.NaN, Number.POSITIVE_INFINITY, 1e308]) {
      const problems = check(
        specOf(block('b', rounds(), { cues: [cue('a', { from: 'start', s })] })),
      )
      expect(problems.map((one) => one.path)).toEqual(['blocks[0].cues[0].at.s'])
    }
  })
})

describe('negative and fractional times', () => {
  it.each([-1, 0, 0.5, 10_801, Number.NaN])('%s seconds of work are a problem', (seconds) => {
    const problems = check(specOf(block('b', { ...rounds(), seconds } as Format)))
    expect(problems.map((one) => one.path)).toEqual(['blocks[0].format.seconds'])
  })
  it.each([[-1], [0.25], [Number.NaN]])('a tempo figure of %s is a problem', (figure) => {
    const problems = check(specOf(block('b', rounds({ tempo: [figure, 0, 1, 0] }) as Format)))
    expect(problems.map((one) => one.path)).toEqual(['blocks[0].format.stations[0].tempo[0]'])
  })
})

describe('a clock that goes back', () => {
  it('takes no class time back, whether it is asked or told', () => {
    const version = versionOf([block('b', rounds(), { countIn: 0 })])
    let run = apply(
      newRun(version, 'v', { waitAtBriefs: false, changeExtraMs: 0 }),
      { type: 'start', versionId: 'v', counting: 'press', options: [] },
      100_000,
    ).run
    run = apply(run, { type: 'log-round', by: 'member' }, 130_000).run
    expect(positionAt(run, 110_000).classMs).toBe(30_000)
    run = apply(run, { type: 'undo-round' }, 90_000).run
    expect(positionAt(run, 130_000).classMs).toBe(30_000)
    expect(positionAt(run, 131_000).classMs).toBe(31_000)
  })
})
