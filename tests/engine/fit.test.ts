import { describe, expect, it } from 'vitest'
import { concerns, fit, type FittedTo } from '@/server/engine/fit/fit'
import type { Movement, Reason } from '@/server/engine/spec/movement'
import { JOINTS, POSITIONS, REASONS } from '@/server/engine/spec/names'
import { HURT_PLACES } from '@/server/engine/tally/names'
import { block, press, randomOf, squat, versionOf } from './classes'

/** Jumping, on the floor, for the notes that are no joints. */
const jump: Movement = {
  ...squat,
  slug: 'squat-jump',
  name: 'Squat jump',
  impact: 'jump',
  kit: [],
  options: [
    {
      option: 'no-jump',
      name: 'Fast squat, no jump',
      level: 'easier',
      reasons: ['no-jumping', 'knee'],
      description: '',
    },
    {
      option: 'to-toes',
      name: 'Rise to the toes',
      level: 'easier',
      reasons: ['no-jumping'],
      description: '',
    },
    { option: 'as-planned', name: 'As planned', level: 'as-planned', reasons: [], description: '' },
  ],
}
const plank: Movement = {
  ...squat,
  slug: 'plank',
  name: 'Plank',
  pattern: 'core',
  position: 'hands-and-feet',
  joints: ['shoulder', 'wrist', 'neck'],
  kit: ['mat'],
  options: [
    {
      option: 'at-a-wall',
      name: 'At a wall',
      level: 'easier',
      reasons: ['cannot-get-down', 'shoulder'],
      description: '',
    },
    {
      option: 'on-forearms',
      name: 'On the forearms',
      level: 'easier',
      reasons: ['wrist'],
      description: '',
    },
    { option: 'as-planned', name: 'As planned', level: 'as-planned', reasons: [], description: '' },
    {
      option: 'one-leg',
      name: 'One leg lifted',
      level: 'harder',
      reasons: ['wants-more'],
      description: '',
    },
  ],
}

const version = versionOf(
  [
    block('a', {
      type: 'rounds',
      seconds: 240,
      stations: [
        { movement: 'goblet-squat', reps: 5 },
        { movement: 'squat-jump', reps: 5 },
        { movement: 'plank', reps: 1 },
      ],
    }),
    block('r', { type: 'rest', seconds: 60 }),
    block('b', {
      type: 'every',
      seconds: 60,
      times: 2,
      stations: [{ movement: 'floor-press', reps: 5 }],
    }),
  ],
  [squat, press, jump, plank],
)
const nobody: FittedTo = { notes: [], holds: [], wantsMore: false, kit: null, rules: [] }
const fitted = (to: Partial<FittedTo>) =>
  fit(version, { ...nobody, ...to }).map(({ option, from }) => `${option} (${from})`)
const one = (to: Partial<FittedTo>, station: number) => fit(version, { ...nobody, ...to })[station]

describe('a class fitted to a member', () => {
  it('is as planned for whom nothing is known of', () => {
    expect(fitted({})).toEqual(Array(4).fill('as-planned (planned)'))
  })

  // Three members of different notes in one class.
  it('spares a knee where the knee is loaded, and nowhere else', () => {
    expect(fitted({ notes: ['knee'] })).toEqual([
      'to-a-chair (note)',
      'no-jump (note)',
      'as-planned (planned)',
      'as-planned (planned)',
    ])
    expect(one({ notes: ['knee'] }, 0)?.why).toBe('To a chair, since your knee is on your notes.')
  })
  it('keeps somebody off the floor, and from jumping', () => {
    expect(fitted({ notes: ['cannot-get-down', 'no-jumping'] })).toEqual([
      'as-planned (planned)',
      'to-toes (note)',
      'at-a-wall (note)',
      'as-planned (planned)',
    ])
  })
  it('gives more to who wants more, but not where a note speaks against it', () => {
    expect(fitted({ wantsMore: true })).toEqual([
      'slow (wish)',
      'as-planned (planned)',
      'one-leg (wish)',
      'as-planned (planned)',
    ])
    expect(fitted({ wantsMore: true, notes: ['wrist'] })[2]).toBe('on-forearms (note)')
    expect(fitted({ wantsMore: true, notes: ['wrist'] })[0]).toBe('slow (wish)')
  })

  it('takes the option that answers most of the notes', () => {
    expect(one({ notes: ['knee', 'no-jumping'] }, 1)).toMatchObject({
      option: 'no-jump',
      why: 'Fast squat, no jump, since your knee and no jumping are on your notes.',
    })
  })

  it('says where no option answers a note', () => {
    const { option, conflicts } = one({ notes: ['neck'] }, 2) ?? {}
    expect(option).toBe('as-planned')
    expect(conflicts).toEqual([
      'No way of doing this spares your neck: leave it out if you need to.',
    ])
  })

  it('keeps a place that hurt at the easier option, over notes and wishes', () => {
    expect(one({ holds: ['knee'], notes: ['balance'], wantsMore: true }, 0)).toMatchObject({
      option: 'to-a-chair',
      from: 'hold',
    })
    expect(one({ holds: ['knee'] }, 0)?.why).toMatch(/until you and your coach have cleared it/)
  })

  it('does what the coach has settled above all, and says what speaks against it', () => {
    const rules = [{ movement: 'goblet-squat', option: 'slow' }]
    const squatting = one({ rules, holds: ['knee'], notes: ['knee'] }, 0)
    expect(squatting).toMatchObject({ option: 'slow', from: 'coach' })
    expect(squatting?.conflicts).toHaveLength(2)
    expect(one({ rules }, 0)?.conflicts).toEqual([])
    expect(one({ rules: [{ movement: 'goblet-squat', option: 'gone' }] }, 0)).toMatchObject({
      option: 'as-planned',
      conflicts: [expect.stringContaining('not offered')],
    })
  })

  it('names kit that is not there, and gives nobody more load for it', () => {
    const bare = one({ kit: { mat: 1 }, wantsMore: true }, 0)
    expect(bare).toMatchObject({ option: 'as-planned', from: 'planned' })
    expect(bare?.conflicts).toEqual([
      'This wants a dumbbell, which is not in your kit: look through its options.',
    ])
    expect(one({ kit: { dumbbell: 2, mat: 1 } }, 0)?.conflicts).toEqual([])
  })

  it('never starts anybody on a harder option for a note, whatever the notes', () => {
    const random = randomOf(7)
    for (let run = 0; run < 200; run += 1) {
      const notes = REASONS.filter(() => random() < 0.3)
      for (const station of fit(version, { ...nobody, notes })) {
        expect(['slow', 'one-leg']).not.toContain(station.option)
      }
    }
  })

  it('weighs a note only where it concerns the movement', () => {
    const kneeling: Movement = { ...plank, position: 'kneeling' }
    const pair: Movement = { ...press, kit: ['dumbbell', 'dumbbell'] }
    const table: [Reason, Movement, boolean][] = [
      ['no-jumping', squat, false],
      ['no-jumping', jump, true],
      ['cannot-get-down', squat, false],
      ['cannot-get-down', plank, true],
      ['cannot-get-down', { ...squat, position: 'seated' }, false],
      ['cannot-get-down', press, true],
      ['cannot-kneel', plank, false],
      ['cannot-kneel', kneeling, true],
      ['wrist', squat, false],
      ['wrist', plank, true],
      // The squat has a way that helps balance; the jump has none.
      ['balance', squat, true],
      ['balance', jump, false],
      // By kit: the squat holds a dumbbell, the plank lies on a mat.
      ['load-too-heavy', squat, true],
      ['load-too-heavy', plank, false],
      ['only-one-dumbbell', pair, true],
      ['only-one-dumbbell', squat, false],
      ['wants-more', squat, false],
    ]
    for (const [note, movement, expected] of table) {
      expect([note, movement.slug, concerns(note, movement)]).toEqual([
        note,
        movement.slug,
        expected,
      ])
    }
  })

  it('takes a load that is too heavy from the hand, and never makes it harder', () => {
    expect(fitted({ notes: ['load-too-heavy'], wantsMore: true })).toEqual([
      'no-load (note)',
      'as-planned (planned)',
      'one-leg (wish)',
      'as-planned (planned)',
    ])
  })

  it('takes of options that answer as much the nearest to as planned, then the earlier', () => {
    const way = (option: string) => ({
      option,
      name: option,
      level: 'easier' as const,
      reasons: ['knee' as const],
      description: '',
    })
    const [planned] = press.options
    if (!planned) throw new Error('The press has its planned option.')
    const of = (...options: Movement['options']) =>
      fit(
        versionOf(
          [
            block('b', {
              type: 'holds',
              stations: [{ movement: 'goblet-squat', seconds: 30 }],
            }),
          ],
          [{ ...squat, options }],
        ),
        { ...nobody, notes: ['knee'] },
      )[0]
    expect(of(way('far'), way('near'), planned)?.option).toBe('near')
    expect(of(way('far'), way('before'), planned, way('after'))?.option).toBe('before')
    expect(
      of(way('far'), { ...way('other'), reasons: ['hip'] }, planned, way('after')),
    ).toMatchObject({ option: 'after' })
    // Planned kindly already: nothing is changed, and nothing is missing.
    expect(of(way('near'), { ...planned, reasons: ['knee'] })).toMatchObject({
      option: 'as-planned',
      from: 'planned',
      why: null,
      conflicts: [],
    })
  })

  it('says which other option answers what the chosen one does not', () => {
    // 'at-a-wall' answers two of the three, 'on-forearms' the third.
    expect(one({ notes: ['cannot-get-down', 'shoulder', 'wrist'] }, 2)).toMatchObject({
      option: 'at-a-wall',
      conflicts: [
        'On the forearms spares your wrist, which At a wall does not: choose what matters more today.',
      ],
    })
    expect(one({ notes: ['cannot-get-down'] }, 3)?.conflicts).toEqual([
      'No way of doing this stays off the floor: leave it out if you need to.',
    ])
  })

  it('says what a place that hurts leaves open: another place, a note', () => {
    const held = one({ holds: ['wrist', 'shoulder', 'elbow'], notes: ['neck'] }, 2)
    expect(held).toMatchObject({ option: 'on-forearms', from: 'hold' })
    // The plank does not load the elbow.
    expect(held?.conflicts).toEqual([
      'For your shoulder, which hurt as well, there is At a wall: choose what matters more today.',
      'No way of doing this spares your neck: leave it out if you need to.',
    ])
    expect(one({ holds: ['shoulder'] }, 3)).toMatchObject({
      from: 'planned',
      conflicts: ['Nothing easier is offered for your shoulder: leave it out if it hurts.'],
    })
  })

  it('gives nobody more while something hurts, here or somewhere else', () => {
    expect(fitted({ wantsMore: true, holds: ['elsewhere'] })).toEqual(
      Array(4).fill('as-planned (planned)'),
    )
    expect(fitted({ wantsMore: true, holds: ['elbow'] })[2]).toBe('one-leg (wish)')
  })

  it('takes as more only what is meant as more', () => {
    const unmeant = squat.options.map((option) =>
      option.level === 'harder' ? { ...option, reasons: ['shoulder' as const] } : option,
    )
    const [first] = fit(
      { ...version, movements: [{ ...squat, options: unmeant }] },
      { ...nobody, wantsMore: true },
    )
    expect(first?.option).toBe('as-planned')
  })

  it('hears the coach’s rule that says most exactly where', () => {
    const rules = [
      { block: 'a', option: 'slow' },
      { movement: 'goblet-squat', option: 'no-load' },
      { block: 'a', station: 0, option: 'to-a-chair' },
      { movement: 'plank', block: 'b', option: 'on-forearms' },
      // Without a block a station is nowhere, and a rule without any place says nothing.
      { station: 2, option: 'one-leg' },
      { option: 'one-leg' },
    ]
    expect(fitted({ rules })).toEqual([
      'to-a-chair (coach)',
      'as-planned (planned)',
      'as-planned (planned)',
      'as-planned (planned)',
    ])
    expect(fitted({ rules: rules.slice(0, 2) })[0]).toBe('no-load (coach)')
    // A rule for a whole block passes over stations that do not offer it.
    expect(fitted({ rules: rules.slice(0, 1) })).toEqual([
      'slow (coach)',
      'as-planned (planned)',
      'as-planned (planned)',
      'as-planned (planned)',
    ])
    expect(one({ rules: rules.slice(0, 1) }, 1)?.conflicts).toEqual([])
  })

  it('says in whole sentences what the coach’s rule goes against', () => {
    const rules = [{ movement: 'plank', option: 'one-leg' }]
    expect(
      one({ rules, holds: ['wrist', 'shoulder'], notes: ['neck', 'wrist'] }, 2)?.conflicts,
    ).toEqual([
      'Your coach chose One leg lifted, though your neck and your wrist are on your notes. Choose another way if it does not feel right, and tell them.',
      'Your coach chose One leg lifted, though your wrist and shoulder hurt and are not cleared yet.',
    ])
    // A rule that answers the place goes against nothing.
    const kind = [{ movement: 'plank', option: 'at-a-wall' }]
    expect(one({ rules: kind, holds: ['shoulder'] }, 2)?.conflicts).toEqual([])
  })

  // In this order each outweighs all that come after it.
  it.each([
    ['coach', 'no-load', {}],
    ['hold', 'to-a-chair', { rules: [] }],
    ['note', 'two-hands', { rules: [], holds: [] }],
    ['kit', 'one-bell', { rules: [], holds: [], notes: [] }],
    ['wish', 'slow', { rules: [], holds: [], notes: [], kit: { dumbbell: 2 } }],
    [
      'planned',
      'as-planned',
      { rules: [], holds: [], notes: [], kit: { dumbbell: 2 }, wantsMore: false },
    ],
  ] as const)('hears in its turn: %s', (from, option, less: Partial<FittedTo>) => {
    const named = (slug: string, reason: Reason) => ({
      option: slug,
      name: slug,
      level: 'easier' as const,
      reasons: [reason],
      description: '',
    })
    const movement: Movement = {
      ...squat,
      kit: ['dumbbell', 'dumbbell'],
      options: [
        named('two-hands', 'hip'),
        named('one-bell', 'only-one-dumbbell'),
        ...squat.options,
      ],
    }
    const [station] = fit(
      { ...version, movements: [movement] },
      {
        rules: [{ movement: 'goblet-squat', option: 'no-load' }],
        holds: ['knee'],
        notes: ['hip'],
        kit: { dumbbell: 1 },
        wantsMore: true,
        ...less,
      },
    )
    expect([station?.from, station?.option]).toEqual([from, option])
  })

  it('counts kit, and asks a member of unknown kit for nothing', () => {
    const pair: Movement = { ...press, kit: ['dumbbell', 'dumbbell', 'mat', 'box'] }
    const of = (kit: FittedTo['kit']) =>
      fit({ ...version, movements: [pair] }, { ...nobody, kit })[3]?.conflicts
    expect(of(null)).toEqual([])
    expect(of({ dumbbell: 2, mat: 1, box: 1 })).toEqual([])
    expect(of({ dumbbell: 1, mat: 1, box: 2 })).toEqual([
      'This wants 2 dumbbells, and you have 1: look through its options.',
    ])
    expect(of({ box: 1 })).toEqual([
      'This wants 2 dumbbells and a mat, which are not in your kit: look through its options.',
    ])
    // With one bell the way for one is taken; the mat is still missing.
    const answered: Movement = {
      ...pair,
      options: [
        {
          option: 'one-bell',
          name: 'One bell',
          level: 'easier',
          reasons: ['only-one-dumbbell'],
          description: '',
        },
        ...pair.options,
      ],
    }
    expect(
      fit({ ...version, movements: [answered] }, { ...nobody, kit: { dumbbell: 1, box: 1 } })[3],
    ).toMatchObject({
      option: 'one-bell',
      from: 'kit',
      why: 'One bell, since you have one dumbbell.',
      conflicts: ['This wants a mat, which is not in your kit: look through its options.'],
    })
  })

  it('gives one answer for one member, of any class and any notes, and an option that is offered', () => {
    const random = randomOf(11)
    const some = <T>(list: readonly T[]) => list.filter(() => random() < 0.3)
    const pick = <T>(list: readonly T[]) => list[Math.floor(random() * list.length)]
    for (let run = 0; run < 300; run += 1) {
      const movements = [squat, press, jump, plank].map((movement): Movement => ({
        ...movement,
        position: pick(POSITIONS) ?? 'standing',
        joints: some(JOINTS),
        kit: some(['dumbbell', 'dumbbell', 'band', 'mat']),
        options: movement.options.map((option) =>
          option.level === 'as-planned' ? option : { ...option, reasons: some(REASONS) },
        ),
      }))
      const to: FittedTo = {
        notes: some(REASONS),
        holds: some(HURT_PLACES),
        wantsMore: random() < 0.5,
        kit: random() < 0.5 ? null : { dumbbell: Math.floor(random() * 3) },
        rules: some([
          { movement: 'plank', option: 'one-leg' },
          { block: 'a', option: 'slow' },
          { block: 'a', station: 1, option: 'nothing-known' },
        ]),
      }
      const any = { ...version, movements: some(movements) }
      const stations = fit(any, to)
      expect(fit(any, to)).toEqual(stations)
      // Without duplicates and in another order the same options are taken for notes.
      expect(
        fit(any, { ...to, notes: [...to.notes, ...to.notes].reverse() }).map((all) => all.option),
      ).toEqual(stations.map((all) => all.option))
      expect(stations.map(({ block: id, station }) => `${id}/${station}`)).toEqual([
        'a/0',
        'a/1',
        'a/2',
        'b/0',
      ])
      for (const { option, from, why } of stations) {
        const known = any.movements.flatMap((movement) => movement.options)
        const found = known.find((all) => all.option === option)
        expect(option === 'as-planned' || found !== undefined).toBe(true)
        if (from !== 'coach' && from !== 'wish') expect(found?.level).not.toBe('harder')
        if (from === 'wish') expect(to.wantsMore && !to.holds.includes('elsewhere')).toBe(true)
        expect(why === null).toBe(from === 'planned')
      }
    }
  })
})
