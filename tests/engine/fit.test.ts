import { describe, expect, it } from 'vitest'
import { concerns, fit, type FittedTo } from '@/server/engine/fit/fit'
import type { Movement } from '@/server/engine/spec/movement'
import { REASONS } from '@/server/engine/spec/names'
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
      'No way of doing this spares your neck: rest or leave it out if it objects.',
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
    expect(concerns('no-jumping', squat)).toBe(false)
    expect(concerns('no-jumping', jump)).toBe(true)
    expect(concerns('cannot-get-down', plank)).toBe(true)
    expect(concerns('cannot-kneel', plank)).toBe(false)
    expect(concerns('wrist', squat)).toBe(false)
  })
})
