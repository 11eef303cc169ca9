/**
 * From a key position, or a moment between two, to joints: forward kinematics from the hips, with
 * planted feet and hands solved so that they stay where they stand.
 */
import {
  ANKLE_HEIGHT,
  FOREARM,
  GRIP,
  HEEL_BACK,
  HIP_HALF,
  LOWER_TRUNK,
  NECK_AND_HEAD,
  OPEN_HAND,
  SHANK,
  SHOULDER_HALF,
  THIGH,
  TOE_FORWARD,
  UPPER_ARM,
  UPPER_TRUNK,
} from './body'
import type { ArmJoints, ArmPose, Joints, KeyPose, LegJoints, LegPose, Plant, Point } from './types'
import {
  add,
  along,
  between,
  cosine,
  cross,
  degrees,
  distance,
  dot,
  scale,
  sine,
  subtract,
  unit,
  vec,
  type Vec,
} from './vector'

export type SideName = 'near' | 'far'
const SIDES: readonly SideName[] = ['near', 'far']
const signOf = (side: SideName): number => (side === 'near' ? 1 : -1)

/** Half the thickness of a kneeling knee: its joint lies this far above the floor. */
const KNEE_THICKNESS = 0.038

/** Every number that moves, by name, so that all are joined over time in the same way. */
export const BODY_NUMBERS = [
  'pelvisX',
  'pelvisY',
  'pelvisZ',
  'lean',
  'tilt',
  'round',
  'twist',
  'nod',
] as const
const LEG_NUMBERS = [
  'thigh',
  'thighOut',
  'shank',
  'shankOut',
  'slope',
  'toesOut',
  'kneeX',
  'kneeY',
  'ankleX',
  'ankleY',
  'ankleZ',
  'toeX',
  'toeY',
  'toeZ',
  'kneePoleX',
  'kneePoleY',
  'kneePoleZ',
] as const
const ARM_NUMBERS = [
  'upper',
  'upperOut',
  'forearm',
  'forearmOut',
  'handX',
  'handY',
  'handZ',
  'elbowPoleX',
  'elbowPoleY',
  'elbowPoleZ',
  'openTo',
] as const
export const SIDE_NUMBERS = [...LEG_NUMBERS, ...ARM_NUMBERS] as const

type BodyNumbers = Record<(typeof BODY_NUMBERS)[number], number>
type LegNumbers = Record<(typeof LEG_NUMBERS)[number], number>
type ArmNumbers = Record<(typeof ARM_NUMBERS)[number], number>
export interface PoseNumbers {
  body: BodyNumbers
  near: LegNumbers & ArmNumbers
  far: LegNumbers & ArmNumbers
}

/** How the parts are found: the hips given or carried by a leg, limbs by their angles or solved. */
export interface PoseModes {
  root: 'at' | SideName
  near: { leg: 'angles' | 'ankle' | 'toes' | 'knee'; arm: 'angles' | 'hand'; openHand: boolean }
  far: { leg: 'angles' | 'ankle' | 'toes' | 'knee'; arm: 'angles' | 'hand'; openHand: boolean }
}

function direction(pitch: number, out: number, side: SideName): Vec {
  return vec(sine(pitch) * cosine(out), -cosine(pitch) * cosine(out), signOf(side) * sine(out))
}

function anglesOf(direction: Vec, side: SideName): { pitch: number; out: number } {
  const sideways = Math.max(-1, Math.min(1, signOf(side) * direction.z))
  return {
    pitch: degrees(Math.atan2(direction.x, -direction.y)),
    out: degrees(Math.asin(sideways)),
  }
}

interface Frame {
  up: Vec
  lateral: Vec
  front: Vec
}

function frameOf(lean: number, tilt: number): Frame {
  const up = vec(sine(lean) * cosine(tilt), cosine(lean) * cosine(tilt), sine(tilt))
  const lateral = vec(-sine(lean) * sine(tilt), -cosine(lean) * sine(tilt), cosine(tilt))
  return { up, lateral, front: cross(up, lateral) }
}

/** The middle joint of a two-bone limb that bends towards `pole`; the end comes no further than the bones reach. */
function solveTwoBones(
  root: Vec,
  target: Vec,
  upperLength: number,
  lowerLength: number,
  pole: Vec,
): { middle: Vec; end: Vec } {
  const reach = distance(root, target)
  const far = upperLength + lowerLength
  const span = Math.min(Math.max(reach, Math.abs(upperLength - lowerLength) + 1e-6), far - 1e-9)
  const axis = unit(subtract(target, root))
  const across = unit(subtract(pole, scale(axis, dot(pole, axis))))
  const alongAxis =
    (upperLength * upperLength - lowerLength * lowerLength + span * span) / (2 * span)
  const off = Math.sqrt(Math.max(0, upperLength * upperLength - alongAxis * alongAxis))
  return {
    middle: along(along(root, axis, alongAxis), across, off),
    end: along(root, axis, span),
  }
}

interface FootFrame {
  forward: Vec
  up: Vec
}
/** `legOut`: a foot in the air tips sideways with its leg; on the floor it lies flat. */
function footFrame(slope: number, toesOut: number, legOut: number, side: SideName): FootFrame {
  const heading = vec(cosine(toesOut), 0, signOf(side) * sine(toesOut))
  const upright = vec(0, cosine(legOut), -signOf(side) * sine(legOut))
  return {
    forward: add(scale(heading, cosine(slope)), scale(upright, -sine(slope))),
    up: add(scale(heading, sine(slope)), scale(upright, cosine(slope))),
  }
}
const ankleOverToe = (toe: Vec, foot: FootFrame): Vec =>
  along(along(toe, foot.up, ANKLE_HEIGHT), foot.forward, -TOE_FORWARD)

function ankleTarget(leg: LegNumbers, mode: 'ankle' | 'toes', foot: FootFrame): Vec {
  if (mode === 'toes') return ankleOverToe(vec(leg.toeX, leg.toeY, leg.toeZ), foot)
  return vec(leg.ankleX, leg.ankleY, leg.ankleZ)
}

function footJoints(ankle: Vec, foot: FootFrame): { heel: Vec; toe: Vec } {
  const under = along(ankle, foot.up, -ANKLE_HEIGHT)
  return {
    heel: along(under, foot.forward, -HEEL_BACK),
    toe: along(under, foot.forward, TOE_FORWARD),
  }
}

/**
 * Joint positions of a moment.
 * A leg that carries the body (`modes.root`) is followed upwards from its plant, all else outwards
 * from the hips.
 */
export function jointsOf(numbers: PoseNumbers, modes: PoseModes): Joints {
  const { body } = numbers
  const lower = frameOf(body.lean - body.round / 2, body.tilt)
  const upper = frameOf(body.lean + body.round / 2, body.tilt)
  const shoulderLine = add(
    scale(upper.lateral, cosine(body.twist)),
    scale(upper.front, -sine(body.twist)),
  )
  const pelvis =
    modes.root === 'at'
      ? vec(body.pelvisX, body.pelvisY, body.pelvisZ)
      : pelvisOver(numbers[modes.root], modes[modes.root].leg, modes.root, lower)
  const waist = along(pelvis, lower.up, LOWER_TRUNK)
  const chest = along(waist, upper.up, UPPER_TRUNK)
  const headFrame = frameOf(body.lean + body.round / 2 + body.nod, body.tilt)
  const head = along(chest, headFrame.up, NECK_AND_HEAD)

  const leg = (side: SideName): LegJoints => {
    const its = numbers[side]
    const hip = along(pelvis, lower.lateral, signOf(side) * HIP_HALF)
    const mode = modes[side].leg
    const solved = mode === 'ankle' || mode === 'toes'
    const foot = footFrame(its.slope, its.toesOut, solved ? 0 : its.shankOut, side)
    if (solved && modes.root !== side) {
      const pole = vec(its.kneePoleX, its.kneePoleY, its.kneePoleZ)
      const { middle, end } = solveTwoBones(hip, ankleTarget(its, mode, foot), THIGH, SHANK, pole)
      return { hip, knee: middle, ankle: end, ...footJoints(end, foot) }
    }
    const knee = along(hip, direction(its.thigh, its.thighOut, side), THIGH)
    const ankle = along(knee, direction(its.shank, its.shankOut, side), SHANK)
    return { hip, knee, ankle, ...footJoints(ankle, foot) }
  }
  const arm = (side: SideName): ArmJoints => {
    const its = numbers[side]
    const { openHand } = modes[side]
    const shoulder = along(chest, shoulderLine, signOf(side) * SHOULDER_HALF)
    const palm = direction(its.openTo, 0, side)
    if (modes[side].arm === 'hand') {
      const pole = vec(its.elbowPoleX, its.elbowPoleY, its.elbowPoleZ)
      const target = vec(its.handX, its.handY, its.handZ)
      const reach = openHand ? FOREARM : FOREARM + GRIP
      const { middle, end } = solveTwoBones(shoulder, target, UPPER_ARM, reach, pole)
      const wrist = between(middle, end, FOREARM / reach)
      return {
        shoulder,
        elbow: middle,
        wrist,
        hand: openHand ? along(wrist, palm, OPEN_HAND) : end,
      }
    }
    const elbow = along(shoulder, direction(its.upper, its.upperOut, side), UPPER_ARM)
    const forearm = direction(its.forearm, its.forearmOut, side)
    const wrist = along(elbow, forearm, FOREARM)
    return {
      shoulder,
      elbow,
      wrist,
      hand: openHand ? along(wrist, palm, OPEN_HAND) : along(wrist, forearm, GRIP),
    }
  }
  return {
    pelvis,
    waist,
    chest,
    head,
    near: { ...arm('near'), ...leg('near') },
    far: { ...arm('far'), ...leg('far') },
  }
}

function pelvisOver(
  leg: LegNumbers,
  mode: PoseModes['near']['leg'],
  side: SideName,
  frame: Frame,
): Vec {
  const thigh = scale(direction(leg.thigh, leg.thighOut, side), THIGH)
  const toHip = scale(frame.lateral, signOf(side) * HIP_HALF)
  if (mode === 'knee') {
    const knee = vec(leg.kneeX, leg.kneeY, signOf(side) * HIP_HALF)
    return subtract(subtract(knee, thigh), toHip)
  }
  const foot = footFrame(leg.slope, leg.toesOut, 0, side)
  const ankle = ankleTarget(leg, mode === 'toes' ? 'toes' : 'ankle', foot)
  const shank = scale(direction(leg.shank, leg.shankOut, side), SHANK)
  return subtract(subtract(subtract(ankle, shank), thigh), toHip)
}

const pointToVec = (point: Point, z: number): Vec => vec(point[0], point[1], point[2] ?? z)

/** The leg of a key for one side: its own where it has one, else what the key says of both. */
export function legOf(key: KeyPose, side: SideName): LegPose {
  return (side === 'near' ? key.nearLeg : key.farLeg) ?? key.legs ?? {}
}
export function armOf(key: KeyPose, side: SideName): ArmPose {
  return (side === 'near' ? key.nearArm : key.farArm) ?? key.arms ?? {}
}

/** The point that a plant holds still, above the floor by the part's own thickness. */
function plantNumbers(plant: Plant | undefined, side: SideName): Partial<LegNumbers> {
  const z = signOf(side) * HIP_HALF
  if (!plant) return {}
  if ('sole' in plant) {
    const at = pointToVec(plant.sole, z)
    return { ankleX: at.x, ankleY: at.y + ANKLE_HEIGHT, ankleZ: at.z, slope: 0 }
  }
  if ('toes' in plant) {
    const at = pointToVec(plant.toes, z)
    return { toeX: at.x, toeY: at.y, toeZ: at.z, slope: plant.lift }
  }
  return { kneeX: plant.knee[0], kneeY: plant.knee[1] + KNEE_THICKNESS }
}

function legMode(leg: LegPose): PoseModes['near']['leg'] {
  if (!leg.plant) return 'angles'
  if ('knee' in leg.plant) return 'knee'
  if ('toes' in leg.plant) return 'toes'
  return 'ankle'
}

export interface ResolvedKey {
  numbers: PoseNumbers
  modes: PoseModes
}

/**
 * A key position with every number known: angles of what was solved, places of what was given by angles,
 * so that any of them can be joined to the next key.
 */
export function resolveKey(key: KeyPose): ResolvedKey {
  const { body } = key
  const frame = frameOf(body.lean - (body.round ?? 0) / 2, body.tilt ?? 0)
  const numbersOf = (side: SideName): LegNumbers & ArmNumbers => {
    const leg = legOf(key, side)
    const arm = armOf(key, side)
    const shank = leg.shank ?? 0
    // Over a flat foot the knee goes where the toes point, even with the trunk bent right down.
    const overToes = leg.plant && 'sole' in leg.plant ? vec(1, 0) : vec(0, 0)
    const kneePole =
      leg.kneeTowards === undefined
        ? add(frame.front, overToes)
        : direction(leg.kneeTowards, 0, side)
    const elbowPole = add(
      arm.elbowTowards === undefined
        ? scale(add(frame.front, frame.up), -1)
        : direction(arm.elbowTowards, 0, side),
      scale(frame.lateral, signOf(side) * (arm.elbowOut ?? 0)),
    )
    const hand = arm.hand ? pointToVec(arm.hand, signOf(side) * SHOULDER_HALF) : vec(0, 0)
    return {
      thigh: leg.thigh ?? 0,
      thighOut: leg.thighOut ?? 0,
      shank,
      shankOut: leg.shankOut ?? leg.thighOut ?? 0,
      toesOut: leg.toesOut ?? 0,
      kneeX: 0,
      kneeY: 0,
      ankleX: 0,
      ankleY: 0,
      ankleZ: 0,
      toeX: 0,
      toeY: 0,
      toeZ: 0,
      kneePoleX: kneePole.x,
      kneePoleY: kneePole.y,
      kneePoleZ: kneePole.z,
      ...{ slope: leg.slope ?? (leg.pointed ?? 0) - shank },
      ...plantNumbers(leg.plant, side),
      ...(leg.plant && 'knee' in leg.plant
        ? { slope: leg.slope ?? (leg.pointed ?? 0) - shank }
        : {}),
      upper: arm.upper ?? 0,
      upperOut: arm.upperOut ?? 0,
      forearm: arm.forearm ?? arm.upper ?? 0,
      forearmOut: arm.forearmOut ?? arm.upperOut ?? 0,
      handX: hand.x,
      handY: hand.y,
      handZ: hand.z,
      elbowPoleX: elbowPole.x,
      elbowPoleY: elbowPole.y,
      elbowPoleZ: elbowPole.z,
      openTo: arm.open ?? 0,
    }
  }
  const modesOf = (side: SideName): PoseModes['near'] => {
    const leg = legOf(key, side)
    const arm = armOf(key, side)
    const carries = body.on === side
    const solved = leg.plant !== undefined && leg.thigh === undefined
    return {
      leg: carries || solved ? legMode(leg) : 'angles',
      arm: arm.hand ? 'hand' : 'angles',
      openHand: arm.open !== undefined,
    }
  }
  const numbers: PoseNumbers = {
    body: {
      pelvisX: body.at?.[0] ?? 0,
      pelvisY: body.at?.[1] ?? 0,
      pelvisZ: body.at?.[2] ?? 0,
      lean: body.lean,
      tilt: body.tilt ?? 0,
      round: body.round ?? 0,
      twist: body.twist ?? 0,
      nod: body.nod ?? 0,
    },
    near: numbersOf('near'),
    far: numbersOf('far'),
  }
  const modes: PoseModes = {
    root: body.on ?? 'at',
    near: modesOf('near'),
    far: modesOf('far'),
  }
  const joints = jointsOf(numbers, modes)
  numbers.body.pelvisX = joints.pelvis.x
  numbers.body.pelvisY = joints.pelvis.y
  numbers.body.pelvisZ = joints.pelvis.z
  for (const side of SIDES) fillFrom(joints, numbers, modes, side)
  return { numbers, modes }
}

function fillFrom(joints: Joints, numbers: PoseNumbers, modes: PoseModes, side: SideName): void {
  const its = numbers[side]
  const at = joints[side]
  if (modes[side].leg === 'ankle' || modes[side].leg === 'toes') {
    const thigh = anglesOf(unit(subtract(at.knee, at.hip)), side)
    const shank = anglesOf(unit(subtract(at.ankle, at.knee)), side)
    if (modes.root !== side) {
      its.thigh = thigh.pitch
      its.thighOut = thigh.out
      its.shank = shank.pitch
      its.shankOut = shank.out
    }
  }
  its.ankleX = at.ankle.x
  its.ankleY = at.ankle.y
  its.ankleZ = at.ankle.z
  its.toeX = at.toe.x
  its.toeY = at.toe.y
  its.toeZ = at.toe.z
  its.kneeX = at.knee.x
  its.kneeY = at.knee.y
  const heldAt = modes[side].openHand ? at.wrist : at.hand
  if (modes[side].arm === 'hand') {
    const upper = anglesOf(unit(subtract(at.elbow, at.shoulder)), side)
    const forearm = anglesOf(unit(subtract(at.wrist, at.elbow)), side)
    its.upper = upper.pitch
    its.upperOut = upper.out
    its.forearm = forearm.pitch
    its.forearmOut = forearm.out
  }
  its.handX = heldAt.x
  its.handY = heldAt.y
  its.handZ = heldAt.z
}
