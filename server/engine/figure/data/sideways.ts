/** Seen from the front, since the knees open or the body travels to the side. */
import type { ArmPose, FigureData, Key, KeyPose, LegPose } from '../types'
import { HANDS_ON_HIPS, key, otherSideFront, STANDING_HIPS } from './common'

/** Both hands on one handle: the elbows come in, so that the bell hangs plumb. */
const BELL_HANGING: ArmPose = { upper: 6, upperOut: -32.7, forearm: 0, forearmOut: 0 }

const WIDE_FOOT = { plant: { sole: [0, 0, 0.2] }, toesOut: 36 } as const
/** The far leg mirrors the one that carries; its foot tips with the shin, hence another angle. */
const wide = (
  lean: number,
  thigh: number,
  shank: number,
  thighOut: number,
  shankOut: number,
  farThighOut: number,
): KeyPose => ({
  body: { on: 'near', lean, nod: -lean / 3 },
  nearLeg: { ...WIDE_FOOT, thigh, shank, thighOut, shankOut },
  farLeg: { thigh, shank, thighOut: farThighOut, shankOut, slope: 0, toesOut: 36 },
  arms: BELL_HANGING,
})
const wideTall = wide(2, 4, -3, 17.5, 17.5, 14.6)
const wideHalf = wide(13, 34, -12, 34.6, 2, 34)
const wideLow = wide(22, 68, -20, 50.9, -10, 53.5)

/** Both hands hold the horns in front of the breastbone; `upper` follows the trunk's lean. */
const bellAtChest = (upper: number): ArmPose => ({
  upper,
  upperOut: -32.7,
  forearm: 90,
  forearmOut: 0,
})
const STAYING = { plant: { sole: [0, 0, -0.05] }, toesOut: 8 } as const
const sideTogether: KeyPose = {
  body: { at: [0, STANDING_HIPS], lean: 1 },
  nearLeg: { plant: { sole: [0, 0, 0.05] }, toesOut: 8 },
  farLeg: STAYING,
  arms: bellAtChest(58),
}
const sideReach: KeyPose = {
  body: { at: [-0.02, 0.505, 0.11], lean: 6 },
  nearLeg: { thigh: 20, thighOut: 27, shank: -18, shankOut: 24, slope: 4, toesOut: 12 },
  farLeg: STAYING,
  arms: bellAtChest(66),
}
/** From here the foot that stepped carries the body: its knee opens over the toes. */
const SIDE_FOOT = { plant: { sole: [0, 0, 0.545] }, toesOut: 14 } as const
const sideLanded: KeyPose = {
  body: { on: 'near', lean: 10 },
  nearLeg: { ...SIDE_FOOT, thigh: 10, shank: -3, thighOut: 30.5, shankOut: 30.5 },
  farLeg: STAYING,
  arms: bellAtChest(68),
}
const sideLow: KeyPose = {
  body: { on: 'near', lean: 30, nod: -10 },
  nearLeg: { ...SIDE_FOOT, thigh: 57, shank: -18, thighOut: 40, shankOut: -2 },
  farLeg: STAYING,
  arms: bellAtChest(94),
}
const sideLunge = (side: (pose: KeyPose) => KeyPose): readonly [Key, ...Key[]] => [
  key(side(sideTogether), 0.5, { part: 'down', end: 'top' }),
  key(side(sideReach), 0.4, { part: 'down' }),
  key(side(sideLanded), 0.7, { part: 'down' }),
  key(side(sideLow), 0.6, { part: 'up', end: 'bottom' }),
  key(side(sideLanded), 0.4, { part: 'up' }),
  key(side(sideReach), 0.4, { part: 'up' }),
]

const foot = (z: number): LegPose => ({ plant: { sole: [0, 0, z] }, toesOut: 10 })
const lifted = (z: number): LegPose => ({ plant: { sole: [0, 0.04, z] }, toesOut: 10 })
const stepping = (z: number, y: number, nearLeg: LegPose, farLeg: LegPose): KeyPose => ({
  body: { at: [-0.03, y, z], lean: 9, nod: -4 },
  nearLeg,
  farLeg,
  arms: HANDS_ON_HIPS,
})
/** A step towards the near side from feet hip-wide to feet hip-wide. */
const sideStep = (side: (pose: KeyPose) => KeyPose): readonly [Key, ...Key[]] => [
  key(side(stepping(-0.14, 0.51, foot(-0.08), foot(-0.2))), 0.35),
  key(side(stepping(-0.08, 0.505, lifted(0.06), foot(-0.2))), 0.35),
  key(side(stepping(0, 0.485, foot(0.2), foot(-0.2))), 0.35),
  key(side(stepping(0.08, 0.505, foot(0.2), lifted(-0.06))), 0.35),
]

const SKATE_TOES = [0.112, 0, 0.27] as const
const skateFoot = (lift: number): LegPose => ({ plant: { toes: SKATE_TOES, lift } })
const skateLanded: KeyPose = {
  body: { at: [-0.09, 0.4, 0.19], lean: 32, tilt: 8, nod: -14 },
  nearLeg: skateFoot(0),
  farLeg: { thigh: -34, thighOut: 8, shank: -76, shankOut: 18, slope: 60 },
  nearArm: { upper: -38, upperOut: 24, forearm: -6, forearmOut: 26 },
  farArm: { upper: 52, upperOut: -8, forearm: 88, forearmOut: -30 },
}
const skatePush: KeyPose = {
  body: { at: [0, 0.51, 0.08], lean: 16, nod: -8 },
  nearLeg: skateFoot(28),
  farLeg: { thigh: -2, thighOut: 34, shank: -52, shankOut: 26, slope: 24 },
  nearArm: { upper: 4, upperOut: 34, forearm: 40, forearmOut: 20 },
  farArm: { upper: 18, upperOut: 34, forearm: 60, forearmOut: 16 },
}
const skateInAir: KeyPose = {
  body: { at: [0.02, 0.56, -0.03], lean: 10, nod: -4 },
  nearLeg: { thigh: -8, thighOut: 24, shank: -34, shankOut: 20, pointed: 30 },
  farLeg: { thigh: 14, thighOut: 30, shank: -14, shankOut: 26, slope: 16 },
  nearArm: { upper: 10, upperOut: 38, forearm: 50, forearmOut: 20 },
  farArm: { upper: 6, upperOut: 38, forearm: 40, forearmOut: 24 },
}
const skate = (side: (pose: KeyPose) => KeyPose): readonly [Key, ...Key[]] => [
  key(side(skateLanded), 0.5),
  key(side(skatePush), 0.22),
  key(side(skateInAir), 0.3),
]

const same = (pose: KeyPose): KeyPose => pose

export const SIDEWAYS = {
  'wide-squat': {
    description:
      'Feet wide and toes turned out, a kettlebell hanging from both hands, sitting straight down with the knees over the toes.',
    view: 'front',
    kit: [{ kind: 'kettlebell', hand: 'near' }],
    keys: [
      key(wideTall, 0.9, { part: 'down', end: 'top' }),
      key(wideHalf, 0.9, { part: 'down' }),
      key(wideLow, 0.6, { part: 'up', end: 'bottom' }),
      key(wideHalf, 0.6, { part: 'up' }),
    ],
  },
  'side-lunge': {
    description:
      'A wide step to the side with a kettlebell at the chest, sitting back over that heel while the other leg stays long.',
    view: 'front',
    reps: 2,
    kit: [{ kind: 'kettlebell', hand: 'near' }],
    keys: [...sideLunge(same), ...sideLunge(otherSideFront)],
    still: 3,
  },
  'side-step': {
    description:
      'Stepping one foot to the side and bringing the other foot in, then back again, hands on the hips.',
    view: 'front',
    reps: 2,
    keys: [...sideStep(same), ...sideStep(otherSideFront)],
    still: 2,
  },
  'skater-hop': {
    description:
      'Bounding sideways from one foot to the other, sinking into each landing with the free foot behind.',
    view: 'front',
    reps: 2,
    keys: [...skate(same), ...skate(otherSideFront)],
    still: 0,
  },
} satisfies Record<string, FigureData>
