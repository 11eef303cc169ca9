import { STEP_HEIGHT } from '../furniture'
import type { ArmPose, FigureData, Key, KeyPose, LegPose } from '../types'
import { FEET, HANGING, key, onFeet, STANDING_HIPS, withArms } from './common'

const standing = onFeet(4, -3, 1)
const deep = onFeet(83, -30, 38, { nod: -16 })
const frontDeep = onFeet(85, -35, 24, { nod: -16 })

const GOBLET_UP: ArmPose = { upper: 14, forearm: 150 }
const GOBLET_DOWN: ArmPose = { upper: 30, forearm: 156 }
const RACK_UP: ArmPose = { upper: 22, forearm: 166, upperOut: 14, forearmOut: 0 }
const RACK_DOWN: ArmPose = { upper: 50, forearm: 176, upperOut: 10, forearmOut: 0 }
/** A dumbbell's end on each shoulder, elbows pointing forward. */
const SHOULDERED_UP: ArmPose = { upper: 36, forearm: 181 }
const SHOULDERED_DOWN: ArmPose = { upper: 42, forearm: 184 }
const OVERHEAD: ArmPose = { upper: 174, forearm: 178 }

const squatWith = (up: ArmPose, down: ArmPose): readonly [Key, Key] => [
  key(withArms(standing, up), 1.6, { part: 'down', end: 'top' }),
  key(withArms(deep, down), 1.2, { part: 'up', end: 'bottom' }),
]

const seat = {
  body: { at: [-0.13, 0.327], lean: 36, nod: -12 },
  legs: FEET,
} as const satisfies KeyPose

const lungeFront: LegPose = { plant: { sole: [0, 0] } }
const BACK_TOES = { toes: [-0.505, 0], lift: 72 } as const
const DUMBBELLS_AT_SIDES: ArmPose = { upper: 3, forearm: 6 }

const lungeBottom: KeyPose = {
  body: { on: 'near', lean: 6 },
  nearLeg: { ...lungeFront, thigh: 84, shank: -8 },
  farLeg: { plant: BACK_TOES },
}
const lungeShallow: KeyPose = {
  body: { on: 'near', lean: 7 },
  nearLeg: { ...lungeFront, thigh: 51, shank: -9 },
  farLeg: { plant: BACK_TOES },
}
const lungeStep: KeyPose = {
  body: { on: 'near', lean: 5 },
  nearLeg: { ...lungeFront, thigh: 20, shank: -8 },
  farLeg: { thigh: 0, shank: -56, pointed: 6 },
}
const lungeTop: KeyPose = {
  body: { on: 'near', lean: 1 },
  nearLeg: { ...lungeFront, thigh: 4, shank: -3 },
  farLeg: { plant: { sole: [0, 0] } },
}
const lungeKeys = (
  arms: ArmPose,
  farArm?: (pose: KeyPose) => ArmPose,
): readonly [Key, ...Key[]] => {
  const held = (pose: KeyPose): KeyPose => ({
    ...pose,
    arms,
    ...(farArm ? { farArm: farArm(pose) } : {}),
  })
  return [
    key(held(lungeTop), 0.5, { part: 'down', end: 'top' }),
    key(held(lungeStep), 0.45, { part: 'down' }),
    key(held(lungeShallow), 0.65, { part: 'down' }),
    key(held(lungeBottom), 0.55, { part: 'up', end: 'bottom' }),
    key(held(lungeShallow), 0.4, { part: 'up' }),
    key(held(lungeStep), 0.45, { part: 'up' }),
  ]
}

const stepUpArms = (near: number, far: number): Pick<KeyPose, 'nearArm' | 'farArm'> => ({
  nearArm: { upper: near, forearm: near + 62 },
  farArm: { upper: far, forearm: far + 62 },
})

const BENCH_TOES = { toes: [-0.5, 0.268], lift: 158 } as const

export const SQUAT_LUNGE = {
  squat: {
    description:
      'Feet flat, sitting down between the heels until the thighs are level, arms reaching forward.',
    view: 'side',
    keys: squatWith({ upper: 12, forearm: 20 }, { upper: 86, forearm: 88 }),
  },
  'goblet-squat': {
    description: 'A squat with one dumbbell held upright at the chest in both hands.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'upright' }],
    keys: squatWith(GOBLET_UP, GOBLET_DOWN),
  },
  'front-squat': {
    description:
      'A squat with one end of a dumbbell on each shoulder, elbows forward, trunk nearly upright.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: [
      key(withArms(standing, SHOULDERED_UP), 1.8, { part: 'down', end: 'top' }),
      key(withArms(frontDeep, SHOULDERED_DOWN), 1.2, { part: 'up', end: 'bottom' }),
    ],
  },
  'chair-squat': {
    description: 'Sitting back until the hips touch a chair, then standing up.',
    view: 'side',
    kit: [{ kind: 'chair', x: -0.3, facing: 'right' }],
    keys: [
      key(withArms(standing, { upper: 12, forearm: 20 }), 1.8, { part: 'down', end: 'top' }),
      key(withArms(seat, { upper: 82, forearm: 86 }), 1.2, { part: 'up', end: 'bottom' }),
    ],
  },
  'squat-jump': {
    description: 'From a squat, jumping straight up and landing softly in the squat again.',
    view: 'side',
    keys: [
      key(
        withArms(
          {
            body: { at: [-0.1, 0.33], lean: 40, nod: -14 },
            legs: { plant: { toes: [0.112, 0], lift: 0 }, kneeTowards: 70 },
          },
          { upper: -10, forearm: 6 },
        ),
        0.32,
        { part: 'up', end: 'bottom' },
      ),
      key(
        {
          body: { at: [0.07, 0.594], lean: 2 },
          legs: { plant: { toes: [0.112, 0], lift: 50 } },
          arms: { upper: 88, forearm: 100 },
        },
        0.27,
        { part: 'up' },
      ),
      key(
        {
          body: { at: [0.06, 0.72], lean: 0 },
          legs: { thigh: 6, shank: -12, pointed: 46 },
          arms: { upper: 150, forearm: 160 },
        },
        0.27,
        { part: 'down', end: 'top' },
      ),
      key(
        {
          body: { at: [0.05, 0.588], lean: 7 },
          legs: { plant: { toes: [0.112, 0], lift: 46 } },
          arms: { upper: 92, forearm: 104 },
        },
        0.4,
        { part: 'down' },
      ),
    ],
    still: 2,
  },
  'squat-to-press': {
    description: 'A squat with dumbbells at the shoulders, pressed overhead on the way up.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: [
      key(withArms(standing, OVERHEAD), 0.8, { part: 'down', end: 'top' }),
      key(withArms(onFeet(18, -10, 8), RACK_UP), 1, { part: 'down' }),
      key(withArms(deep, RACK_DOWN), 0.9, { part: 'up', end: 'bottom' }),
      key(withArms(onFeet(14, -8, 6), RACK_UP), 0.6, { part: 'up' }),
    ],
    still: 2,
  },
  'wall-sit': {
    description: 'Sitting against a wall without a chair, thighs level, held.',
    view: 'side',
    kit: [{ kind: 'wall', x: -0.185 }],
    keys: [
      key(
        {
          body: { at: [-0.096, 0.292], lean: 0 },
          legs: { plant: { sole: [0.15, 0] } },
          arms: { upper: 28, forearm: 62 },
        },
        2,
      ),
      key(
        {
          body: { at: [-0.096, 0.292], lean: 0, nod: -2 },
          legs: { plant: { sole: [0.15, 0] } },
          arms: { upper: 26, forearm: 64 },
        },
        2,
      ),
    ],
  },
  'calf-raise': {
    description: 'Standing, the heels lift high and lower slowly.',
    view: 'side',
    keys: [
      key(
        {
          body: { on: 'near', lean: 0 },
          legs: { plant: { toes: [0.112, 0], lift: 0 }, thigh: 2, shank: -2 },
          arms: HANGING,
        },
        0.9,
        { part: 'up', end: 'bottom' },
      ),
      key(
        {
          body: { on: 'near', lean: 0 },
          legs: { plant: { toes: [0.112, 0], lift: 48 }, thigh: 1, shank: -1 },
          arms: HANGING,
        },
        1.4,
        { part: 'down', end: 'top' },
      ),
    ],
  },
  'reverse-lunge': {
    description:
      'Stepping one foot back, lowering until the back knee is close to the floor, and stepping in again, dumbbells at the sides.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: lungeKeys(DUMBBELLS_AT_SIDES),
  },
  'supported-lunge': {
    description: 'A reverse lunge with one hand on the back of a chair.',
    view: 'side',
    kit: [{ kind: 'chair', x: 0.15, facing: 'right' }],
    keys: lungeKeys(HANGING, () => ({ hand: [0.165, 0.525] })),
  },
  'split-squat': {
    description:
      'Feet one long step apart and staying there, lowering the back knee straight down.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: [
      key(withArms(lungeShallow, DUMBBELLS_AT_SIDES), 1.6, { part: 'down', end: 'top' }),
      key(withArms(lungeBottom, DUMBBELLS_AT_SIDES), 1.1, { part: 'up', end: 'bottom' }),
    ],
  },
  'rear-foot-raised-split-squat': {
    description: 'The back foot on a chair, lowering straight down on the front leg.',
    view: 'side',
    kit: [
      { kind: 'chair', x: -0.68, facing: 'right' },
      { kind: 'dumbbell', hand: 'both' },
    ],
    keys: [
      key(
        withArms(
          {
            body: { on: 'near', lean: 8 },
            nearLeg: { ...lungeFront, thigh: 28, shank: -6 },
            farLeg: { plant: BENCH_TOES },
          },
          DUMBBELLS_AT_SIDES,
        ),
        1.6,
        { part: 'down', end: 'top' },
      ),
      key(
        withArms(
          {
            body: { on: 'near', lean: 14 },
            nearLeg: { ...lungeFront, thigh: 78, shank: -14 },
            farLeg: { plant: BENCH_TOES },
          },
          DUMBBELLS_AT_SIDES,
        ),
        1.1,
        { part: 'up', end: 'bottom' },
      ),
    ],
  },
  'step-up': {
    description: 'One foot on a step, standing up onto it and stepping down again.',
    view: 'side',
    kit: [{ kind: 'step', x: 0.1 }],
    keys: [
      key(
        {
          body: { at: [0.02, 0.512], lean: 8 },
          nearLeg: { plant: { sole: [0.2, STEP_HEIGHT] } },
          farLeg: { plant: { sole: [0, 0] } },
          ...stepUpArms(-22, 26),
        },
        0.7,
        { part: 'up', end: 'bottom' },
      ),
      key(
        {
          body: { at: [0.14, 0.6], lean: 10 },
          nearLeg: { plant: { sole: [0.2, STEP_HEIGHT] } },
          farLeg: { thigh: 14, shank: -56, pointed: 14 },
          ...stepUpArms(6, -4),
        },
        0.6,
        { part: 'up' },
      ),
      key(
        {
          body: { at: [0.2, STANDING_HIPS + STEP_HEIGHT], lean: 1 },
          legs: { plant: { sole: [0.2, STEP_HEIGHT] } },
          ...stepUpArms(2, 4),
        },
        0.7,
        { part: 'down', end: 'top' },
      ),
      key(
        {
          body: { at: [0.13, 0.6], lean: 10 },
          nearLeg: { plant: { sole: [0.2, STEP_HEIGHT] } },
          farLeg: { thigh: 6, shank: -46, pointed: 18 },
          ...stepUpArms(-6, 8),
        },
        0.7,
        { part: 'down' },
      ),
    ],
    still: 1,
  },
} satisfies Record<string, FigureData>
