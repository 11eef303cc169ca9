import { describe, expect, it } from 'vitest'
import { freeSlug, readMovementForm } from '@/server/contract/library'
import type { LibraryRow } from '@/server/contract/library-types'
import {
  filterLibrary,
  libraryQuery,
  parseLibraryFilter,
  WHOLE_LIBRARY,
  type LibraryFilter,
} from '@/server/contract/library-filter'
import { writeReps } from '@/server/contract/library-words'
import type { Reps } from '@/server/engine/spec/schema'
import { movementForm } from '../support/library-form'

const errorsOf = (more: Record<string, string | string[]>) =>
  readMovementForm(movementForm(more)).fields ?? {}

describe('a movement’s form', () => {
  it('that is sound has no errors', () => {
    expect(errorsOf({})).toEqual({})
  })

  it.each<[Record<string, string | string[]>, string, RegExp]>([
    [{ name: ' ' }, 'name', /1 to 60/],
    [{ pattern: '' }, 'pattern', /Choose the pattern/],
    [{ position: 'floating' }, 'position', /Choose the position/],
    [{ otherKit: 'x'.repeat(61) }, 'otherKit', /1 to 60/],
    [{ 'kit.dumbbell': '21' }, 'otherKit', /20 pieces/],
    [{ 'tempo.3': '' }, 'tempo.0', /all four figures/],
    [{ change: 'soon' }, 'change', /seconds from 0 to 600/],
    [{ steps: `Sit.\n${'x'.repeat(201)}` }, 'steps', /^Step 2: .*200/],
    [{ cues: 'x'.repeat(81) }, 'cues', /^Cue 1: .*80/],
    [{ primary: ['quads'], secondary: ['glutes', 'quads'] }, 'secondary', /Quads is among/],
    [{ 'faults.f1.correction': 'Do this' }, 'faults.f1.fault', /which fault/],
    [{ 'options.a.name': '' }, 'options.a.name', /1 to 60/],
    [{ 'options.a.name': 'pause LOW' }, 'options.c.name', /this name/],
    [{ 'options.a.reasons': [] }, 'options.a.reasons', /which reason/],
    [{ 'options.a.reasons': ['wants-more'] }, 'options.a.reasons', /wants more/],
    [{ 'options.a.reps': 'a few' }, 'options.a.reps', /Such as/],
    [{ 'options.a.reps': '900' }, 'options.a.reps', /Such as/],
    [{ 'options.a.reps': 'from 4 by 2 to 2' }, 'options.a.reps', /never comes to/],
    [{ 'options.c.tempo.0': '2' }, 'options.c.tempo.0', /all four figures/],
    [{ 'options.b.option': '' }, 'options', /planned one/],
  ])('with %o is wrong at %s', (more, field, message) => {
    expect(errorsOf(more)[field]).toMatch(message)
  })

  it('takes the option’s place for its level, and its order for the movement’s', () => {
    const form = new FormData()
    const entries = [...movementForm()]
    // The third option before the first: as the buttons would put it.
    for (const [name, value] of [
      ...entries.filter(([name]) => name.startsWith('options.c.')),
      ...entries.filter(([name]) => !name.startsWith('options.c.')),
    ]) {
      form.append(name, value)
    }
    form.set('options.c.reasons', 'knee')
    expect(
      readMovementForm(form).change?.fields.options.map((one) => [one.name, one.level]),
    ).toEqual([
      ['Pause low', 'easier'],
      ['To a chair', 'easier'],
      ['As planned', 'as-planned'],
    ])
  })

  it.each<[Reps]>([
    [10],
    [{ list: [12, 9, 6] }],
    [{ list: [12] }],
    [{ list: [12, 9], then: 'done' }],
    [{ from: 4, step: 2 }],
    [{ from: 12, step: -3, to: 3, then: 'done' }],
  ])('gives back the reps %o as they were', (reps) => {
    const form = movementForm({ 'options.a.reps': writeReps(reps) })
    expect(readMovementForm(form).change?.fields.options[0]?.reps).toEqual(reps)
  })
})

describe('a slug from a name', () => {
  it.each([
    ['Élan squat (slow)', 'elan-squat-slow'],
    ['  --  ', 'movement'],
    ['Приседание', 'movement'],
    ['Taken', 'taken-3'],
    ['x'.repeat(80), 'x'.repeat(55)],
  ])('%s → %s', (name, slug) => {
    expect(freeSlug(name, new Set(['taken', 'taken-2']), 'movement')).toBe(slug)
  })
})

const row = (more: Partial<LibraryRow>): LibraryRow => ({
  slug: 'x',
  name: 'Squat',
  pattern: 'squat',
  position: 'standing',
  impact: 'none',
  joints: ['knee'],
  kit: [],
  options: 1,
  optionNames: [],
  origin: 'built-in',
  archived: false,
  figure: null,
  ...more,
})

describe('a filter', () => {
  const rows = [
    row({ name: 'Squat', optionNames: ['To a chair'] }),
    row({ name: 'Élan row', pattern: 'horizontal-pull', kit: ['band'], joints: [], origin: 'own' }),
    row({ name: 'Hop', pattern: 'jump', impact: 'jump', archived: true }),
  ]
  it.each<[Partial<LibraryFilter>, string[]]>([
    [{}, ['Squat', 'Élan row']],
    [{ q: 'ELAN' }, ['Élan row']],
    [{ q: 'chair to' }, ['Squat']],
    [{ q: 'horizontal' }, ['Élan row']],
    [{ q: 'nothing' }, []],
    [{ kit: 'none' }, ['Squat']],
    [{ kit: 'band' }, ['Élan row']],
    [{ joint: 'knee' }, ['Squat']],
    [{ joint: 'knee', spares: true }, ['Élan row']],
    [{ show: 'own' }, ['Élan row']],
    [{ show: 'archived' }, ['Hop']],
    [{ impact: 'jump' }, []],
  ])('%o shows %o', (filter, names) => {
    expect(filterLibrary(rows, { ...WHOLE_LIBRARY, ...filter }).map((one) => one.name)).toEqual(
      names,
    )
  })

  it('comes back from the address as it was, and from a broken one as the whole library', () => {
    const filter: LibraryFilter = {
      q: 'press & row',
      pattern: 'vertical-push',
      position: 'seated',
      impact: 'low',
      joint: 'lower-back',
      spares: true,
      kit: 'dumbbell',
      show: 'own',
    }
    expect(parseLibraryFilter(new URLSearchParams(libraryQuery(filter)))).toEqual(filter)
    expect(libraryQuery(WHOLE_LIBRARY)).toBe('')
    expect(
      parseLibraryFilter(new URLSearchParams('pattern=x&joint=not-y&impact=&show=?&kit=')),
    ).toEqual(WHOLE_LIBRARY)
  })
})
