import type { ArmPose, FigureData, Key, KeyPose } from '../types'
import { HANDS_ON_HIPS, HANGING, key, LYING, onFeet, withArms } from './common'

const standing = onFeet(4, -3, 1)
const hinged = onFeet(30, -6, 74, { nod: -14 })

const swingDown: KeyPose = {
  ...onFeet(40, -14, 66, { nod: -14 }),
  arms: { upper: -24, forearm: -26 },
}
const swingUp: KeyPose = { ...onFeet(1, 0, -3), arms: { upper: 84, forearm: 86 } }
const swingThrough: KeyPose = {
  ...onFeet(22, -9, 30, { nod: -6 }),
  arms: { upper: 14, forearm: 16 },
}
const swingKeys: readonly [Key, ...Key[]] = [
  key(swingDown, 0.34, { part: 'up', end: 'bottom' }),
  key(swingThrough, 0.36, { part: 'up' }),
  key(swingUp, 0.42, { part: 'down', end: 'top' }),
  key(swingThrough, 0.38, { part: 'down' }),
]

const bridgeArms: ArmPose = { upper: 87, forearm: 88, open: 88 }
const bridgeUp: KeyPose = {
  body: { at: [-0.029, 0.184], lean: -115, nod: 29 },
  legs: { plant: { sole: [0.2, 0] } },
  arms: bridgeArms,
}

/** Shoulder blades on the edge of a seat, the weight held where legs and trunk meet. */
const thrust = (
  hips: readonly [number, number],
  lean: number,
  nod: number,
  weight: readonly [number, number, number],
): KeyPose => ({
  body: { at: hips, lean, nod },
  legs: { plant: { sole: [0.5, 0] } },
  arms: { hand: weight, elbowTowards: 200, elbowOut: 1 },
})

export const HINGE = {
  'hip-hinge': {
    description:
      'Hands on the hips, the hips travel back and the flat back tips forward, then stand tall.',
    view: 'side',
    keys: [
      key(withArms(standing, HANDS_ON_HIPS), 1.8, { part: 'down', end: 'top' }),
      key({ ...hinged, arms: { upper: -104, upperOut: 18, forearm: -22, forearmOut: -12 } }, 1.2, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'romanian-deadlift': {
    description:
      'Two dumbbells slide down the thighs as the hips travel back, knees soft, back flat.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'both', hold: 'level' }],
    keys: [
      key(withArms(standing, { upper: 7, forearm: 9 }), 2, { part: 'down', end: 'top' }),
      key(withArms(hinged, { upper: -10, forearm: -10 }), 1.4, { part: 'up', end: 'bottom' }),
    ],
  },
  'single-leg-deadlift': {
    description: 'Standing on one leg, tipping forward while the other leg reaches long behind.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'level' }],
    keys: [
      key(
        {
          body: { on: 'far', lean: 1 },
          farLeg: { plant: { sole: [0, 0] }, thigh: 6, shank: -4 },
          nearLeg: { thigh: -4, shank: -52, pointed: -6 },
          nearArm: { upper: 5, forearm: 7 },
          farArm: HANGING,
        },
        2,
        { part: 'down', end: 'top' },
      ),
      key(
        {
          body: { on: 'far', lean: 82, nod: -10 },
          farLeg: { plant: { sole: [0, 0] }, thigh: 22, shank: -8 },
          nearLeg: { thigh: -84, shank: -86, pointed: 6 },
          nearArm: { upper: -4, forearm: -3 },
          farArm: { upper: 4, forearm: 6 },
        },
        1.4,
        { part: 'up', end: 'bottom' },
      ),
    ],
  },
  'suitcase-deadlift': {
    description:
      'One dumbbell beside the foot is lifted by standing up, back flat, shoulders level.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'level' }],
    keys: [
      key({ ...standing, nearArm: { upper: 2, forearm: 4 }, farArm: HANGING }, 1.8, {
        part: 'down',
        end: 'top',
      }),
      key(
        {
          ...onFeet(72, -22, 58, { nod: -18 }),
          nearArm: { upper: -4, forearm: -4 },
          farArm: { upper: 2, forearm: 6 },
        },
        1.2,
        { part: 'up', end: 'bottom' },
      ),
    ],
  },
  'kettlebell-deadlift': {
    description:
      'A kettlebell on the floor between the feet is lifted in both hands by standing up, back flat, and set down again.',
    view: 'side',
    kit: [{ kind: 'kettlebell', hand: 'near' }],
    keys: [
      key(withArms(standing, { hand: [0.05, 0.452, 0.03] }), 2, { part: 'down', end: 'top' }),
      key(withArms(onFeet(68, -12, 58, { nod: -18 }), { hand: [0.056, 0.158, 0.03] }), 1.2, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'band-deadlift': {
    description:
      'Standing on a band with an end in each hand, the hips travel back with a flat back, then stand tall against the pull.',
    view: 'side',
    kit: [{ kind: 'band', from: [0.035, 0.012], hand: 'both' }],
    keys: [
      key(withArms(standing, { upper: 4, forearm: 6 }), 2, { part: 'down', end: 'top' }),
      key(withArms(onFeet(44, -8, 58, { nod: -14 }), { upper: -14, forearm: -12 }), 1.3, {
        part: 'up',
        end: 'bottom',
      }),
    ],
  },
  'dumbbell-swing': {
    description:
      'One dumbbell held in both hands swings from between the legs to chest height by a snap of the hips.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'hanging' }],
    keys: swingKeys,
    still: 2,
  },
  'kettlebell-swing': {
    description: 'A kettlebell swings from between the legs to chest height by a snap of the hips.',
    view: 'side',
    kit: [{ kind: 'kettlebell', hand: 'near' }],
    keys: swingKeys,
    still: 2,
  },
  'glute-bridge': {
    description:
      'Lying face up with bent knees, the hips lift until shoulders, hips and knees are in line.',
    view: 'side',
    kit: [{ kind: 'mat', from: -0.52, to: 0.4 }],
    keys: [
      key(LYING, 1, { part: 'up', end: 'bottom' }),
      key(bridgeUp, 1.4, { part: 'down', end: 'top' }),
    ],
  },
  'single-leg-bridge': {
    description: 'A bridge on one foot, the other leg held long in line with the thigh.',
    view: 'side',
    kit: [{ kind: 'mat', from: -0.52, to: 0.4 }],
    keys: [
      key(
        { ...LYING, farLeg: LYING.legs ?? {}, nearLeg: { thigh: 128, shank: 128, pointed: 4 } },
        1,
        { part: 'up', end: 'bottom' },
      ),
      key(
        {
          ...bridgeUp,
          farLeg: bridgeUp.legs ?? {},
          nearLeg: { thigh: 115, shank: 115, pointed: 4 },
        },
        1.4,
        { part: 'down', end: 'top' },
      ),
    ],
  },
  'hip-thrust': {
    description:
      'Shoulder blades on the edge of a bench, a dumbbell across the hips, the seat lifts until trunk and thighs are level.',
    view: 'side',
    kit: [
      { kind: 'chair', x: -0.265, facing: 'right' },
      { kind: 'mat', from: -0.02, to: 0.62 },
      { kind: 'dumbbell', hand: 'near', hold: 'end-on' },
    ],
    keys: [
      key(thrust([0.165, 0.118], -42, 14, [0.228, 0.207, 0.04]), 1, { part: 'up', end: 'bottom' }),
      key(thrust([0.25, 0.295], -88, 34, [0.255, 0.392, 0.04]), 1.6, { part: 'down', end: 'top' }),
    ],
  },
} satisfies Record<string, FigureData>
