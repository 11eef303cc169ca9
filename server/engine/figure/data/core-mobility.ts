import type { ArmPose, FigureData, Key, KeyPose } from '../types'
import {
  ALL_FOURS,
  FEET,
  HANDS_ON_HIPS,
  key,
  otherSide,
  plankOnKnees,
  plankOnToes,
  SITTING,
  SITTING_CHAIR,
  STAND,
  STANDING_HIPS,
  UPRIGHT,
  withArms,
} from './common'

/** Seated, to steady the back as it moves. */
const HANDS_ON_THIGHS: ArmPose = { hand: [0.2, 0.33], elbowTowards: -90 }

const MAT = { kind: 'mat', from: -0.56, to: 0.56 } as const

const onBack = { body: { at: [0, 0.062], lean: -90, nod: 4 } } as const
const tableTop: KeyPose = {
  ...onBack,
  legs: { thigh: 176, shank: 92, pointed: 6 },
  arms: { upper: 178, forearm: 180 },
}
const deadBugLong: KeyPose = {
  ...onBack,
  nearLeg: { thigh: 176, shank: 92, pointed: 6 },
  farLeg: { thigh: 103, shank: 99, pointed: 10 },
  nearArm: { upper: 243, forearm: 250 },
  farArm: { upper: 178, forearm: 180 },
}
const ARMS_DOWN: ArmPose = { upper: 87, forearm: 88, open: 88 }
const heelDown: KeyPose = {
  ...onBack,
  nearLeg: { thigh: 138, shank: 36, pointed: 2 },
  farLeg: { thigh: 176, shank: 92, pointed: 6 },
  arms: ARMS_DOWN,
}

/** A hold breathes, so that it does not look like a picture that got stuck. */
const breathing = (pose: KeyPose, round = 2): readonly [Key, Key] => [
  key(pose, 2),
  key({ ...pose, body: { ...pose.body, round: (pose.body.round ?? 0) + round } }, 2),
]

const ON_FOREARMS: ArmPose = { upper: 0, forearm: 89 }

/** Seen from the front, head to the left; the near side is the lower one. */
const sidePlank = (hipY: number, tilt: number): KeyPose => ({
  body: { at: [0, hipY, 0], lean: 0, tilt },
  nearLeg: { thigh: 0, thighOut: -tilt },
  farLeg: { thigh: 0, thighOut: tilt },
  nearArm: { upper: 0, forearm: 90, forearmOut: 48 },
  farArm: { upper: 180, upperOut: 2 },
})
const kneeSidePlank = (hipY: number, tilt: number): KeyPose => ({
  ...sidePlank(hipY, tilt),
  nearLeg: { thigh: 0, thighOut: -tilt, shank: -90, shankOut: -10, pointed: 60 },
  farLeg: { thigh: 0, thighOut: tilt, shank: -90, shankOut: 10, pointed: 60 },
})
const reaching = (pose: KeyPose): readonly [Key, Key] => [
  key(pose, 2),
  key({ ...pose, farArm: { ...pose.farArm, upperOut: 5 } }, 2),
]

const birdDogLong: KeyPose = {
  ...ALL_FOURS,
  body: { ...ALL_FOURS.body, nod: -2 },
  nearLeg: { thigh: 0, shank: -90, pointed: 82 },
  farLeg: { thigh: -88, shank: -90, pointed: 20 },
  nearArm: { upper: 98, forearm: 98, open: 98, elbowTowards: -60 },
  farArm: { hand: [0.285, 0.022], open: 90, elbowTowards: -60 },
}
const birdDogTable: KeyPose = { ...ALL_FOURS, body: { ...ALL_FOURS.body, nod: -2 } }

const kneelingBase = { plant: { knee: [0, 0] }, shank: -90, pointed: 82 } as const
const HANDS_AHEAD = { hand: [0.36, 0.022], open: 90, elbowTowards: -115, elbowOut: 0.8 } as const

const halfKneelStretch = (thigh: number, lean: number, arm: number): KeyPose => ({
  body: { on: 'far', lean, nod: -3 },
  farLeg: { plant: { knee: [0, 0] }, thigh, shank: -108, slope: 78 },
  nearLeg: { plant: { sole: [0.27, 0] } },
  nearArm: { upper: arm, forearm: arm + 4 },
  farArm: { hand: [0.26, 0.345] },
})

const hamstring = (lean: number): KeyPose => ({
  body: { at: [-0.165, 0.462], lean, nod: -10 },
  nearLeg: { thigh: 34, shank: 34, slope: -30 },
  farLeg: { plant: { sole: [-0.1, 0] } },
  arms: { hand: [-0.02 + lean * 0.0012, 0.42 - lean * 0.001], elbowTowards: -90 },
})

const seatedHamstring = (lean: number): KeyPose => ({
  body: { at: [-0.06, 0.328], lean, nod: -6 },
  nearLeg: { thigh: 56, shank: 55, slope: -30 },
  farLeg: { plant: { sole: [0.16, 0] } },
  arms: { upper: lean * 0.9, forearm: 20 + lean * 0.8 },
})

export const CORE_MOBILITY = {
  'dead-bug': {
    description:
      'Lying face up, one arm and the opposite leg reach long while the other two stay up.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'mat', from: -0.54, to: 0.5 }],
    keys: [
      key(tableTop, 1.4, { part: 'down', end: 'top' }),
      key(deadBugLong, 1.2, { part: 'up', end: 'bottom' }),
      key(tableTop, 1.4, { part: 'down', end: 'top' }),
      key(otherSide(deadBugLong), 1.2, { part: 'up', end: 'bottom' }),
    ],
    still: 1,
  },
  'heel-taps': {
    description:
      'Lying face up with knees above the hips, one heel at a time lowers to tap the floor.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'mat', from: -0.54, to: 0.5 }],
    keys: [
      key(withArms(tableTop, ARMS_DOWN), 1.2, { part: 'down', end: 'top' }),
      key(heelDown, 1, { part: 'up', end: 'bottom' }),
      key(withArms(tableTop, ARMS_DOWN), 1.2, { part: 'down', end: 'top' }),
      key(otherSide(heelDown), 1, { part: 'up', end: 'bottom' }),
    ],
    still: 1,
  },
  plank: {
    description: 'Held on forearms and toes, straight from head to heels.',
    view: 'side',
    keys: breathing({ ...plankOnToes(7.4), arms: ON_FOREARMS }),
  },
  'knee-plank': {
    description: 'Held on forearms and knees, straight from head to knees.',
    view: 'side',
    keys: breathing({ ...plankOnKnees(19.6), arms: ON_FOREARMS }),
  },
  'incline-plank': {
    description: 'Held with the hands on a table, straight from head to heels.',
    view: 'side',
    kit: [{ kind: 'table', x: 0.4 }],
    keys: breathing({ ...plankOnToes(53), arms: { hand: [0.462, 0.42], open: 90 } }, 1.5),
  },
  'side-plank': {
    description: 'Held on one forearm and the side of the feet, hips high, body in one line.',
    view: 'front',
    keys: reaching(sidePlank(0.227, 72.7)),
  },
  'knee-side-plank': {
    description: 'Held on one forearm and the knee, hips high, body in line from head to knee.',
    view: 'front',
    keys: reaching(kneeSidePlank(0.188, 65.2)),
  },
  'bird-dog': {
    description: 'On hands and knees, one arm and the opposite leg reach long.',
    view: 'side',
    reps: 2,
    keys: [
      key(birdDogTable, 1.3, { part: 'up', end: 'bottom' }),
      key(birdDogLong, 1.3, { part: 'down', end: 'top' }),
      key(birdDogTable, 1.3, { part: 'up', end: 'bottom' }),
      key(otherSide(birdDogLong), 1.3, { part: 'down', end: 'top' }),
    ],
    still: 1,
  },
  'cat-cow': {
    description: 'On hands and knees, the back rounds towards the ceiling and then sinks, slowly.',
    view: 'side',
    keys: [
      key({ ...ALL_FOURS, body: { at: [0, 0.283], lean: 75, round: 62, nod: 30 } }, 2.2),
      key({ ...ALL_FOURS, body: { at: [0, 0.283], lean: 79, round: -34, nod: -32 } }, 2.2),
    ],
    still: 0,
  },
  'seated-cat-cow': {
    description: 'Sitting on a chair, hands on the thighs, the back rounds and then lifts long.',
    view: 'side',
    kit: [SITTING_CHAIR],
    keys: [
      key(
        {
          ...SITTING,
          body: { ...SITTING.body, lean: 14, round: 46, nod: 26 },
          arms: HANDS_ON_THIGHS,
        },
        2.2,
      ),
      key(
        {
          ...SITTING,
          body: { ...SITTING.body, lean: 4, round: -18, nod: -18 },
          arms: HANDS_ON_THIGHS,
        },
        2.2,
      ),
    ],
    still: 0,
  },
  'childs-pose': {
    description:
      'From hands and knees the hips sink back to the heels, arms long, forehead towards the floor.',
    view: 'side',
    kit: [MAT],
    keys: [
      key(
        {
          body: { on: 'near', lean: 80, nod: -4 },
          legs: { ...kneelingBase, thigh: 0 },
          arms: HANDS_AHEAD,
        },
        1.8,
      ),
      key(
        {
          body: { on: 'near', lean: 92, round: 26, nod: 6 },
          legs: { ...kneelingBase, thigh: 64 },
          arms: HANDS_AHEAD,
        },
        2.2,
      ),
      key(
        {
          body: { on: 'near', lean: 92, round: 28, nod: 6 },
          legs: { ...kneelingBase, thigh: 65 },
          arms: HANDS_AHEAD,
        },
        1.8,
      ),
    ],
    still: 1,
  },
  'hip-flexor-stretch': {
    description: 'One knee down, one foot in front, the hips ease forward and the arm reaches up.',
    view: 'side',
    keys: [
      key(halfKneelStretch(0, 0, 4), 1.8),
      key(halfKneelStretch(-25, -4, 172), 2.4),
      key(halfKneelStretch(-26, -5, 174), 1.8),
    ],
    still: 1,
  },
  'hamstring-stretch': {
    description:
      'One heel in front with a straight leg, the hips travel back and the flat back tips forward.',
    view: 'side',
    keys: [key(hamstring(18), 1.8), key(hamstring(52), 2.2), key(hamstring(54), 1.8)],
    still: 1,
  },
  'seated-hamstring-stretch': {
    description:
      'Sitting on the front of a chair, one leg straight with the heel down, the flat back tips forward.',
    view: 'side',
    kit: [{ kind: 'chair', x: -0.2, facing: 'right' }],
    keys: [
      key(seatedHamstring(4), 1.8),
      key(seatedHamstring(38), 2.2),
      key(seatedHamstring(40), 1.8),
    ],
    still: 1,
  },
  'chest-opener': {
    description: 'Standing, the arms reach back and the chest lifts.',
    view: 'three-quarter',
    keys: [
      key({ ...STAND, arms: { upper: 2, forearm: 8 } }, 1.8),
      key(
        {
          ...STAND,
          body: { ...UPRIGHT, lean: -4, round: -14, nod: -12 },
          arms: { upper: -46, forearm: -42 },
        },
        2.2,
      ),
      key(
        {
          ...STAND,
          body: { ...UPRIGHT, lean: -4, round: -16, nod: -13 },
          arms: { upper: -48, forearm: -44 },
        },
        1.8,
      ),
    ],
    still: 1,
  },
  'quad-stretch': {
    description: 'Standing on one leg, the other heel is held to the seat, hips level.',
    view: 'side',
    keys: breathing(
      {
        body: { at: [0, STANDING_HIPS], lean: 0 },
        nearLeg: { thigh: -4, shank: -146, pointed: 30 },
        farLeg: FEET,
        nearArm: { hand: [-0.14, 0.452] },
        farArm: HANDS_ON_HIPS,
      },
      1,
    ),
  },
} satisfies Record<string, FigureData>
