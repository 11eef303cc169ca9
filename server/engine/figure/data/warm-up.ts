import type { FigureData, KeyPose } from '../types'
import {
  FEET,
  HANDS_ON_HIPS,
  key,
  otherSide,
  otherSideFront,
  SITTING,
  SITTING_CHAIR,
  STAND,
  STANDING_HIPS,
  UPRIGHT,
} from './common'

const kneeUp: KeyPose = {
  body: UPRIGHT,
  nearLeg: { thigh: 92, shank: 4, pointed: 8 },
  farLeg: FEET,
  nearArm: { upper: -28, forearm: 52 },
  farArm: { upper: 32, forearm: 118 },
}
const passing: KeyPose = { body: UPRIGHT, legs: FEET, arms: { upper: 2, forearm: 86 } }

const highKnee: KeyPose = {
  body: { at: [0, STANDING_HIPS + 0.035], lean: -2 },
  nearLeg: { thigh: 102, shank: -4, pointed: 10 },
  farLeg: { plant: { toes: [0.112, 0], lift: 38 } },
  nearArm: { upper: -40, forearm: 48 },
  farArm: { upper: 42, forearm: 138 },
}
const highPassing: KeyPose = {
  body: { at: [0, STANDING_HIPS - 0.012], lean: 2 },
  legs: { plant: { toes: [0.112, 0], lift: 12 } },
  arms: { upper: 2, forearm: 92 },
}

const seatedKneeUp: KeyPose = {
  ...SITTING,
  nearLeg: { thigh: 118, shank: 6, pointed: 6 },
  farLeg: { plant: { sole: [0.2, 0] } },
  nearArm: { upper: -24, forearm: 54 },
  farArm: { upper: 30, forearm: 116 },
}
const seatedPassing: KeyPose = { ...SITTING, arms: { upper: 2, forearm: 84 } }

const feetTogether: KeyPose = {
  body: { at: [0, STANDING_HIPS], lean: 0 },
  nearLeg: { plant: { sole: [0, 0, 0.055] }, toesOut: 24 },
  farLeg: { plant: { sole: [0, 0, -0.055] }, toesOut: 24 },
  arms: { upper: 0, upperOut: 9, forearmOut: 5 },
}
const feetApart: KeyPose = {
  body: { at: [0, 0.492], lean: 0 },
  nearLeg: { plant: { sole: [0, 0, 0.235] }, toesOut: 30 },
  farLeg: { plant: { sole: [0, 0, -0.235] }, toesOut: 30 },
  arms: { upper: 0, upperOut: 158, forearmOut: 168 },
}
const jackInAir: KeyPose = {
  body: { at: [0, 0.562], lean: 0 },
  legs: { thigh: 2, shank: -4, thighOut: 11, toesOut: 27, pointed: 22 },
  arms: { upper: 0, upperOut: 88, forearmOut: 92 },
}
const stepOut: KeyPose = {
  body: { at: [0, 0.506, 0.055], lean: 0 },
  nearLeg: { plant: { sole: [0, 0, 0.26] }, toesOut: 30 },
  farLeg: { plant: { sole: [0, 0, -0.055] }, toesOut: 24 },
  arms: { upper: 0, upperOut: 158, forearmOut: 168 },
}
const stepLifted = (z: number): KeyPose => ({
  body: { at: [0, 0.518, z * 0.2], lean: 0 },
  nearLeg: { plant: { sole: [0, 0.05, 0.16] }, toesOut: 26 },
  farLeg: { plant: { sole: [0, 0, -0.055] }, toesOut: 24 },
  arms: { upper: 0, upperOut: 84, forearmOut: 90 },
})

const climberFeet = { plant: { toes: [0.012, 0], lift: 65 } } as const
const climb: KeyPose = {
  body: { at: [0.455, 0.288], lean: 77, nod: -14 },
  nearLeg: { thigh: 56, shank: -90, slope: 72 },
  farLeg: climberFeet,
  arms: { hand: [0.735, 0.022], open: 90 },
}
const climberMiddle: KeyPose = {
  body: { at: [0.452, 0.3], lean: 79, nod: -12 },
  nearLeg: { thigh: 12, shank: -116, slope: 72 },
  farLeg: { thigh: 12, shank: -116, slope: 72 },
  arms: { hand: [0.735, 0.022], open: 90 },
}
const inclineClimb: KeyPose = {
  body: { at: [0.272, 0.478], lean: 44, nod: -10 },
  nearLeg: { thigh: 62, shank: -42, pointed: 20 },
  farLeg: { plant: { toes: [0, 0], lift: 58 } },
  arms: { hand: [0.585, 0.424], open: 90 },
}
const inclineMiddle: KeyPose = {
  ...inclineClimb,
  nearLeg: { plant: { toes: [0, 0], lift: 58 } },
  farLeg: { plant: { toes: [0, 0], lift: 58 } },
}

const handsDown = { hand: [0.33, 0.022], open: 90 } as const
const openHanging = { upper: 2, forearm: 12, open: 10 } as const
const crouch: KeyPose = {
  body: { at: [-0.05, 0.262], lean: 76, round: 34, nod: -30 },
  legs: FEET,
  arms: handsDown,
}
const footTravels: KeyPose = {
  body: { at: [-0.03, 0.33], lean: 90, nod: -22 },
  nearLeg: { thigh: 52, shank: -100, slope: 45 },
  farLeg: { plant: { sole: [0, 0] } },
  arms: handsDown,
}
const otherTravels: KeyPose = {
  body: { at: [0.03, 0.335], lean: 86, nod: -16 },
  nearLeg: { plant: { toes: [-0.37, 0], lift: 65 } },
  farLeg: { thigh: 42, shank: -100, slope: 48 },
  arms: handsDown,
}
const oneFootBack: KeyPose = {
  body: { at: [0.01, 0.32], lean: 84, nod: -16 },
  nearLeg: { plant: { toes: [-0.37, 0], lift: 65 } },
  farLeg: { plant: { sole: [0, 0] } },
  arms: handsDown,
}
const longPlank: KeyPose = {
  body: { at: [0.064, 0.27], lean: 73, nod: -8 },
  legs: { plant: { toes: [-0.37, 0], lift: 65 } },
  arms: handsDown,
}

const rollElbows = (upper: number, upperOut: number): KeyPose => ({
  body: UPRIGHT,
  nearLeg: { plant: { sole: [0, 0, 0.075] }, toesOut: 24 },
  farLeg: { plant: { sole: [0, 0, -0.075] }, toesOut: 24 },
  arms: { upper, upperOut, forearm: 148, forearmOut: -upperOut * 0.5 },
})

export const WARM_UP = {
  standing: {
    description: 'A person stands at ease.',
    view: 'side',
    keys: [
      key(STAND, 2.4),
      key(
        { ...STAND, body: { ...UPRIGHT, lean: -1, nod: -1 }, arms: { upper: 0, forearm: 15 } },
        2.4,
      ),
    ],
  },
  'march-in-place': {
    description: 'Marching on the spot, knees to hip height, arms swinging.',
    view: 'side',
    reps: 2,
    keys: [key(kneeUp, 0.4), key(passing, 0.4), key(otherSide(kneeUp), 0.4), key(passing, 0.4)],
    still: 2,
  },
  'high-knees': {
    description: 'Running on the spot, knees above hip height.',
    view: 'side',
    reps: 2,
    keys: [
      key(highKnee, 0.2),
      key(highPassing, 0.18),
      key(otherSide(highKnee), 0.2),
      key(highPassing, 0.18),
    ],
    still: 0,
  },
  'seated-march': {
    description: 'Sitting tall on a chair, lifting one knee after the other.',
    view: 'side',
    reps: 2,
    kit: [SITTING_CHAIR],
    keys: [
      key(seatedKneeUp, 0.5),
      key(seatedPassing, 0.5),
      key(otherSide(seatedKneeUp), 0.5),
      key(seatedPassing, 0.5),
    ],
    still: 0,
  },
  'knee-raise': {
    description: 'Standing on one leg, the other knee lifts to hip height and lowers again.',
    view: 'side',
    keys: [
      key({ body: UPRIGHT, legs: FEET, arms: HANDS_ON_HIPS }, 1, { part: 'up', end: 'bottom' }),
      key(
        {
          body: UPRIGHT,
          nearLeg: { thigh: 96, shank: 2, pointed: 4 },
          farLeg: FEET,
          arms: HANDS_ON_HIPS,
        },
        1,
        { part: 'down', end: 'top' },
      ),
    ],
  },
  'arm-circles': {
    description: 'Standing, straight arms draw large circles.',
    view: 'side',
    keys: [
      key({ ...STAND, arms: { upper: 0, forearm: 4 } }, 0.7),
      key(
        { ...STAND, nearArm: { upper: 92, forearm: 92 }, farArm: { upper: 92, forearm: 92 } },
        0.7,
      ),
      key({ ...STAND, arms: { upper: 178, forearm: 178 } }, 0.7),
      key({ ...STAND, arms: { upper: 268, upperOut: 28, forearm: 268, forearmOut: 28 } }, 0.7),
      key({ ...STAND, arms: { upper: 360, forearm: 364 } }, 0),
    ],
    still: 1,
  },
  'shoulder-rolls': {
    description: 'Fingertips on the shoulders, the elbows draw slow circles.',
    view: 'front',
    keys: [
      key(rollElbows(0, 26), 0.8),
      key(rollElbows(40, 46), 0.8),
      key(rollElbows(70, 88), 0.8),
      key(rollElbows(-20, 62), 0.8),
    ],
    still: 1,
  },
  'jumping-jack': {
    description: 'Jumping the feet apart while the arms rise, and together while they lower.',
    view: 'front',
    keys: [key(feetTogether, 0.3), key(jackInAir, 0.3), key(feetApart, 0.3), key(jackInAir, 0.3)],
    still: 2,
  },
  'step-jack': {
    description: 'Stepping one foot out while the arms rise, and back in: a jack without the jump.',
    view: 'front',
    reps: 2,
    keys: [
      key(feetTogether, 0.35),
      key(stepLifted(0.1), 0.35),
      key(stepOut, 0.35),
      key(stepLifted(0.1), 0.35),
      key(feetTogether, 0.35),
      key(otherSideFront(stepLifted(0.1)), 0.35),
      key(otherSideFront(stepOut), 0.35),
      key(otherSideFront(stepLifted(0.1)), 0.35),
    ],
    still: 2,
  },
  'mountain-climber': {
    description: 'In a high plank, the knees drive forward one after the other.',
    view: 'side',
    reps: 2,
    keys: [
      key(climb, 0.35),
      key(climberMiddle, 0.25),
      key(otherSide(climb), 0.35),
      key(climberMiddle, 0.25),
    ],
    still: 0,
  },
  'incline-mountain-climber': {
    description: 'Hands on a table, body straight, the knees drive forward one after the other.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'table', x: 0.54 }],
    keys: [
      key(inclineClimb, 0.5),
      key(inclineMiddle, 0.4),
      key(otherSide(inclineClimb), 0.5),
      key(inclineMiddle, 0.4),
    ],
    still: 0,
  },
  'burpee-step-back': {
    description:
      'From standing, hands to the floor, feet step back to a plank one by one, step in and stand up.',
    view: 'side',
    keys: [
      key({ ...STAND, arms: openHanging }, 0.9, { part: 'down', end: 'top' }),
      key(crouch, 0.3, { part: 'down' }),
      key(footTravels, 0.3, { part: 'down' }),
      key(oneFootBack, 0.3, { part: 'down' }),
      key(otherTravels, 0.3, { part: 'down' }),
      key(longPlank, 0.5, { part: 'up', end: 'bottom' }),
      key(otherTravels, 0.3, { part: 'up' }),
      key(oneFootBack, 0.3, { part: 'up' }),
      key(footTravels, 0.3, { part: 'up' }),
      key(crouch, 0.9, { part: 'up' }),
    ],
    still: 5,
  },
} satisfies Record<string, FigureData>
