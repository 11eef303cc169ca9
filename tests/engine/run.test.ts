import { describe, expect, it } from 'vitest'
import type { ClassEvent } from '@/server/engine/tally/events'
import {
  afterGap,
  apply,
  marksBetween,
  newRun,
  positionAt,
  runFromEvents,
} from '@/server/engine/timeline/run'
import type {
  Applied,
  Command,
  EventDraft,
  Run,
  RunSettings,
} from '@/server/engine/timeline/run-types'
import { block, versionOf } from './classes'

const START = 5_000
const settings: RunSettings = { waitAtBriefs: false, changeExtraMs: 0 }
const squats = { movement: 'goblet-squat', reps: 5 }

const version = versionOf([
  block(
    'warm',
    {
      type: 'intervals',
      rounds: 1,
      stations: [
        { movement: 'goblet-squat', work: 30, rest: 10 },
        { movement: 'floor-press', work: 30, rest: 10 },
      ],
    },
    { kind: 'warm-up', brief: 'Two easy pieces.', briefSeconds: 20, countIn: 0 },
  ),
  block('pause', { type: 'rest', seconds: 60, atLeast: 40, atMost: 90 }),
  block(
    'main',
    { type: 'rounds', seconds: 120, stations: [squats] },
    { brief: 'As many as you can.', briefSeconds: 10, countIn: 5 },
  ),
  block(
    'ladder',
    {
      type: 'rounds',
      seconds: 100,
      stations: [{ movement: 'goblet-squat', reps: { from: 4, step: -1, to: 3, then: 'done' } }],
    },
    { countIn: 0 },
  ),
  block('race', { type: 'for-time', rounds: 2, cap: 100, stations: [squats] }, { countIn: 0 }),
])
/** Class time at which each body starts. */
const BODY = { warm: 0, pause: 70_000, main: 135_000, ladder: 255_000, race: 355_000 }
const LENGTH = 455_000

class Member {
  run: Run
  now = START
  events: EventDraft[] = []
  constructor(of = version, with_: RunSettings = settings) {
    this.run = newRun(of, 'v1', with_)
  }
  send(command: Command): Applied {
    const applied = apply(this.run, command, this.now)
    this.run = applied.run
    this.events.push(...applied.events)
    return applied
  }
  start(): this {
    this.send({ type: 'start', versionId: 'v1', counting: 'press', options: [] })
    return this
  }
  wait(ms: number): this {
    this.now += ms
    return this
  }
  at() {
    return positionAt(this.run, this.now)
  }
  /** Runs on to an instant of class time, past briefs that go on by themselves. */
  toClass(ms: number): this {
    while (this.at().classMs < ms || this.at().phase === 'brief') this.now += 1_000
    return this
  }
  stored(): ClassEvent[] {
    return this.events.map((event, index) => ({
      ...event,
      id: `e${String(index).padStart(5, '0')}`,
      device: 'laptop',
      seq: index + 1,
      wallMs: 0,
    }))
  }
}

const log: Command = { type: 'log-round', by: 'member' }

describe('a run in class time', () => {
  it('is ready before class and refuses what needs one', () => {
    const member = new Member()
    expect(member.at()).toMatchObject({ phase: 'ready', segmentIndex: -1, place: null })
    expect(member.send({ type: 'pause' }).refused).toBe('The class has not started yet.')
    expect(member.events).toEqual([])
  })
  it('lets class time stand during a brief and goes on by itself', () => {
    const member = new Member().start().wait(19_999)
    expect(member.at()).toMatchObject({ phase: 'brief', classMs: 0, briefLeftMs: 1 })
    expect(member.wait(1).at()).toMatchObject({ phase: 'segment', classMs: 0, elapsedMs: 0 })
    expect(member.wait(29_999).at()).toMatchObject({ leftMs: 1, segment: { kind: 'work' } })
    expect(member.wait(1).at()).toMatchObject({ elapsedMs: 0, segment: { kind: 'rest' } })
  })
  it('waits in a brief where the member chose so, until it is passed', () => {
    const member = new Member(version, { ...settings, waitAtBriefs: true }).start().wait(3_600_000)
    expect(member.at()).toMatchObject({ phase: 'brief', classMs: 0, briefLeftMs: null })
    expect(member.send({ type: 'pass-brief' }).events).toMatchObject([
      { type: 'brief-passed', block: 'warm' },
    ])
    expect(member.wait(1_000).at()).toMatchObject({ phase: 'segment', classMs: 1_000 })
  })
  it('stops the countdown of a brief in a pause as well', () => {
    const member = new Member().start().wait(5_000)
    member.send({ type: 'pause' })
    expect(member.wait(100_000).at()).toMatchObject({ halted: 'paused', briefLeftMs: 15_000 })
    member.send({ type: 'resume' })
    expect(member.wait(14_999).at()).toMatchObject({ phase: 'brief', briefLeftMs: 1 })
  })
  it('adds nothing to class time in a pause', () => {
    const member = new Member().start().toClass(10_000)
    member.send({ type: 'pause' })
    expect(member.wait(3_600_000).at().classMs).toBe(10_000)
    member.send({ type: 'resume', from: 'where-i-was' })
    expect(member.wait(1).at().classMs).toBe(10_001)
  })
  it('goes on where the clock would be when asked to', () => {
    const member = new Member().start().toClass(10_000)
    member.send({ type: 'pause' })
    member.wait(45_000).send({ type: 'resume', from: 'where-the-clock-would-be' })
    expect(member.at().classMs).toBe(55_000)
    expect(member.events.at(-1)).toEqual({ type: 'resumed', classMs: 55_000 })
  })
  it('is over at its end and owes one finish, whatever is sent twice', () => {
    const member = new Member().start().toClass(LENGTH)
    expect(member.at()).toMatchObject({
      phase: 'over',
      classMs: LENGTH,
      owed: { type: 'end-class' },
    })
    expect(member.send({ type: 'end-class' }).events).toEqual([
      { type: 'finished', classMs: LENGTH },
    ])
    expect(member.at().owed).toBeNull()
    expect(member.send({ type: 'end-class' })).toMatchObject({ events: [], refused: null })
    expect(member.send(log).refused).toBe('The class is over.')
  })
  it('puts more time to change into every count-in, as events', () => {
    const member = new Member(version, { ...settings, changeExtraMs: 7_000 }).start()
    expect(member.events.slice(1)).toMatchObject([
      { type: 'rest-lengthened', block: 'main', ms: 7_000 },
    ])
    expect(member.run.timeline.lengthMs).toBe(LENGTH + 7_000)
    const back = runFromEvents(version, 'v1', settings, member.stored(), 0, null)
    expect(back.run.timeline).toEqual(member.run.timeline)
  })
})

describe('rests', () => {
  it('are cut after the least time only, and the class goes on at once', () => {
    const member = new Member().start().toClass(BODY.pause + 39_000)
    expect(member.at().rest).toEqual({ mayCutInMs: 1_000, mayLengthenMs: 30_000 })
    expect(member.send({ type: 'cut-rest' }).refused).toBe('This rest is at least 1 s more.')
    member.wait(1_000)
    expect(member.send({ type: 'cut-rest' }).events).toMatchObject([
      { type: 'rest-cut', block: 'pause', ms: 20_000 },
    ])
    expect(member.at()).toMatchObject({
      phase: 'brief',
      segment: { block: 'main' },
      classMs: BODY.pause + 40_000,
    })
  })
  it('are lengthened up to the most, and no further', () => {
    const member = new Member().start().toClass(BODY.pause + 5_000)
    expect(member.send({ type: 'lengthen-rest', ms: 15_000 }).events).toMatchObject([
      { ms: 15_000 },
    ])
    expect(member.send({ type: 'lengthen-rest', ms: 60_000 }).events).toMatchObject([
      { ms: 15_000 },
    ])
    expect(member.send({ type: 'lengthen-rest', ms: 1_000 }).refused).toBe(
      'This rest is as long as it may be.',
    )
    expect(member.at()).toMatchObject({ leftMs: 85_000, bodyLeftMs: 85_000 })
  })
  it('without limits of their own may be cut at once and grow by five minutes', () => {
    const member = new Member().start().toClass(30_000)
    expect(member.at().rest).toEqual({ mayCutInMs: 0, mayLengthenMs: 300_000 })
    member.send({ type: 'cut-rest' })
    expect(member.at()).toMatchObject({ segment: { kind: 'work', station: 1 }, classMs: 30_000 })
  })
  it('are the only thing that is lengthened or cut', () => {
    const member = new Member().start().toClass(5_000)
    expect(member.send({ type: 'cut-rest' }).refused).toBe('Only a rest can be cut short.')
    expect(member.send({ type: 'lengthen-rest', ms: 5 }).refused).toBe(
      'Only a rest can be made longer.',
    )
  })
})

describe('rounds', () => {
  it('are logged once for two presses within 1.5 s', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    expect(member.send(log)).toMatchObject({
      events: [{ type: 'round-done', round: 1 }],
      refused: null,
    })
    expect(member.wait(1_499).send(log).refused).toBe(
      'Round 1 was logged a second ago, so this press is not counted.',
    )
    expect(member.wait(1).send(log).events).toMatchObject([{ round: 2 }])
    expect(member.at().round).toBe(3)
  })
  it('are taken back one by one, and a press may follow at once', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send(log)
    expect(member.send({ type: 'undo-round' }).events).toMatchObject([
      { type: 'round-undone', round: 1 },
    ])
    expect(member.send({ type: 'undo-round' }).refused).toBe('There is no round to take back.')
    expect(member.send(log).events).toMatchObject([{ round: 1 }])
  })
  it('are refused outside their work with a sentence', () => {
    const member = new Member().start().toClass(5_000)
    expect(member.send(log).refused).toContain('There are no rounds to count here')
    member.toClass(BODY.main - 3_000)
    expect(member.send(log).refused).toBe('The work has not begun yet.')
  })
  it('of a done ladder end with its last rung, the segment stays, and the member may go on', () => {
    const member = new Member().start().toClass(BODY.ladder + 10_000)
    member.send(log)
    member.wait(2_000).send(log)
    expect(member.at()).toMatchObject({ workedOff: true, round: 2, bodyLeftMs: 88_000 })
    expect(member.wait(2_000).send(log).refused).toBe(
      'All rounds of this block are done. Rest, or go on.',
    )
    expect(member.send({ type: 'finish-block' }).events).toMatchObject([
      { type: 'block-finished', block: 'ladder', ms: 14_000 },
    ])
    expect(member.at().segment?.block).toBe('race')
  })
  it('for time finish the block with the last of them', () => {
    const member = new Member().start().toClass(BODY.race + 20_000)
    member.send(log)
    expect(member.wait(30_000).send(log).events).toMatchObject([
      { type: 'round-done', round: 2 },
      { type: 'block-finished', ms: 50_000, classMs: BODY.race + 50_000 },
    ])
    expect(member.at()).toMatchObject({ phase: 'over', classMs: BODY.race + 50_000 })
  })
  it('said to be all done at once are logged as counted afterwards', () => {
    const member = new Member().start().toClass(BODY.race + 20_000)
    member.send(log)
    expect(member.wait(10_000).send({ type: 'finish-block' }).events).toMatchObject([
      { type: 'round-done', round: 2, by: 'afterwards' },
      { type: 'block-finished', ms: 30_000 },
    ])
  })
  it('are corrected in a rest or after class, not while their block runs or before it', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    const set = (name: string, round: number, done = true) =>
      member.send({ type: 'set-round', block: name, round, done, by: 'afterwards' })
    expect(set('main', 1).refused).toContain('Corrections come in the next rest')
    expect(set('race', 1).refused).toBe('That block has not begun yet.')
    expect(set('warm', 1).refused).toBe('That block has no rounds to count.')
    member.toClass(BODY.ladder + 1_000)
    expect(set('main', 7).events).toMatchObject([
      { type: 'round-done', round: 7, by: 'afterwards' },
    ])
    expect(set('main', 7)).toMatchObject({ events: [], refused: null })
    expect(set('main', 7, false).events).toMatchObject([{ type: 'round-undone' }])
    member.toClass(LENGTH)
    expect(set('ladder', 3).refused).toBe('That block has no such round.')
    expect(set('ladder', 2).events).toHaveLength(1)
  })
  it('in part are noted up to the reps that the round has', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send(log)
    const note = (round: number, reps: number) =>
      member.send({ type: 'note-reps', block: 'main', round, reps }).refused
    expect(note(1, 2)).toBe('Round 1 is done already, so all its reps count.')
    expect(note(2, 6)).toBe('Round 2 has 5 reps in all.')
    expect(note(2, 5)).toBe('That is all of round 2: log the round instead.')
    expect(note(2, 1.5)).toBe('Give the reps as a whole number.')
    expect(note(2, 4)).toBeNull()
  })
  it('are not counted where nobody could log them', () => {
    const uncounted = versionOf([
      block(
        'b',
        { type: 'rounds', seconds: 60, counted: false, stations: [squats] },
        { countIn: 0 },
      ),
    ])
    const member = new Member(uncounted).start().wait(5_000)
    expect(member.send(log).refused).toBe('Rounds are not counted in this block. Just keep going.')
  })
})

describe('skips, rest as needed, options and loads', () => {
  it('skips a block in its work, its rest, its count-in and its brief', () => {
    const member = new Member().start().wait(5_000)
    member.send({ type: 'skip-block', reason: 'No room' })
    expect(member.events.at(-1)).toEqual({
      type: 'block-skipped',
      classMs: 0,
      block: 'warm',
      reason: 'No room',
    })
    expect(member.at()).toMatchObject({ classMs: 0, segment: { block: 'pause', kind: 'rest' } })
    expect(member.send({ type: 'skip-block' }).refused).toBe('This rest is at least 40 s more.')
    member.wait(60_000 + 10_000 + 2_000)
    expect(member.at().segment?.kind).toBe('count-in')
    member.send({ type: 'skip-block' })
    expect(member.at()).toMatchObject({
      classMs: 62_000,
      segment: { block: 'ladder' },
      bodyElapsedMs: 0,
    })
    member.wait(30_000).send({ type: 'skip-block' })
    expect(member.at()).toMatchObject({ classMs: 92_000, segment: { block: 'race' } })
  })
  it('lets class time run on in a rest as needed and records it when it ends', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send({ type: 'rest-as-needed' })
    expect(member.wait(8_000).at()).toMatchObject({ restingMs: 8_000, classMs: BODY.main + 18_000 })
    const { segmentIndex } = member.at()
    expect(member.send({ type: 'end-rest-as-needed' }).events).toEqual([
      {
        type: 'rest-taken',
        classMs: BODY.main + 18_000,
        block: 'main',
        segment: segmentIndex,
        ms: 8_000,
      },
    ])
  })
  it('ends a rest as needed with its segment, and owes the event', () => {
    const member = new Member().start().toClass(25_000)
    member.send({ type: 'rest-as-needed' })
    member.wait(9_000)
    expect(member.at()).toMatchObject({ restingMs: null, owed: { type: 'end-rest-as-needed' } })
    expect(member.send({ type: 'end-rest-as-needed' }).events).toMatchObject([
      { ms: 5_000, classMs: 30_000 },
    ])
    expect(member.at().owed).toBeNull()
  })
  it('refuses rest as needed outside work', () => {
    const member = new Member().start().toClass(31_000)
    expect(member.send({ type: 'rest-as-needed' }).refused).toContain('this is not work')
  })
  it('takes known options and loads of known stations only', () => {
    const member = new Member().start()
    const choose = (name: string, station: number, option: string) =>
      member.send({ type: 'choose-option', block: name, station, option, reason: 'knee' })
    expect(choose('main', 0, 'to-a-chair').events).toMatchObject([
      { option: 'to-a-chair', reason: 'knee' },
    ])
    expect(choose('main', 0, 'to-a-chair').refused).toBe('That is your option already.')
    expect(choose('main', 0, 'on-the-moon').refused).toBe(
      'That option is not offered for this movement.',
    )
    expect(choose('main', 3, 'to-a-chair').refused).toBe('That station is not in this class.')
    expect(choose('constructor', 0, 'to-a-chair').refused).toBe(
      'That station is not in this class.',
    )
    const load = (kilograms: number) =>
      member.send({ type: 'note-load', block: 'main', station: 0, kilograms }).refused
    expect(load(8)).toBeNull()
    expect(load(Number.NaN)).toBe('Give the load as 0 to 500 kg.')
    expect(load(501)).toBe('Give the load as 0 to 500 kg.')
  })
})

describe('stop and this hurts', () => {
  it('halts at once and goes on when nothing speaks against it', () => {
    const member = new Member().start().toClass(10_000)
    expect(member.send({ type: 'stop' }).events).toEqual([{ type: 'stopped', classMs: 10_000 }])
    expect(member.wait(60_000).at()).toMatchObject({ halted: 'stopped', classMs: 10_000 })
    expect(member.send({ type: 'resume' }).refused).toBe('The class is stopped.')
    expect(member.send({ type: 'skip-block' }).refused).toBe('The class is stopped.')
    member.send({ type: 'describe-stop', sign: 'want-to-stop' })
    expect(member.send({ type: 'go-on-after-stop' }).refused).toBeNull()
    expect(member.wait(1_000).at()).toMatchObject({ halted: null, classMs: 11_000 })
  })
  it('does not go on after a red-flag sign, in this class, whatever is said later', () => {
    const member = new Member().start().toClass(10_000)
    member.send({ type: 'stop' })
    member.send({ type: 'describe-stop', sign: 'chest-pain' })
    member.send({ type: 'describe-stop', sign: 'other', note: 'gone again' })
    expect(member.at().redFlag).toBe(true)
    expect(member.send({ type: 'go-on-after-stop' }).refused).toContain('not offered today')
    const after = runFromEvents(version, 'v1', settings, member.stored(), 0, null).run
    expect(apply(after, { type: 'go-on-after-stop' }, 100).refused).toContain('not offered today')
  })
  it('ends a stopped class without calling it finished, and takes a rating', () => {
    const member = new Member().start().toClass(10_000)
    expect(member.send({ type: 'rate', rpe: 7 }).refused).toBe('Rate the class once it is over.')
    member.send({ type: 'stop' })
    expect(member.send({ type: 'end-class' }).events).toEqual([])
    expect(member.at().phase).toBe('over')
    expect(member.send({ type: 'rate', rpe: 11 }).refused).toBe('Give a rating from 0 to 10.')
    expect(member.send({ type: 'rate', rpe: 7, note: 'Enough' }).refused).toBeNull()
    expect(member.send({ type: 'rate', rpe: 6 }).refused).toBeNull()
    const back = runFromEvents(version, 'v1', settings, member.stored(), 0, null)
    expect(positionAt(back.run, 0).phase).toBe('over')
  })
  it('records where it hurts with the block and station, without holding the clock', () => {
    const member = new Member().start().toClass(45_000)
    expect(member.send({ type: 'hurt', where: 'knee' }).events).toEqual([
      { type: 'hurt', classMs: 45_000, block: 'warm', station: 1, where: 'knee' },
    ])
    expect(member.wait(1_000).at().classMs).toBe(46_000)
  })
})

describe('marks', () => {
  const counted = versionOf([
    block('a', { type: 'rest', seconds: 20 }),
    block(
      'b',
      { type: 'intervals', rounds: 1, stations: [{ movement: 'goblet-squat', work: 20, rest: 0 }] },
      { countIn: 0 },
    ),
  ])
  const sounds = (run: Run, from: number, to: number) =>
    marksBetween(run, from, to).flatMap((mark) =>
      mark.what === 'beep' ? [`${mark.dueAtMs - START} ${mark.sound}`] : [],
    )

  it('come half-open: the mark at the end of one window is the first of the next', () => {
    const { run, now } = new Member(counted).start()
    expect(sounds(run, now, now + 20_000)).toEqual(['17000 short', '18000 short', '19000 short'])
    expect(sounds(run, now + 20_000, now + 20_001)).toEqual(['20000 start'])
  })
  it('move with a rest that is cut, end beep and all', () => {
    const member = new Member(counted).start().wait(5_000)
    member.send({ type: 'cut-rest' })
    expect(sounds(member.run, member.now, member.now + 30_000)).toEqual([
      '5000 start',
      '22000 short',
      '23000 short',
      '24000 short',
      '25000 end',
    ])
  })
  it('count down anew under new keys where a rest grows while it counts', () => {
    const member = new Member(counted).start()
    const before = marksBetween(member.run, member.now, member.now + 18_500)
    member.wait(18_500).send({ type: 'lengthen-rest', ms: 10_000 })
    const after = marksBetween(member.run, member.now, member.now + 12_000)
    const beeps = after.filter((mark) => mark.what === 'beep')
    expect(beeps.map((mark) => mark.dueAtMs - START)).toEqual([
      25_000, 26_000, 27_000, 28_000, 29_000, 30_000,
    ])
    const keys = new Set(before.map((mark) => mark.key))
    expect(beeps.some((mark) => keys.has(mark.key))).toBe(false)
  })
  it('sound the start of work that follows a brief or the start of class at once', () => {
    const straight = versionOf([
      block(
        'a',
        {
          type: 'intervals',
          rounds: 1,
          stations: [{ movement: 'goblet-squat', work: 5, rest: 0 }],
        },
        { countIn: 0 },
      ),
      block(
        'b',
        {
          type: 'intervals',
          rounds: 1,
          stations: [{ movement: 'goblet-squat', work: 5, rest: 0 }],
        },
        { countIn: 0, brief: 'Now this.', briefSeconds: 10 },
      ),
    ])
    const { run, now } = new Member(straight).start()
    expect(sounds(run, now, now + 16_000)).toEqual([
      '0 start',
      '2000 short',
      '3000 short',
      '4000 short',
      '5000 end',
      '15000 start',
    ])
  })
  it('are silent in a pause and beyond a brief that waits', () => {
    const member = new Member(version, { ...settings, waitAtBriefs: true }).start()
    expect(marksBetween(member.run, member.now, member.now + 600_000)).toEqual([])
    member.send({ type: 'pass-brief' })
    expect(marksBetween(member.run, member.now, member.now + 60_000).length).toBeGreaterThan(0)
    member.send({ type: 'pause' })
    expect(marksBetween(member.run, member.now, member.now + 60_000)).toEqual([])
  })
  it('bring a pending cue when the member begins the round, once', () => {
    const cued = versionOf([
      block(
        'b',
        {
          type: 'rounds',
          seconds: 120,
          stations: [
            { ...squats, tempo: [3, 0, 0, 0] },
            { movement: 'floor-press', reps: 5 },
          ],
        },
        {
          countIn: 0,
          cues: [
            { id: 'third', text: 'Third round', kind: 'pace', at: { round: 3 } },
            { id: 'press', text: 'Now press', kind: 'form', at: { station: 1 } },
          ],
        },
      ),
    ])
    const member = new Member(cued).start()
    const cues = () =>
      marksBetween(member.run, member.now, member.now + 120_000).flatMap((mark) =>
        mark.what === 'cue' ? [{ id: mark.id, atMs: mark.atMs }] : [],
      )
    // 5 reps of 3 s and a change of 4 s at the expected pace: 15 s and 4 s, a little slower each.
    const [station] = cues()
    expect(station?.id).toBe('press')
    expect(station?.atMs).toBeGreaterThan(19_000)
    expect(station?.atMs).toBeLessThan(20_000)
    member.wait(30_000).send(log)
    expect(cues()).toEqual([])
    member.wait(30_000).send(log)
    expect(cues()).toEqual([{ id: 'third', atMs: 60_000 }])
    const keys = marksBetween(member.run, member.now, member.now + 1).map((mark) => mark.key)
    expect(keys).toContain('cue/b/third')
  })
})

describe('gaps', () => {
  it('up to 30 s run on as if nothing had been', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send(log)
    const { place } = member.at()
    const alone = positionAt(member.run, member.now + 30_000)
    const back = runFromEvents(version, 'v1', settings, member.stored(), 900, {
      agoMs: 30_000,
      place,
    })
    expect(back).toMatchObject({ events: [], gap: null })
    expect(positionAt(back.run, 900)).toEqual(alone)
  })
  it('longer than that are a pause from the last sign of life', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send(log)
    member.wait(4_000)
    const { place, classMs } = member.at()
    const back = runFromEvents(version, 'v1', settings, member.stored(), 100_000, {
      agoMs: 40_000,
      place,
    })
    expect(back).toMatchObject({ events: [{ type: 'paused', classMs }], gap: { agoMs: 40_000 } })
    expect(positionAt(back.run, 100_000)).toMatchObject({ halted: 'paused', classMs })
    const was = apply(back.run, { type: 'resume', from: 'where-i-was' }, 103_000).run
    expect(positionAt(was, 103_000).classMs).toBe(classMs)
    const would = apply(back.run, { type: 'resume', from: 'where-the-clock-would-be' }, 103_000).run
    expect(positionAt(would, 103_000).classMs).toBe(classMs + 43_000)
  })
  it('without a reload are noticed the same way', () => {
    const member = new Member().start().toClass(10_000)
    expect(afterGap(member.run, member.now, member.now + 30_000)).toMatchObject({
      events: [],
      gap: null,
    })
    const slept = afterGap(member.run, member.now, member.now + 30_001)
    expect(slept).toMatchObject({
      events: [{ type: 'paused', classMs: 10_000 }],
      gap: { agoMs: 30_001 },
    })
  })
  it('that the clock of the computer makes senseless are pauses, never jumps', () => {
    const member = new Member().start().toClass(10_000)
    const { place } = member.at()
    for (const agoMs of [-5_000, Number.NaN, Infinity]) {
      const back = runFromEvents(version, 'v1', settings, member.stored(), 50, { agoMs, place })
      expect(positionAt(back.run, 50)).toMatchObject({ halted: 'paused', classMs: 10_000 })
    }
  })
  it('leave the events alone to tell the place on another device', () => {
    const member = new Member().start().toClass(BODY.pause + 45_000)
    member.send({ type: 'cut-rest' })
    member.wait(10_000 + 5_000 + 20_000).send(log)
    const back = runFromEvents(version, 'v1', settings, member.stored().reverse(), 0, null)
    expect(positionAt(back.run, 0)).toMatchObject({
      halted: 'paused',
      classMs: BODY.main - 15_000 + 20_000,
      round: 2,
      segment: { block: 'main', kind: 'work' },
    })
  })
  it('keep a rest as needed that was going on', () => {
    const member = new Member().start().toClass(BODY.main + 10_000)
    member.send({ type: 'rest-as-needed' })
    const { place } = member.wait(5_000).at()
    const back = runFromEvents(version, 'v1', settings, member.stored(), 0, { agoMs: 2_000, place })
    expect(positionAt(back.run, 0).restingMs).toBe(7_000)
  })
  it('do not bring a finished class back to life', () => {
    const member = new Member().start().toClass(10_000)
    member.send({ type: 'end-class' })
    const back = runFromEvents(version, 'v1', settings, member.stored(), 0, {
      agoMs: 0,
      place: member.at().place,
    })
    expect(positionAt(back.run, 0).phase).toBe('over')
    expect(back.gap).toBeNull()
  })
})

describe('drift', () => {
  it('is 0 ms over 60 minutes with random stalls of 0 to 30 s', async () => {
    const { randomOf } = await import('./classes')
    const random = randomOf(60)
    const hour = versionOf([
      block('a', { type: 'every', seconds: 60, times: 60, stations: [squats] }, { countIn: 0 }),
    ])
    const member = new Member(hour).start()
    while (member.now < START + 3_600_000) {
      member.wait(random() < 0.5 ? 50 : Math.floor(random() * 30_000))
      expect(member.at().classMs).toBe(Math.min(3_600_000, member.now - START))
      expect(afterGap(member.run, member.now - 30_000, member.now).gap).toBeNull()
    }
    expect(member.at().phase).toBe('over')
  })
})

describe('commands with senseless numbers', () => {
  it('are refused, change nothing and never throw, at every stage of a class', () => {
    const strange = [Number.NaN, Infinity, -Infinity, -1, 0.5, 1e308]
    const stages = [
      new Member(),
      new Member().start(),
      new Member().start().toClass(BODY.pause + 50_000),
      new Member().start().toClass(BODY.main + 5_000),
      new Member().start().toClass(LENGTH),
    ]
    for (const member of stages) {
      for (const value of strange) {
        const commands: Command[] = [
          { type: 'set-round', block: 'main', round: value, done: true, by: 'member' },
          { type: 'note-reps', block: 'main', round: value, reps: 1 },
          { type: 'note-reps', block: 'main', round: 1, reps: value },
          { type: 'choose-option', block: 'main', station: value, option: 'to-a-chair' },
          { type: 'note-load', block: 'main', station: value, kilograms: 5 },
          { type: 'rate', rpe: value === 0.5 ? 10.5 : value },
          ...(value >= 1 ? [] : [{ type: 'lengthen-rest', ms: value } as const]),
        ]
        for (const command of commands) {
          const applied = apply(member.run, command, member.now)
          expect(applied).toMatchObject({ events: [], effects: [] })
          expect(applied.refused).toMatch(/\.$/)
          expect(applied.run).toBe(member.run)
        }
      }
    }
  })
  it('leave the place where it was when the clock of `now` is none', () => {
    const member = new Member().start().toClass(10_000)
    for (const now of [Number.NaN, -1e9]) expect(positionAt(member.run, now).classMs).toBe(0)
  })
})
