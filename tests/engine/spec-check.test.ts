import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { check, parseSpecOrVersion } from '@/server/engine/spec/problems'

type Json = Record<string, unknown>
const station = (more: Json = {}): Json => ({ movement: 'squat', reps: 5, ...more })
const rounds = (more: Json = {}): Json => ({
  type: 'rounds',
  seconds: 60,
  stations: [station()],
  ...more,
})
const block = (more: Json = {}): Json => ({
  id: 'a',
  kind: 'work',
  title: 'A',
  format: rounds(),
  ...more,
})
const spec = (...blocks: Json[]): Json => ({
  spec: 1,
  title: 'Class',
  blocks: blocks.length > 0 ? blocks : [block()],
})
const cue = (at: Json, more: Json = {}): Json => ({
  id: 'c',
  text: 'Tall',
  kind: 'form',
  at,
  ...more,
})
const paths = (input: unknown) => check(input).map((problem) => problem.path)
const withReps = (reps: unknown) =>
  spec(block({ format: rounds({ stations: [station({ reps })] }) }))
const REPS = 'blocks[0].format.stations[0].reps'

describe('a sound class', () => {
  it.each<[string, Json]>([
    ['rounds', rounds()],
    [
      'for time',
      {
        type: 'for-time',
        rounds: 3,
        cap: 300,
        stations: [station({ reps: { list: [3, 2, 1], then: 'done' } })],
      },
    ],
    [
      'intervals',
      {
        type: 'intervals',
        rounds: 2,
        stations: [{ movement: 'a', work: 40, rest: 0, sides: 'each', switch: 0 }],
        roundRest: 0,
      },
    ],
    [
      'every',
      {
        type: 'every',
        seconds: 60,
        times: 3,
        stations: [station({ reps: { list: [3, 2, 1], then: 'done' } })],
      },
    ],
    ['holds', { type: 'holds', stations: [{ movement: 'a', seconds: 40, switch: 5, rest: 0 }] }],
    ['rest', { type: 'rest', seconds: 75, atLeast: 75, atMost: 75 }],
  ])('has no problems: %s', (_name, format) => {
    expect(check(spec(block({ format })))).toEqual([])
  })
  it('may have a tempo and a change with one decimal, and every limit at its edge', () => {
    const format = rounds({
      seconds: 10_800 - 5,
      stations: [station({ tempo: [2.5, 0, 0.1, 0], change: 0.5, reps: 500 })],
    })
    expect(
      check(
        spec(block({ format, title: 'x'.repeat(80), brief: 'b'.repeat(400), briefSeconds: 300 })),
      ),
    ).toEqual([])
  })
  it('counts characters as people do: 80 drawn signs are 80', () => {
    expect(check({ ...spec(), title: '💪'.repeat(80) })).toEqual([])
    expect(paths({ ...spec(), title: '💪'.repeat(81) })).toEqual(['title'])
  })
})

describe('shape', () => {
  it.each<[string, unknown, string[]]>([
    ['nothing', undefined, ['']],
    ['null', null, ['']],
    ['a list', [], ['']],
    ['text', 'class', ['']],
    ['an empty object', {}, ['spec', 'title', 'blocks']],
    ['another version', { ...spec(), spec: 2 }, ['spec']],
    ['an unknown key', { ...spec(), colour: 'red' }, ['colour']],
    [
      'an unknown key deep down',
      spec(block({ format: rounds({ stations: [station({ weight: 8 })] }) })),
      ['blocks[0].format.stations[0].weight'],
    ],
    ['no blocks', { ...spec(), blocks: [] }, ['blocks']],
    [
      '41 blocks',
      { ...spec(), blocks: Array.from({ length: 41 }, (_, index) => block({ id: `b${index}` })) },
      ['blocks'],
    ],
    ['a kind that is none', spec(block({ kind: 'party' })), ['blocks[0].kind']],
    [
      'a format that is none',
      spec(block({ format: { type: 'party' } })),
      ['blocks[0].format.type'],
    ],
    ['an id with capitals', spec(block({ id: 'B1' })), ['blocks[0].id']],
    [
      'a fraction of a second',
      spec(block({ format: rounds({ seconds: 60.5 }) })),
      ['blocks[0].format.seconds'],
    ],
    [
      'negative seconds',
      spec(block({ format: rounds({ seconds: -1 }) })),
      ['blocks[0].format.seconds'],
    ],
    [
      'a huge number',
      spec(block({ format: rounds({ seconds: 1e300 }) })),
      ['blocks[0].format.seconds'],
    ],
    [
      'not a number',
      spec(block({ format: rounds({ seconds: NaN }) })),
      ['blocks[0].format.seconds'],
    ],
    [
      'endless seconds',
      spec(block({ format: rounds({ seconds: Infinity }) })),
      ['blocks[0].format.seconds'],
    ],
    [
      '13 stations',
      spec(block({ format: rounds({ stations: Array.from({ length: 13 }, () => station()) }) })),
      ['blocks[0].format.stations'],
    ],
    [
      'a tempo of three figures',
      spec(block({ format: rounds({ stations: [station({ tempo: [2, 0, 1] })] }) })),
      ['blocks[0].format.stations[0].tempo'],
    ],
    [
      'two decimals in a change',
      spec(block({ format: rounds({ stations: [station({ change: 1.25 })] }) })),
      ['blocks[0].format.stations[0].change'],
    ],
    ['an RPE of 11', { ...spec(), intendedRpe: 11 }, ['intendedRpe']],
    ['a count-in of 16', spec(block({ countIn: 16 })), ['blocks[0].countIn']],
    ['a cue without a moment', spec(block({ cues: [cue({})] })), ['blocks[0].cues[0].at']],
    [
      'a cue from the middle',
      spec(block({ cues: [cue({ from: 'middle', s: 1 })] })),
      ['blocks[0].cues[0].at.from'],
    ],
    [
      'a cue in round 0',
      spec(block({ cues: [cue({ round: 0 })] })),
      ['blocks[0].cues[0].at.round'],
    ],
    ['text as reps', withReps('5'), [REPS]],
    ['no reps', withReps(0), [REPS]],
    ['501 reps', withReps(501), [REPS]],
    ['an empty list', withReps({ list: [] }), [`${REPS}.list`]],
    ['a list with a fraction', withReps({ list: [5, 2.5] }), [`${REPS}.list[1]`]],
    ['a ladder with an unknown key', withReps({ from: 3, step: 3, until: 9 }), [`${REPS}.until`]],
  ])('finds %s', (_name, input, expected) => {
    expect(paths(input).sort()).toEqual([...expected].sort())
  })
})

describe('ladders', () => {
  it.each<[string, unknown, string]>([
    ['a step of 0', { from: 3, step: 0 }, `${REPS}.step`],
    ['an end on the wrong side, up', { from: 9, step: 3, to: 3 }, `${REPS}.to`],
    ['an end on the wrong side, down', { from: 3, step: -3, to: 9 }, `${REPS}.to`],
    ['then without an end', { from: 3, step: 3, then: 'hold' }, `${REPS}.then`],
    ['down without an end', { from: 12, step: -3 }, `${REPS}.to`],
    ['down to 0', { from: 12, step: -3, to: 0 }, `${REPS}.to`],
    ['up and then done', { from: 3, step: 3, to: 9, then: 'done' }, `${REPS}.then`],
  ])('find %s', (_name, reps, path) => {
    expect(paths(withReps(reps))).toEqual([path])
  })
  it('find it in an option’s own reps too', () => {
    const format = rounds({
      stations: [station({ options: [{ option: 'easy', reps: { from: 3, step: 0 } }] })],
    })
    expect(paths(spec(block({ format })))).toEqual([
      'blocks[0].format.stations[0].options[0].reps.step',
    ])
  })
  it('find more rounds for time than rungs', () => {
    const format = {
      type: 'for-time',
      rounds: 4,
      cap: 300,
      stations: [station({ reps: { list: [3, 2, 1], then: 'done' } })],
    }
    expect(paths(spec(block({ format })))).toEqual(['blocks[0].format.rounds'])
    expect(check(spec(block({ format: { ...format, rounds: 3 } })))).toEqual([])
    const held = { ...format, stations: [station({ reps: { list: [3, 2, 1], then: 'hold' } })] }
    expect(check(spec(block({ format: held })))).toEqual([])
  })
  it('count no rungs of a ladder that is wrong itself', () => {
    const format = {
      type: 'for-time',
      rounds: 5,
      cap: 60,
      stations: [station({ reps: { from: 3, step: -3, to: 9, then: 'done' } })],
    }
    expect(paths(spec(block({ format })))).toEqual(['blocks[0].format.stations[0].reps.to'])
  })
  it('find a done that runs out in every', () => {
    const done = station({ reps: { list: [3, 2], then: 'done' } })
    const every = (times: number) =>
      spec(block({ format: { type: 'every', seconds: 30, times, stations: [station(), done] } }))
    expect(check(every(4))).toEqual([])
    expect(check(every(5))).toEqual([])
    expect(paths(every(6))).toEqual(['blocks[0].format.stations[1].reps'])
  })
})

describe('cues that cannot come', () => {
  const done = rounds({
    stations: [station({ reps: { list: [3, 2, 1], then: 'done' } }), station()],
  })
  const every = { type: 'every', seconds: 30, times: 5, stations: [station(), station()] }
  const intervals = {
    type: 'intervals',
    rounds: 3,
    stations: [{ movement: 'a', work: 20, rest: 10 }],
  }
  it.each<[string, Json, Json, string | null]>([
    ['above the rungs of a done', done, { round: 4 }, 'at.round'],
    ['at the last rung', done, { round: 3 }, null],
    ['any round of rounds', rounds(), { round: 99 }, null],
    ['above the rounds of intervals', intervals, { round: 4 }, 'at.round'],
    ['a station that is not there', intervals, { station: 1 }, 'at.station'],
    [
      'above the rungs and rounds of for-time',
      {
        type: 'for-time',
        rounds: 3,
        cap: 60,
        stations: [station({ reps: { list: [3, 2, 1], then: 'done' } })],
      },
      { round: 4 },
      'at.round',
    ],
    ['past times: round 3 of station 1', every, { station: 1, round: 3 }, 'at.round'],
    ['the last of times: round 3 of station 0', every, { station: 0, round: 3 }, null],
    [
      'round 2 of holds',
      { type: 'holds', stations: [{ movement: 'a', seconds: 20 }] },
      { round: 2 },
      'at.round',
    ],
    ['a round in a rest', { type: 'rest', seconds: 30 }, { round: 1 }, 'at.round'],
    ['a station in a rest', { type: 'rest', seconds: 30 }, { station: 0 }, 'at.station'],
    ['at the very end', rounds(), { from: 'start', s: 60 }, null],
    ['after the end', rounds(), { from: 'start', s: 61 }, 'at.s'],
    ['before the start', rounds(), { from: 'end', s: 61 }, 'at.s'],
  ])('%s', (_name, format, at, problem) => {
    expect(paths(spec(block({ format, cues: [cue(at)] })))).toEqual(
      problem ? [`blocks[0].cues[0].${problem}`] : [],
    )
  })
  it('nor show a station that is not there', () => {
    expect(paths(spec(block({ cues: [cue({ round: 1 }, { show: { station: 1 } })] })))).toEqual([
      'blocks[0].cues[0].show.station',
    ])
  })
})

describe('a class as a whole', () => {
  it('has ids of its own for blocks, and for cues in a block', () => {
    const cues = [cue({ round: 1 }), cue({ round: 2 })]
    expect(paths(spec(block(), block({ cues })))).toEqual(['blocks[1].id', 'blocks[1].cues[1].id'])
    expect(
      check(
        spec(block({ cues: [cue({ round: 1 })] }), block({ id: 'b', cues: [cue({ round: 1 })] })),
      ),
    ).toEqual([])
  })
  it('has a rest whose least and most lie about it', () => {
    const rest = (more: Json) =>
      spec(block({ kind: 'rest', format: { type: 'rest', seconds: 60, ...more } }))
    expect(paths(rest({ atLeast: 61 }))).toEqual(['blocks[0].format.atLeast'])
    expect(paths(rest({ atMost: 59 }))).toEqual(['blocks[0].format.atMost'])
  })
  it('is 3 hours of class time at most, count-ins among them', () => {
    const long = (seconds: number) =>
      spec(
        block({ format: rounds({ seconds }) }),
        block({ id: 'b', kind: 'mobility', format: rounds({ seconds: 5_000 }) }),
      )
    expect(check(long(5_795))).toEqual([])
    expect(paths(long(5_796))).toEqual(['blocks'])
  })
  it('shows every problem at once: one in the shape hides none in the rules', () => {
    const input = spec(
      block({ title: '', format: rounds({ stations: [station({ reps: { from: 3, step: 0 } })] }) }),
      block({
        kind: 'party',
        format: rounds({ stations: [station({ reps: { from: 9, step: 3, to: 3 } })] }),
        cues: [cue({ from: 'start', s: 61 })],
      }),
    )
    expect(paths(input).sort()).toEqual(
      [
        'blocks[0].title',
        'blocks[0].format.stations[0].reps.step',
        'blocks[1].id',
        'blocks[1].kind',
        'blocks[1].format.stations[0].reps.to',
        'blocks[1].cues[0].at.s',
      ].sort(),
    )
  })
  it('shows what breaks a rule beside what is wrong in shape, in the same format', () => {
    const format = {
      type: 'for-time',
      rounds: 4,
      cap: 60,
      pace: 'quick',
      stations: [
        station({ weight: 8, reps: { list: [3, 2, 1], then: 'done' } }),
        station({ movement: 'No Slug' }),
      ],
    }
    const cues = [
      cue({ from: 'end', s: 61 }, { colour: 'red' }),
      cue({ station: 2, round: 5 }, { id: 'd', show: { station: 2 } }),
    ]
    expect(paths(spec(block({ format, cues }))).sort()).toEqual(
      [
        'blocks[0].format.pace',
        'blocks[0].format.rounds',
        'blocks[0].format.stations[0].weight',
        'blocks[0].format.stations[1].movement',
        'blocks[0].cues[0].colour',
        'blocks[0].cues[0].at.s',
        'blocks[0].cues[1].at.station',
        'blocks[0].cues[1].at.round',
        'blocks[0].cues[1].show.station',
      ].sort(),
    )
  })
  it.each<[string, Json, Json[], string[]]>([
    [
      'seconds',
      rounds({ seconds: -1 }),
      [cue({ station: 3 }), cue({ from: 'end', s: 9_000 }, { id: 'd' })],
      ['format.seconds', 'cues[0].at.station'],
    ],
    [
      'a cap',
      {
        type: 'for-time',
        rounds: 4,
        cap: 0,
        stations: [station({ reps: { list: [2, 1], then: 'done' } })],
      },
      [],
      ['format.cap', 'format.rounds'],
    ],
    [
      'rounds for time, whose length is its cap',
      { type: 'for-time', rounds: 0, cap: 60, stations: [station()] },
      [cue({ from: 'start', s: 61 }), cue({ round: 9 }, { id: 'd' })],
      ['format.rounds', 'cues[0].at.s'],
    ],
    [
      'rounds, and with them the length',
      {
        type: 'intervals',
        rounds: 'three',
        stations: [{ movement: 'a', work: 10, rest: 0 }],
      },
      [
        cue({ station: 1 }, { show: { station: 2 } }),
        cue({ round: 9 }, { id: 'd' }),
        cue({ from: 'end', s: 900 }, { id: 'e' }),
      ],
      ['format.rounds', 'cues[0].at.station', 'cues[0].show.station'],
    ],
    [
      'times',
      { type: 'every', seconds: 30, times: 1.5, stations: [station(), station()] },
      [cue({ station: 1, round: 2 }), cue({ station: 2 }, { id: 'd' })],
      ['format.times', 'cues[1].at.station'],
    ],
    [
      'whether it is counted',
      rounds({ counted: 'no' }),
      [cue({ from: 'start', s: 61 })],
      ['format.counted', 'cues[0].at.s'],
    ],
    [
      'the length of a rest',
      { type: 'rest', seconds: 0, atLeast: 90, atMost: 30 },
      [cue({ round: 1 })],
      ['format.seconds', 'format.atLeast', 'cues[0].at.round'],
    ],
  ])('looks past a wrong number at what does not hang on it: %s', (_name, format, cues, found) => {
    expect(paths(spec(block({ format, cues }))).sort()).toEqual(
      found.map((path) => `blocks[0].${path}`).sort(),
    )
  })
  it('finds an option named twice beside one that is wrong', () => {
    const options = [{ option: 'easy' }, { option: 'easy' }, { option: 'Not A Slug' }]
    const at = 'blocks[0].format.stations[0].options'
    expect(
      paths(spec(block({ format: rounds({ stations: [station({ options })] }) }))).sort(),
    ).toEqual([`${at}[1].option`, `${at}[2].option`])
  })
  it('counts a count-in towards 3 hours though something else in its block is wrong', () => {
    const long = block({ title: '', format: rounds({ seconds: 10_800 }) })
    expect(paths(spec(long)).sort()).toEqual(['blocks', 'blocks[0].title'])
    expect(paths(spec({ ...long, countIn: 0 }))).toEqual(['blocks[0].title'])
  })
  it('names a key that is no plain word in quotes', () => {
    expect(paths(spec(block({ 'a b': 1, '': 2 })))).toEqual(['blocks[0]["a b"]', 'blocks[0][""]'])
  })
  it('guesses no length where a timed station is wrong', () => {
    const format = {
      type: 'intervals',
      rounds: 1,
      stations: [{ movement: 'a', work: 40, rest: 0, weight: 8 }],
    }
    expect(paths(spec(block({ format, cues: [cue({ from: 'start', s: 40 })] })))).toEqual([
      'blocks[0].format.stations[0].weight',
    ])
  })
  it('never throws, whatever it is, and always says something of what is no class', () => {
    fc.assert(
      fc.property(
        fc.anything({ withBigInt: true, withNullPrototype: true, maxDepth: 5 }),
        (input) => {
          expect(check(input).length).toBeGreaterThan(0)
          for (const problem of check(spec(input as Json))) expect(problem.message).not.toBe('')
        },
      ),
      { numRuns: 300 },
    )
  })
  it('takes keys like __proto__ for what they are', () => {
    expect(
      paths(
        JSON.parse(
          '{"spec":1,"title":"x","__proto__":{"a":1},"blocks":[{"id":"a","kind":"rest","title":"R","format":{"type":"rest","seconds":5}}]}',
        ),
      ),
    ).toEqual(['__proto__'])
  })
})

describe('a published version', () => {
  it('is read with movements as a list or by slug, with what a forecast needs', () => {
    const movement = { tempo: [2, 0, 1, 0], change: 6 }
    for (const movements of [[{ slug: 'squat', ...movement }], { squat: movement }]) {
      const read = parseSpecOrVersion({ spec: spec(), movements })
      expect(read.version?.movements[0]).toMatchObject({ slug: 'squat', ...movement })
      expect(read.version?.movements[0]?.options.map((one) => one.option)).toEqual(['as-planned'])
    }
  })
  it('without its spec says so with the paths of a bare one', () => {
    const read = parseSpecOrVersion({ spec: null, movements: [] })
    expect(read.problems?.map((one) => one.path)).toEqual([''])
  })
  it('says what is wrong in either part', () => {
    const read = parseSpecOrVersion({
      spec: { ...spec(), title: '' },
      movements: [{ slug: 'squat', tempo: [1] }, 7],
    })
    expect(read.problems?.map((one) => one.path)).toEqual(
      expect.arrayContaining(['title', 'movements[1]']),
    )
    expect(read.problems?.some((one) => one.path.startsWith('movements[0].tempo'))).toBe(true)
  })
  it.each<[string, unknown, string, RegExp]>([
    ['no list', 'squat', 'movements', /list of movements/],
    ['no slug', [{ name: 'Squat' }], 'movements[0].slug', /^This is missing\. Give a name/],
    ['a wrong slug', [{ slug: 'Squat!' }], 'movements[0].slug', /^Give a name/],
    [
      'no time for a rep',
      [{ slug: 'a', secondsPerRep: 0 }],
      'movements[0].secondsPerRep',
      /above 0/,
    ],
    ['text as time', [{ slug: 'a', secondsPerRep: '3' }], 'movements[0].secondsPerRep', /above 0/],
    ['a short tempo', [{ slug: 'a', tempo: [1] }], 'movements[0].tempo', /four figures/],
    ['a fine change, by slug', { a: { change: 1.25 } }, 'movements.a.change', /one decimal/],
    ['a long name', [{ slug: 'a', name: 'x'.repeat(61) }], 'movements[0].name', /1 to 60/],
    ['an unknown pattern', [{ slug: 'a', pattern: 'fly' }], 'movements[0].pattern', /squat, lunge/],
    ['options that are no list', [{ slug: 'a', options: 'x' }], 'movements[0].options', /list/],
    ['an option that is none', [{ slug: 'a', options: [7] }], 'movements[0].options[0]', /object/],
    [
      'an unknown level',
      [{ slug: 'a', options: [{ option: 'b', level: 'hard' }] }],
      'movements[0].options[0].level',
      /easier, as-planned, harder/,
    ],
    [
      'an option whose ladder stands still',
      [{ slug: 'a', options: [{ option: 'b', reps: { from: 1, step: 0 } }] }],
      'movements[0].options[0].reps.step',
      /step up or down/,
    ],
    [
      'an option twice',
      [{ slug: 'a', options: [{ option: 'b' }, { option: 'b' }] }],
      'movements[0].options[1].option',
      /named twice/,
    ],
    ['a movement twice', [{ slug: 'a' }, { slug: 'a' }], 'movements[1].slug', /here twice/],
  ])('says in words what to do about a movement: %s', (_name, movements, path, message) => {
    const problems = parseSpecOrVersion({ spec: spec(), movements }).problems ?? []
    expect(problems.map((one) => one.path)).toEqual([path])
    expect(problems[0]?.message).toMatch(message)
  })
})
