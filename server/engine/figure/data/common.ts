/** Positions that many figures begin from. */
import { ANKLE_HEIGHT, SHANK, THIGH } from '../body'
import { SEAT_HEIGHT } from '../furniture'
import type { ArmPose, BodyPose, Key, KeyPose, LegPose, Plant, Point } from '../types'

/** Hips of a person standing, knees not quite locked. */
export const STANDING_HIPS = THIGH + SHANK + ANKLE_HEIGHT - 0.004

export const FEET: LegPose = { plant: { sole: [0, 0] } }
export const UPRIGHT: BodyPose = { at: [0, STANDING_HIPS], lean: 0 }
export const HANGING: ArmPose = { upper: 2, forearm: 12 }
export const HANDS_ON_HIPS: ArmPose = { upper: -38, upperOut: 24, forearm: 38, forearmOut: -14 }

export const STAND: KeyPose = { body: UPRIGHT, legs: FEET, arms: HANGING }

/** A body carried by both feet at once, by the slope of thighs and shins. */
export function onFeet(thigh: number, shank: number, lean: number, rest: Partial<BodyPose> = {}) {
  return {
    body: { on: 'near', lean, ...rest },
    legs: { plant: { sole: [0, 0] }, thigh, shank },
  } as const satisfies KeyPose
}

export const key = (pose: KeyPose, seconds: number, rest: Pick<Key, 'part' | 'end'> = {}): Key => ({
  ...pose,
  seconds,
  ...rest,
})

/** A pose with other arms. */
export const withArms = (pose: KeyPose, arms: ArmPose): KeyPose => ({ ...pose, arms })

/** The same position with near and far side changed over. */
export function otherSide(pose: KeyPose): KeyPose {
  const { nearLeg, farLeg, nearArm, farArm, body, ...rest } = pose
  return {
    ...rest,
    body: {
      ...body,
      ...(body.on ? { on: body.on === 'near' ? 'far' : 'near' } : {}),
      ...(body.twist === undefined ? {} : { twist: -body.twist }),
    },
    ...(farLeg ? { nearLeg: farLeg } : {}),
    ...(nearLeg ? { farLeg: nearLeg } : {}),
    ...(farArm ? { nearArm: farArm } : {}),
    ...(nearArm ? { farArm: nearArm } : {}),
  }
}

const mirrored = ([x, y, z]: Point): Point => (z === undefined ? [x, y] : [x, y, -z])
const mirroredPlant = (plant: Plant): Plant => {
  if ('sole' in plant) return { sole: mirrored(plant.sole) }
  if ('toes' in plant) return { ...plant, toes: mirrored(plant.toes) }
  return plant
}

/** As `otherSide`, for a front view whose body also shifts and tips sideways. */
export function otherSideFront(pose: KeyPose): KeyPose {
  const { nearLeg, farLeg, body, ...rest } = otherSide(pose)
  const leg = (its: LegPose): LegPose =>
    its.plant ? { ...its, plant: mirroredPlant(its.plant) } : its
  return {
    ...rest,
    body: {
      ...body,
      ...(body.at ? { at: mirrored(body.at) } : {}),
      ...(body.tilt === undefined ? {} : { tilt: -body.tilt }),
    },
    ...(nearLeg ? { nearLeg: leg(nearLeg) } : {}),
    ...(farLeg ? { farLeg: leg(farLeg) } : {}),
  }
}

/** On hands and knees. */
export const ALL_FOURS: KeyPose = {
  body: { at: [0, THIGH + 0.038], lean: 76, nod: -4 },
  legs: { thigh: 0, shank: -90, pointed: 82 },
  arms: { hand: [0.285, 0.022], open: 90, elbowTowards: -60 },
}

/** Sitting on a chair whose seat ends at x = 0.07. */
export const SITTING: KeyPose = {
  body: { at: [-0.06, SEAT_HEIGHT + 0.063], lean: 2 },
  legs: { plant: { sole: [0.2, 0] } },
  arms: HANGING,
}
export const SITTING_CHAIR = { kind: 'chair', x: -0.165, facing: 'right' } as const

/** Lying face up, head to the left, knees bent, feet flat. */
export const LYING: KeyPose = {
  body: { at: [0, 0.062], lean: -90, nod: 4 },
  legs: { plant: { sole: [0.2, 0] } },
  arms: { upper: 87, forearm: 88, open: 88 },
}

/** A straight body from the toes: `slope` degrees above the floor. */
export function plankOnToes(slope: number, rest: Partial<BodyPose> = {}) {
  return {
    body: { on: 'near', lean: 90 - slope, nod: -8, ...rest },
    legs: { plant: { toes: [0, 0], lift: 65 }, thigh: slope - 90, shank: slope - 90 },
  } as const satisfies KeyPose
}
/** A straight body from the knees. */
export function plankOnKnees(slope: number, rest: Partial<BodyPose> = {}) {
  return {
    body: { on: 'near', lean: 90 - slope, nod: -8, ...rest },
    legs: { plant: { knee: [0, 0] }, thigh: slope - 90, shank: -97, pointed: 50 },
  } as const satisfies KeyPose
}
