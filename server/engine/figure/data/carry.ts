import type { ArmPose, FigureData, Key, KeyPose } from '../types'
import { FEET, HANGING, key, otherSide, STAND, UPRIGHT } from './common'

type Arms = Pick<KeyPose, 'arms' | 'nearArm' | 'farArm'>

const kneeUp: KeyPose = {
  body: UPRIGHT,
  nearLeg: { thigh: 84, shank: 2, pointed: 8 },
  farLeg: FEET,
}
const stand: KeyPose = { body: UPRIGHT, legs: FEET }

/** Knee after knee to nearly hip height while the arms keep still. */
const marchWith = (arms: Arms): readonly [Key, ...Key[]] => [
  key({ ...kneeUp, ...arms }, 0.7),
  key({ ...stand, ...arms }, 0.5),
  key({ ...otherSide(kneeUp), ...arms }, 0.7),
  key({ ...stand, ...arms }, 0.5),
]

const AT_SIDE: ArmPose = { upper: 1, forearm: 3 }
const BELL_AT_CHEST: ArmPose = { upper: 8, forearm: 132 }
const FREE: ArmPose = { upper: 4, forearm: 18 }

export const CARRY = {
  'goblet-march': {
    description:
      'Marching on the spot, tall and level, with a kettlebell held in both hands at the chest.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'kettlebell', hand: 'near' }],
    keys: marchWith({ arms: BELL_AT_CHEST }),
    still: 2,
  },
  'overhead-march': {
    description: 'Marching slowly on the spot, one arm straight overhead with a dumbbell.',
    view: 'three-quarter',
    reps: 2,
    kit: [{ kind: 'dumbbell', hand: 'near' }],
    keys: marchWith({
      nearArm: { upper: 176, upperOut: 5, forearm: 179, forearmOut: 0 },
      farArm: FREE,
    }),
    still: 0,
  },
  'farmer-march': {
    description: 'Marching on the spot, tall and level, with a dumbbell hanging at each side.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'dumbbell', hand: 'both', hold: 'level' }],
    keys: marchWith({ arms: AT_SIDE }),
    still: 2,
  },
  'suitcase-hold': {
    description: 'Standing tall and still on both feet, shoulders level, one dumbbell at the side.',
    view: 'side',
    kit: [{ kind: 'dumbbell', hand: 'near', hold: 'level' }],
    keys: [
      key({ ...STAND, nearArm: AT_SIDE, farArm: HANGING }, 2),
      key({ ...STAND, body: { ...UPRIGHT, round: -2 }, nearArm: AT_SIDE, farArm: HANGING }, 2),
    ],
    still: 0,
  },
} satisfies Record<string, FigureData>
