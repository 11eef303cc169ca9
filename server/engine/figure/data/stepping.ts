import type { FigureData, Key, KeyPose } from '../types'
import { FEET, HANDS_ON_HIPS, HANGING, key, otherSide, STAND, UPRIGHT, withArms } from './common'

/** Both feet by their toes, since the heel of the one that stays lifts. */
const TOES = { plant: { toes: [0.112, 0], lift: 0 } } as const
const FRONT_FOOT = { plant: { sole: [0.6, 0] } } as const

const lungeStand: KeyPose = { body: UPRIGHT, legs: TOES }
const lungeReach: KeyPose = {
  body: { at: [0.11, 0.517], lean: 2 },
  nearLeg: { thigh: 46, shank: 2, slope: -16 },
  farLeg: { plant: { toes: [0.112, 0], lift: 26 } },
}
const lungeLanded: KeyPose = {
  body: { at: [0.31, 0.42], lean: 4 },
  nearLeg: FRONT_FOOT,
  farLeg: { plant: { toes: [0.112, 0], lift: 58 } },
}
const lungeLow: KeyPose = {
  body: { at: [0.385, 0.309], lean: 5 },
  nearLeg: FRONT_FOOT,
  farLeg: { plant: { toes: [0.112, 0], lift: 74 } },
}
const lungePush: KeyPose = {
  body: { at: [0.335, 0.39], lean: 7 },
  nearLeg: FRONT_FOOT,
  farLeg: { plant: { toes: [0.112, 0], lift: 62 } },
}
const lungeBack: KeyPose = {
  body: { at: [0.09, 0.516], lean: 3 },
  nearLeg: { thigh: 50, shank: -24, pointed: 4 },
  farLeg: { plant: { toes: [0.112, 0], lift: 20 } },
}
const lungeForward = (side: (pose: KeyPose) => KeyPose): readonly [Key, ...Key[]] => {
  const way = (pose: KeyPose): KeyPose => withArms(side(pose), HANDS_ON_HIPS)
  return [
    key(way(lungeStand), 0.4, { part: 'down', end: 'top' }),
    key(way(lungeReach), 0.4, { part: 'down' }),
    key(way(lungeLanded), 0.5, { part: 'down' }),
    key(way(lungeLow), 0.45, { part: 'up', end: 'bottom' }),
    key(way(lungePush), 0.35, { part: 'up' }),
    key(way(lungeBack), 0.4, { part: 'up' }),
  ]
}

/** Where the toes of a kneeling leg lie when the other foot stands at 0. */
const KNEELING = { plant: { toes: [-0.497, 0], lift: 76 } } as const
const kneelHips = (lean: number): KeyPose['body'] => ({ at: [-0.25, 0.284], lean })

/** Down on one knee and then both; the foot that went first comes to the front again. */
const kneelAndStand: readonly KeyPose[] = [
  STAND,
  {
    body: { at: [-0.05, 0.51], lean: 6 },
    nearLeg: { thigh: -10, shank: -64, pointed: 8 },
    farLeg: FEET,
  },
  { body: { at: [-0.17, 0.42], lean: 10 }, nearLeg: KNEELING, farLeg: FEET },
  { body: kneelHips(3), nearLeg: KNEELING, farLeg: FEET },
  {
    body: kneelHips(4),
    nearLeg: KNEELING,
    farLeg: { thigh: 48, shank: -92, slope: 56 },
  },
  { body: kneelHips(0), legs: KNEELING },
  {
    body: kneelHips(4),
    nearLeg: { thigh: 76, shank: -62, slope: 22 },
    farLeg: KNEELING,
  },
  { body: kneelHips(6), nearLeg: FEET, farLeg: KNEELING },
  { body: { at: [-0.15, 0.42], lean: 16 }, nearLeg: FEET, farLeg: KNEELING },
  {
    body: { at: [-0.02, 0.51], lean: 5 },
    nearLeg: FEET,
    farLeg: { thigh: -2, shank: -64, pointed: 6 },
  },
]
const kneelSeconds = [0.5, 0.5, 0.7, 0.5, 0.5, 0.9, 0.5, 0.5, 0.7, 0.5]
const kneelKeys = (side: (pose: KeyPose) => KeyPose): Key[] =>
  kneelAndStand.map((pose, index) => key(withArms(side(pose), HANGING), kneelSeconds[index] ?? 0.5))

const same = (pose: KeyPose): KeyPose => pose
const [firstKneel = key(STAND, 0.5), ...laterKneels] = kneelKeys(same)

export const STEPPING = {
  'forward-lunge': {
    description:
      'A long step forward, sinking until both knees are bent at right angles, and one push back to standing.',
    view: 'side',
    reps: 2,
    keys: [...lungeForward(same), ...lungeForward(otherSide)],
    still: 3,
  },
  'kneel-to-stand': {
    description:
      'From standing down on one knee, then kneeling tall on both, one foot in front and up to standing.',
    view: 'side',
    reps: 2,
    kit: [{ kind: 'mat', from: -0.6, to: -0.13 }],
    keys: [firstKneel, ...laterKneels, ...kneelKeys(otherSide)],
    still: 3,
  },
} satisfies Record<string, FigureData>
