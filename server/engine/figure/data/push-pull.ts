import type { ArmPose, FigureData, Key, KeyPose } from '../types'
import {
  key,
  LYING,
  onFeet,
  otherSide,
  plankOnKnees,
  plankOnToes,
  SITTING,
  SITTING_CHAIR,
  STAND,
  UPRIGHT,
  withArms,
} from './common'

const OPEN_ON_FLOOR = { open: 90 } as const
const pressKeys = (low: KeyPose, high: KeyPose): readonly [Key, Key] => [
  key(low, 1, { part: 'up', end: 'bottom' }),
  key(high, 1.2, { part: 'down', end: 'top' }),
]

const RACKED: ArmPose = { upper: 24, forearm: 168, upperOut: 12, forearmOut: 0 }
const PRESSED: ArmPose = { upper: 173, forearm: 179 }

const wallBody = (slope: number) =>
  ({
    body: { on: 'near', lean: slope, nod: -2 },
    legs: { plant: { toes: [0.112, 0], lift: 8 }, thigh: -slope, shank: -slope },
    arms: { hand: [0.478, 0.73], open: 168, elbowTowards: -20 },
  }) as const satisfies KeyPose

const halfKneel: KeyPose = {
  body: { at: [0, 0.284], lean: 1 },
  nearLeg: { plant: { sole: [0.25, 0] } },
  farLeg: { thigh: 0, shank: -108, slope: 78 },
}

const rowBody = onFeet(33, -14, 64, { nod: -14 })
const HANG_DOWN: ArmPose = { upper: -1, forearm: 0 }
const ROWED: ArmPose = { upper: -76, forearm: -8 }

const supported: KeyPose = {
  body: { at: [-0.06, 0.493], lean: 66, nod: -12 },
  nearLeg: { plant: { sole: [-0.16, 0] } },
  farLeg: { plant: { sole: [0.1, 0] } },
  farArm: { hand: [0.33, 0.29] },
}

const marchUp: KeyPose = {
  body: UPRIGHT,
  nearLeg: { thigh: 84, shank: 2, pointed: 8 },
  farLeg: { plant: { sole: [0, 0] } },
}
const SUITCASE: Pick<KeyPose, 'nearArm' | 'farArm'> = {
  nearArm: { upper: 1, forearm: 3 },
  farArm: { upper: 4, forearm: 18 },
}

const frontStand = {
  body: UPRIGHT,
  nearLeg: { plant: { sole: [0, 0, 0.075] }, toesOut: 24 },
  farLeg: { plant: { sole: [0, 0, -0.075] }, toesOut: 24 },
} as const satisfies KeyPose

export const PUSH_PULL = {
  'push-up': {
    description:
      'Hands under the shoulders, body straight from head to heels, the chest lowers to the floor and presses up.',
    view: 'side',
    still: 0.55,
    keys: [
      key({ ...plankOnToes(17.6), arms: { hand: [0.705, 0.022], ...OPEN_ON_FLOOR } }, 1.4, {
        part: 'down',
        end: 'top',
      }),
      key({ ...plankOnToes(5.2), arms: { hand: [0.705, 0.022], ...OPEN_ON_FLOOR } }, 1, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'incline-push-up': {
    description: 'A push-up with the hands on a table, body straight.',
    view: 'side',
    still: 0.55,
    kit: [{ kind: 'table', x: 0.4 }],
    keys: [
      key({ ...plankOnToes(53), arms: { hand: [0.462, 0.42], ...OPEN_ON_FLOOR } }, 1.4, {
        part: 'down',
        end: 'top',
      }),
      key({ ...plankOnToes(43), arms: { hand: [0.462, 0.42], ...OPEN_ON_FLOOR } }, 1, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'knee-push-up': {
    description: 'A push-up from the knees, straight from head to knees.',
    view: 'side',
    still: 0.55,
    keys: [
      key({ ...plankOnKnees(36), arms: { hand: [0.425, 0.022], ...OPEN_ON_FLOOR } }, 1.4, {
        part: 'down',
        end: 'top',
      }),
      key({ ...plankOnKnees(13), arms: { hand: [0.425, 0.022], ...OPEN_ON_FLOOR } }, 1, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'wall-push-up': {
    description: 'Standing an arm’s length from a wall, the chest leans to it and presses away.',
    view: 'side',
    still: 0.55,
    kit: [{ kind: 'wall', x: 0.505 }],
    keys: [
      key(wallBody(12), 1.4, { part: 'down', end: 'top' }),
      key(wallBody(26), 1, { part: 'up', end: 'bottom' }),
    ],
  },
  'floor-press': {
    description:
      'Lying face up with bent knees, dumbbells press from above the elbows to straight arms.',
    view: 'side',
    kit: [
      { kind: 'mat', from: -0.52, to: 0.4 },
      { kind: 'dumbbell', hand: 'both', hold: 'level' },
    ],
    keys: pressKeys(
      withArms(LYING, { upper: 86, upperOut: 52, forearm: 178, forearmOut: 4 }),
      withArms(LYING, { upper: 178, upperOut: 4, forearm: 181, forearmOut: 0 }),
    ),
  },
  'standing-press': {
    description: 'Standing tall, dumbbells press from the shoulders to overhead.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: pressKeys(withArms(STAND, RACKED), withArms(STAND, PRESSED)),
  },
  'seated-press': {
    description: 'Sitting tall on a chair, dumbbells press from the shoulders to overhead.',
    view: 'side',
    kit: [SITTING_CHAIR, { kind: 'dumbbell', hand: 'both' }],
    keys: pressKeys(withArms(SITTING, RACKED), withArms(SITTING, PRESSED)),
  },
  'half-kneeling-press': {
    description:
      'One knee down, one foot in front, a dumbbell presses from the shoulder to overhead.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near' }],
    keys: pressKeys(
      { ...halfKneel, nearArm: RACKED, farArm: { hand: [0.19, 0.345] } },
      { ...halfKneel, nearArm: PRESSED, farArm: { hand: [0.19, 0.345] } },
    ),
  },
  'lateral-raise': {
    description: 'Standing, dumbbells lift out to the sides to shoulder height.',
    view: 'front',
    kit: [{ kind: 'dumbbell', hand: 'both', hold: 'end-on' }],
    keys: pressKeys(
      withArms(frontStand, { upper: 4, upperOut: 11, forearm: 8, forearmOut: 9 }),
      withArms(frontStand, { upper: 4, upperOut: 86, forearm: 8, forearmOut: 84 }),
    ),
  },
  'bent-over-row': {
    description:
      'Bent over with a flat back, two dumbbells pull from hanging arms to beside the ribs.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: pressKeys(withArms(rowBody, HANG_DOWN), withArms(rowBody, ROWED)),
  },
  'supported-row': {
    description:
      'Bent over with one hand on a chair, the other pulls a dumbbell to beside the ribs.',
    view: 'side',
    kit: [
      { kind: 'chair', x: 0.5, facing: 'left' },
      { kind: 'dumbbell', hand: 'near' },
    ],
    keys: pressKeys({ ...supported, nearArm: HANG_DOWN }, { ...supported, nearArm: ROWED }),
  },
  'band-row': {
    description: 'Standing, a band anchored in front is pulled until the elbows pass the ribs.',
    view: 'side',
    kit: [{ kind: 'band', from: [0.82, 0.62], hand: 'both' }],
    keys: pressKeys(
      withArms(onFeet(12, -8, 2), { upper: 62, forearm: 66 }),
      withArms(onFeet(12, -8, -3), { upper: -46, forearm: 74 }),
    ),
  },
  'band-pull-apart': {
    description:
      'Arms straight in front at shoulder height, a band is pulled apart until the arms are wide.',
    view: 'front',
    kit: [{ kind: 'band', from: 'other-hand', hand: 'near' }],
    keys: pressKeys(
      withArms(frontStand, { upper: 84, upperOut: 14, forearm: 86, forearmOut: 8 }),
      withArms(frontStand, { upper: 84, upperOut: 82, forearm: 86, forearmOut: 84 }),
    ),
  },
  curl: {
    description: 'Standing, upper arms still, dumbbells curl from the thighs to the shoulders.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both' }],
    keys: pressKeys(
      withArms(STAND, { upper: 0, forearm: 8 }),
      withArms(STAND, { upper: 8, forearm: 142 }),
    ),
  },
  'suitcase-march': {
    description: 'Marching on the spot, tall and level, with one dumbbell at the side.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'level' }],
    keys: [
      key({ ...marchUp, ...SUITCASE }, 0.7),
      key({ ...STAND, ...SUITCASE }, 0.5),
      key({ ...otherSide(marchUp), ...SUITCASE }, 0.7),
      key({ ...STAND, ...SUITCASE }, 0.5),
    ],
    still: 2,
  },
} satisfies Record<string, FigureData>
