import { describe, expect, it } from 'vitest'
import { demoMovements } from '@/db/seed/movements'
import type { Joint, Movement, MovementOption, Reason } from '@/server/engine/spec/movement'
import { movementSchema } from '@/server/engine/spec/movement'
import { AS_PLANNED, PATTERNS, REASONS } from '@/server/engine/spec/names'

const FLOOR = new Set(['kneeling', 'hands-and-feet', 'face-up', 'face-down'])
const LOADS = new Set(['dumbbell', 'kettlebell', 'band'])
const KIT = new Set([...LOADS, 'bench', 'chair', 'mat'])

/** Figures that are down on the floor, on the knees, or in the air. */
const ON_THE_KNEES = [
  'half-kneeling-press',
  'knee-push-up',
  'knee-plank',
  'knee-side-plank',
  'bird-dog',
  'cat-cow',
  'childs-pose',
  'hip-flexor-stretch',
  'kneel-to-stand',
]
const ON_THE_FLOOR = [
  ...ON_THE_KNEES,
  'mountain-climber',
  'burpee-step-back',
  'burpee',
  'bear-crawl',
  'glute-bridge',
  'single-leg-bridge',
  'hip-thrust',
  'push-up',
  'floor-press',
  'dead-bug',
  'heel-taps',
  'plank',
  'side-plank',
]
const IN_THE_AIR = ['jumping-jack', 'squat-jump', 'high-knees', 'pogo-hop', 'skater-hop', 'burpee']
/** Shapes that are no relief for the reason. */
const UNKIND: Partial<Record<Reason, readonly string[]>> = {
  'no-jumping': IN_THE_AIR,
  'cannot-get-down': ON_THE_FLOOR,
  'cannot-kneel': ON_THE_KNEES,
  knee: [...IN_THE_AIR, 'wall-sit', 'kneel-to-stand'],
  'ankle-or-foot': [...IN_THE_AIR, 'calf-raise'],
  wrist: [
    'push-up',
    'knee-push-up',
    'mountain-climber',
    'burpee-step-back',
    'burpee',
    'bear-crawl',
  ],
}

/** A joint that an option can answer; an elbow is none. */
const reasonOf = (joint: Joint): Reason | undefined => REASONS.find((reason) => reason === joint)
const count = (movement: Movement, item: string) =>
  movement.kit.filter((one) => one === item).length

/** Every reason that the movement must have an easier option for, with why. */
function reasonsOwed(movement: Movement): { reason: Reason; because: string }[] {
  const owed = movement.joints.flatMap((joint): { reason: Reason; because: string }[] => {
    const reason = reasonOf(joint)
    return reason ? [{ reason, because: `it loads the ${joint}` }] : []
  })
  if (movement.impact === 'jump') owed.push({ reason: 'no-jumping', because: 'it jumps' })
  if (FLOOR.has(movement.position)) {
    owed.push({ reason: 'cannot-get-down', because: `it is done ${movement.position}` })
  }
  if (movement.position === 'kneeling') {
    owed.push({ reason: 'cannot-kneel', because: 'it is done kneeling' })
  }
  if (movement.kit.some((item) => LOADS.has(item))) {
    owed.push({ reason: 'load-too-heavy', because: 'it is loaded' })
  }
  if (count(movement, 'dumbbell') >= 2) {
    owed.push({ reason: 'only-one-dumbbell', because: 'it takes two dumbbells' })
  }
  return owed
}

/** What is missing from the library's entry, in words. */
function gapsOf(movement: Movement): string[] {
  const gaps: string[] = []
  const between = (what: string, list: readonly unknown[], least: number, most: number) => {
    if (list.length < least || list.length > most) {
      gaps.push(`has ${list.length} ${what} instead of ${least} to ${most}`)
    }
  }
  between('steps', movement.steps, 2, 4)
  between('cues', movement.cues, 2, 4)
  between('faults', movement.faults, 2, 3)
  if (!movement.start) gaps.push('says no start position')
  if (!movement.stopWhen) gaps.push('does not say when to stop')
  if (!movement.figure) gaps.push('names no figure')
  if (!movement.tempo && !movement.secondsPerRep) gaps.push('has neither tempo nor secondsPerRep')
  if (movement.change === undefined) gaps.push('has no change')
  else if (FLOOR.has(movement.position) && (movement.change < 6 || movement.change > 8)) {
    gaps.push(`is on the floor: its change should be 6 to 8 s, not ${movement.change}`)
  }
  if (!movement.muscles || movement.muscles.primary.length === 0) gaps.push('names no muscles')
  const muscles = [...(movement.muscles?.primary ?? []), ...(movement.muscles?.secondary ?? [])]
  if (new Set(muscles).size < muscles.length) gaps.push('names a muscle twice')
  for (const item of movement.kit) if (!KIT.has(item)) gaps.push(`has unknown kit '${item}'`)

  for (const { reason, because } of reasonsOwed(movement)) {
    const answering = movement.options.filter(
      (one) => one.level === 'easier' && one.reasons.includes(reason),
    )
    if (answering.length === 0) {
      gaps.push(`has no easier option for '${reason}', although ${because}`)
    }
  }
  return [...gaps, ...movement.options.flatMap((option) => optionGaps(movement, option))]
}

function optionGaps(movement: Movement, option: MovementOption): string[] {
  const gaps: string[] = []
  const shape = option.figure ?? movement.figure ?? ''
  if (!option.description) gaps.push(`'${option.option}' does not say what changes`)
  if (option.level === 'easier' && option.reasons.length === 0) {
    gaps.push(`'${option.option}' is easier, but for no reason`)
  }
  if (option.level === 'easier' && option.reasons.includes('wants-more')) {
    gaps.push(`'${option.option}' is easier, but for somebody who wants more`)
  }
  for (const reason of option.level === 'easier' ? option.reasons : []) {
    if (UNKIND[reason]?.includes(shape)) {
      gaps.push(`'${option.option}' answers '${reason}', but its shape is '${shape}'`)
    }
  }
  return gaps
}

describe('the library', () => {
  it('names no movement twice', () => {
    const slugs = demoMovements.map((movement) => movement.slug)
    expect(slugs.filter((slug, index) => slugs.indexOf(slug) !== index)).toEqual([])
    const names = demoMovements.map((movement) => movement.name)
    expect(names.filter((name, index) => names.indexOf(name) !== index)).toEqual([])
  })

  it('has movements of every pattern', () => {
    for (const pattern of PATTERNS) {
      expect(
        demoMovements.filter((one) => one.pattern === pattern).length,
        pattern,
      ).toBeGreaterThan(0)
    }
  })
})

describe.each(demoMovements.map((movement) => [movement.slug, movement] as const))(
  '%s',
  (slug, movement) => {
    it('has the shape of a movement', () => {
      const parsed = movementSchema.safeParse(movement)
      const issues = parsed.error?.issues.map((one) => `${one.path.join('.')}: ${one.message}`)
      expect(issues ?? []).toEqual([])
    })

    it('lists its options once each: easier, as planned, harder', () => {
      const slugs = movement.options.map((one) => one.option)
      expect(slugs.filter((one, index) => slugs.indexOf(one) !== index)).toEqual([])
      const plannedOnes = movement.options.filter((one) => one.level === 'as-planned')
      expect(plannedOnes.map((one) => one.option)).toEqual([AS_PLANNED])
      const levels = movement.options.map((one) => one.level)
      expect([...new Set(levels)]).toEqual(['easier', 'as-planned', 'harder'])
      expect(levels.filter((level, index) => level !== levels[index - 1])).toHaveLength(3)
    })

    it('is complete, with a kinder way for whatever it loads', () => {
      expect(gapsOf(movement).map((gap) => `${slug} ${gap}`)).toEqual([])
    })
  },
)
