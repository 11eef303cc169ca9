/**
 * The outline of a posed figure: closed paths in thousandths of stature, y down, the floor at 0.
 * Every part is a union of tapered strokes with round ends, wound the same way, so that overlaps
 * stay filled and one ground-coloured edge runs round the whole part.
 */
import { ANKLE_HEIGHT, HEAD_HALF_LENGTH, HEEL_BACK } from '@/server/engine/figure/body'
import {
  CHAIR_BACK_HEIGHT,
  CHAIR_DEPTH,
  SEAT_HEIGHT,
  STEP_DEPTH,
  STEP_HEIGHT,
  TABLE_DEPTH,
  TABLE_HEIGHT,
} from '@/server/engine/figure/furniture'
import type { ArmJoints, FigureData, Joints, Kit, LegJoints } from '@/server/engine/figure/types'
import {
  along,
  between,
  cosine,
  sine,
  subtract,
  unit,
  vec,
  type Vec,
} from '@/server/engine/figure/vector'

export const UNITS_PER_STATURE = 1000
/** The gap in the ground's colour that cuts the near parts out from the body. */
export const GAP = 13

const RADII = {
  hip: 53,
  knee: 38,
  calf: 36,
  ankle: 27,
  heel: 24,
  toe: 19,
  shoulder: 31,
  elbow: 27,
  wrist: 23,
  hand: 26,
  palm: 17,
  pelvis: 57,
  waist: 51,
  ribs: 63,
  collar: 44,
  neck: 29,
  head: 55,
} as const

/**
 * From the side the far limbs are drawn a step ahead of the near ones, which stay on the body: that
 * tells depth without shading. The other views are as from a distance, turned by these degrees.
 */
const SIDE_STEP = { near: 0.12, far: 0.46 } as const
const YAW = { 'three-quarter': 42, front: 90 } as const

interface Flat {
  x: number
  y: number
}
interface Disc extends Flat {
  r: number
}

/** Where a point of the room lies in the drawing. */
function project(at: Vec, view: FigureData['view']): Flat {
  const x =
    view === 'side'
      ? at.x - at.z * (at.z > 0 ? SIDE_STEP.near : SIDE_STEP.far)
      : at.x * cosine(YAW[view]) - at.z * sine(YAW[view])
  return { x: x * UNITS_PER_STATURE, y: -at.y * UNITS_PER_STATURE }
}

const figure = (value: number): string => String(Math.round(value * 10) / 10)
const spot = (x: number, y: number): string => `${figure(x)} ${figure(y)}`

function discPath({ x, y, r }: Disc): string {
  const arc = `A${figure(r)} ${figure(r)} 0 1 1 `
  return `M${spot(x - r, y)}${arc}${spot(x + r, y)}${arc}${spot(x - r, y)}Z`
}

/** The outline of two discs and the straight lines that touch both. */
function taperedPath(a: Disc, b: Disc): string {
  const run = Math.hypot(b.x - a.x, b.y - a.y)
  if (run <= Math.abs(a.r - b.r) + 0.01) return discPath(a.r > b.r ? a : b)
  const heading = Math.atan2(b.y - a.y, b.x - a.x)
  const opening = Math.acos((a.r - b.r) / run)
  const on = (disc: Disc, angle: number) =>
    spot(disc.x + disc.r * Math.cos(angle), disc.y + disc.r * Math.sin(angle))
  const largeA = opening < Math.PI / 2 ? 1 : 0
  const largeB = opening > Math.PI / 2 ? 1 : 0
  return (
    `M${on(a, heading + opening)}A${figure(a.r)} ${figure(a.r)} 0 ${largeA} 1 ${on(a, heading - opening)}` +
    `L${on(b, heading - opening)}A${figure(b.r)} ${figure(b.r)} 0 ${largeB} 1 ${on(b, heading + opening)}Z`
  )
}

function polygonPath(points: readonly Flat[]): string {
  const area = points.reduce((sum, point, index) => {
    const next = points[(index + 1) % points.length] ?? point
    return sum + point.x * next.y - next.x * point.y
  }, 0)
  const ordered = area < 0 ? [...points].reverse() : points
  return `M${ordered.map((point) => spot(point.x, point.y)).join('L')}Z`
}

function strokePath(a: Flat, b: Flat, width: number): string {
  const run = Math.hypot(b.x - a.x, b.y - a.y) || 1
  const across = { x: ((a.y - b.y) / run) * (width / 2), y: ((b.x - a.x) / run) * (width / 2) }
  return polygonPath([
    { x: a.x + across.x, y: a.y + across.y },
    { x: b.x + across.x, y: b.y + across.y },
    { x: b.x - across.x, y: b.y - across.y },
    { x: a.x - across.x, y: a.y - across.y },
  ])
}

function ellipsePath(at: Flat, halfLength: number, halfWidth: number, upright: Flat): string {
  const length = Math.hypot(upright.x, upright.y) || 1
  const top = {
    x: at.x + (upright.x / length) * halfLength,
    y: at.y + (upright.y / length) * halfLength,
  }
  const bottom = { x: 2 * at.x - top.x, y: 2 * at.y - top.y }
  const turn = (Math.atan2(upright.y, upright.x) * 180) / Math.PI
  const arc = `A${figure(halfLength)} ${figure(halfWidth)} ${figure(turn)} 1 1 `
  return `M${spot(top.x, top.y)}${arc}${spot(bottom.x, bottom.y)}${arc}${spot(top.x, top.y)}Z`
}

export type PartName =
  | 'behind'
  | 'farKit'
  | 'farArm'
  | 'farLeg'
  | 'body'
  | 'nearLegCut'
  | 'nearLeg'
  | 'nearArm'
  | 'nearKit'
  | 'hands'
  | 'before'

export type Outline = Record<PartName, string>

function legPath(leg: LegJoints, view: FigureData['view'], from: number): string {
  const at = (point: Vec, r: number): Disc => ({ ...project(point, view), r })
  const underAnkle = along(leg.heel, unit(subtract(leg.toe, leg.heel)), HEEL_BACK)
  const up = unit(subtract(leg.ankle, underAnkle))
  const forward = unit(subtract(leg.toe, leg.heel))
  const heel = along(along(leg.heel, up, RADII.heel / 1000), forward, RADII.heel / 1000)
  const toe = along(along(leg.toe, up, RADII.toe / 1000), forward, -RADII.toe / 1000)
  const start = between(leg.hip, leg.knee, from)
  const startRadius = RADII.hip + (RADII.knee - RADII.hip) * from
  const calf = between(leg.knee, leg.ankle, 0.3)
  return (
    taperedPath(at(start, startRadius), at(leg.knee, RADII.knee)) +
    taperedPath(at(leg.knee, RADII.knee), at(calf, RADII.calf)) +
    taperedPath(at(calf, RADII.calf), at(leg.ankle, RADII.ankle)) +
    taperedPath(at(leg.ankle, Math.min(RADII.ankle, ANKLE_HEIGHT * 1000)), at(heel, RADII.heel)) +
    taperedPath(at(heel, RADII.heel), at(toe, RADII.toe))
  )
}

function armPath(arm: ArmJoints, open: boolean, view: FigureData['view']): string {
  const at = (point: Vec, r: number): Disc => ({ ...project(point, view), r })
  return (
    taperedPath(at(arm.shoulder, RADII.shoulder), at(arm.elbow, RADII.elbow)) +
    taperedPath(at(arm.elbow, RADII.elbow), at(arm.wrist, RADII.wrist)) +
    (open
      ? taperedPath(at(arm.wrist, RADII.wrist - 3), at(arm.hand, RADII.palm))
      : taperedPath(at(arm.wrist, RADII.wrist), at(arm.hand, RADII.hand)))
  )
}

function bodyPath(joints: Joints, view: FigureData['view']): string {
  const at = (point: Vec, r: number): Disc => ({ ...project(point, view), r })
  const { near, far, pelvis, waist, chest, head } = joints
  const ribs = between(waist, chest, 0.62)
  const neckTop = project(between(chest, head, 0.45), view)
  const headAt = project(head, view)
  const base = project(chest, view)
  // The shoulders and hips seen from the front are wider than the trunk is deep.
  const inward = (point: Vec, middle: Vec, part: number) => between(point, middle, part)
  const collarNear = at(inward(near.shoulder, chest, 0.4), RADII.collar)
  const collarFar = at(inward(far.shoulder, chest, 0.4), RADII.collar)
  const hipNear = at(inward(near.hip, pelvis, 0.25), RADII.pelvis)
  const hipFar = at(inward(far.hip, pelvis, 0.25), RADII.pelvis)
  const waistWide = between(near.hip, far.hip, 0.5)
  const toWaist = subtract(waist, waistWide)
  const waistNear = at(along(between(near.hip, pelvis, 0.15), toWaist, 1), RADII.waist)
  const waistFar = at(along(between(far.hip, pelvis, 0.15), toWaist, 1), RADII.waist)
  return (
    taperedPath(collarNear, collarFar) +
    taperedPath({ ...neckTop, r: RADII.neck }, { ...collarNear, r: RADII.collar - 4 }) +
    taperedPath({ ...neckTop, r: RADII.neck }, { ...collarFar, r: RADII.collar - 4 }) +
    taperedPath(collarNear, waistNear) +
    taperedPath(collarFar, waistFar) +
    taperedPath(at(ribs, RADII.ribs), at(chest, RADII.collar)) +
    taperedPath(at(ribs, RADII.ribs), at(waist, RADII.waist)) +
    taperedPath(waistNear, hipNear) +
    taperedPath(waistFar, hipFar) +
    taperedPath(hipNear, hipFar) +
    taperedPath(at(waist, RADII.waist), at(pelvis, RADII.pelvis)) +
    taperedPath({ ...base, r: RADII.neck + 6 }, { ...neckTop, r: RADII.neck }) +
    taperedPath({ ...neckTop, r: RADII.neck }, { ...headAt, r: RADII.neck }) +
    ellipsePath(headAt, HEAD_HALF_LENGTH * 1000 + 3, RADII.head, {
      x: headAt.x - base.x,
      y: headAt.y - base.y,
    })
  )
}

const turned = (by: Flat): Flat => ({ x: -by.y, y: by.x })

function roundedBar(
  middle: Flat,
  axis: Flat,
  halfLength: number,
  halfWidth: number,
  r: number,
): string {
  const across = turned(axis)
  const corner = (a: number, b: number): Disc => ({
    x: middle.x + axis.x * a * (halfLength - r) + across.x * b * (halfWidth - r),
    y: middle.y + axis.y * a * (halfLength - r) + across.y * b * (halfWidth - r),
    r,
  })
  const corners = [corner(-1, -1), corner(1, -1), corner(1, 1), corner(-1, 1)] as const
  return (
    taperedPath(corners[0], corners[1]) +
    taperedPath(corners[1], corners[2]) +
    taperedPath(corners[2], corners[3]) +
    taperedPath(corners[3], corners[0]) +
    polygonPath(corners)
  )
}

function dumbbellPath(grip: Flat, axis: Flat): string {
  const head = (way: number): Flat => ({
    x: grip.x + axis.x * 68 * way,
    y: grip.y + axis.y * 68 * way,
  })
  return (
    roundedBar(grip, axis, 66, 15, 4) +
    roundedBar(head(-1), axis, 27, 42, 13) +
    roundedBar(head(1), axis, 27, 42, 13)
  )
}

function kettlebellPath(grip: Flat, hangs: Flat): string {
  const across = turned(hangs)
  const point = (down: number, out: number): Flat => ({
    x: grip.x + hangs.x * down + across.x * out,
    y: grip.y + hangs.y * down + across.y * out,
  })
  const bell: Disc = { ...point(98, 0), r: 58 }
  const bar = (a: Flat, b: Flat) => taperedPath({ ...a, r: 13 }, { ...b, r: 13 })
  return (
    discPath(bell) +
    bar(point(0, -32), point(0, 32)) +
    bar(point(0, -32), point(62, -42)) +
    bar(point(0, 32), point(62, 42))
  )
}

function flatUnit(from: Flat, to: Flat): Flat {
  const run = Math.hypot(to.x - from.x, to.y - from.y)
  return run < 1 ? { x: 0, y: 1 } : { x: (to.x - from.x) / run, y: (to.y - from.y) / run }
}

function heldPath(kit: Kit, arm: ArmJoints, view: FigureData['view']): string {
  const grip = project(arm.hand, view)
  const forearm = flatUnit(project(arm.elbow, view), grip)
  if (kit.kind === 'kettlebell') return kettlebellPath(grip, forearm)
  if (kit.kind !== 'dumbbell') return ''
  if (kit.hold === 'end-on') return roundedBar(grip, { x: 1, y: 0 }, 41, 41, 14)
  if (kit.hold === 'hanging') {
    return dumbbellPath({ x: grip.x + forearm.x * 62, y: grip.y + forearm.y * 62 }, forearm)
  }
  const axis =
    kit.hold === 'upright'
      ? { x: 0, y: 1 }
      : kit.hold === 'level'
        ? { x: 1, y: 0 }
        : turned(forearm)
  return dumbbellPath(grip, axis)
}

const SEAT = SEAT_HEIGHT * UNITS_PER_STATURE
const DEPTH = CHAIR_DEPTH * UNITS_PER_STATURE
const BACK = CHAIR_BACK_HEIGHT * UNITS_PER_STATURE
const TABLE = TABLE_HEIGHT * UNITS_PER_STATURE
const TABLE_WIDTH = TABLE_DEPTH * UNITS_PER_STATURE
const STEP = STEP_HEIGHT * UNITS_PER_STATURE
const STEP_WIDTH = STEP_DEPTH * UNITS_PER_STATURE
const WOOD = 26
const WALL = 74

function furniturePath(kit: Kit): string {
  const box = (left: number, top: number, right: number, bottom: number) =>
    polygonPath([
      { x: left, y: top },
      { x: right, y: top },
      { x: right, y: bottom },
      { x: left, y: bottom },
    ])
  if (kit.kind === 'chair') {
    const x = kit.x * 1000
    const way = kit.facing === 'right' ? 1 : -1
    const span = (a: number, b: number) => [Math.min(a, b), Math.max(a, b)] as const
    const [seatLeft, seatRight] = span(x, x + way * DEPTH)
    const [backLeft, backRight] = span(x, x + way * WOOD)
    const [legLeft, legRight] = span(x + way * (DEPTH - WOOD), x + way * DEPTH)
    return (
      box(seatLeft, -SEAT, seatRight, -SEAT + WOOD) +
      box(backLeft, -BACK, backRight, 0) +
      box(legLeft, -SEAT, legRight, 0)
    )
  }
  if (kit.kind === 'table') {
    const x = kit.x * 1000
    return (
      box(x, -TABLE, x + TABLE_WIDTH, -TABLE + WOOD) +
      box(x + 40, -TABLE, x + 40 + WOOD, 0) +
      box(x + TABLE_WIDTH - 66, -TABLE, x + TABLE_WIDTH - 66 + WOOD, 0)
    )
  }
  if (kit.kind === 'wall') {
    const face = kit.x * 1000
    return kit.x > 0
      ? box(face, -1120, face + WALL, 0)
      : box(face + WOOD - WALL, -1120, face + WOOD, 0)
  }
  if (kit.kind === 'step') return box(kit.x * 1000, -STEP, kit.x * 1000 + STEP_WIDTH, 0)
  if (kit.kind === 'mat') return box(kit.from * 1000, -12, kit.to * 1000, 0)
  return ''
}

function bandPath(
  kit: Kit,
  joints: Joints,
  side: 'near' | 'far',
  view: FigureData['view'],
): string {
  if (kit.kind !== 'band') return ''
  const hand = project(joints[side].hand, view)
  const from =
    kit.from === 'other-hand'
      ? project(joints[side === 'near' ? 'far' : 'near'].hand, view)
      : project(vec(kit.from[0], kit.from[1], kit.from[2] ?? 0), view)
  return strokePath(from, hand, 14)
}

const holds = (kit: Kit, side: 'near' | 'far'): boolean =>
  'hand' in kit && (kit.hand === side || kit.hand === 'both')

/** All parts of a figure at a moment. `open` tells which hands lie flat. */
export function outlineOf(
  joints: Joints,
  figureData: FigureData,
  open: { near: boolean; far: boolean },
): Outline {
  const { view } = figureData
  const kits = figureData.kit ?? []
  const held = (side: 'near' | 'far') =>
    kits
      .filter((kit) => holds(kit, side))
      .map((kit) => heldPath(kit, joints[side], view) + bandPath(kit, joints, side, view))
      .join('')
  const nearKit = held('near')
  const farKit = held('far')
  const hand = (side: 'near' | 'far') => {
    const endOn = kits.some((kit) => holds(kit, side) && 'hold' in kit && kit.hold === 'end-on')
    return endOn ? '' : discPath({ ...project(joints[side].hand, view), r: RADII.hand })
  }
  return {
    behind: kits
      .filter((kit) => !('near' in kit && kit.near))
      .map(furniturePath)
      .join(''),
    farKit,
    farArm: armPath(joints.far, open.far, view),
    farLeg: legPath(joints.far, view, 0),
    body: bodyPath(joints, view),
    nearLegCut: legPath(joints.near, view, 0.45),
    nearLeg: legPath(joints.near, view, 0),
    nearArm: armPath(joints.near, open.near, view),
    nearKit,
    hands: (nearKit ? hand('near') : '') + (view !== 'side' && farKit ? hand('far') : ''),
    before: kits
      .filter((kit) => 'near' in kit && kit.near)
      .map(furniturePath)
      .join(''),
  }
}

export interface Extent {
  left: number
  right: number
  top: number
}

/** The room a figure needs over its whole movement, in the outline's units. */
export function extentOf(poses: readonly Joints[], figureData: FigureData): Extent {
  const { view } = figureData
  let left = Infinity
  let right = -Infinity
  let top = 0
  const cover = (at: Flat, r: number) => {
    left = Math.min(left, at.x - r)
    right = Math.max(right, at.x + r)
    top = Math.min(top, at.y - r)
  }
  for (const joints of poses) {
    cover(project(joints.head, view), 70)
    cover(project(joints.pelvis, view), 64)
    for (const side of ['near', 'far'] as const) {
      const limb = joints[side]
      cover(project(limb.shoulder, view), 44)
      cover(project(limb.elbow, view), 32)
      cover(project(limb.knee, view), 40)
      cover(project(limb.toe, view), 8)
      cover(project(limb.heel, view), 8)
      const kit = (figureData.kit ?? []).find((each) => holds(each, side))
      const room = kit?.kind === 'dumbbell' ? 98 : kit?.kind === 'kettlebell' ? 110 : 30
      cover(project(limb.hand, view), room)
      if (kit?.kind === 'kettlebell') {
        const grip = project(limb.hand, view)
        const way = flatUnit(project(limb.elbow, view), grip)
        cover({ x: grip.x + way.x * 98, y: grip.y + way.y * 98 }, 60)
      }
    }
  }
  for (const kit of figureData.kit ?? []) {
    if (kit.kind === 'chair') {
      const end = kit.x * 1000 + (kit.facing === 'right' ? 1 : -1) * DEPTH
      cover({ x: kit.x * 1000, y: -BACK }, 0)
      cover({ x: end, y: 0 }, 0)
    }
    if (kit.kind === 'table' || kit.kind === 'step') {
      cover({ x: kit.x * 1000, y: 0 }, 0)
      cover({ x: kit.x * 1000 + (kit.kind === 'table' ? TABLE_WIDTH : STEP_WIDTH), y: 0 }, 0)
    }
    if (kit.kind === 'wall')
      cover({ x: kit.x * 1000 + (kit.x > 0 ? WALL : WOOD - WALL), y: -1120 }, 0)
    if (kit.kind === 'mat') {
      cover({ x: kit.from * 1000, y: 0 }, 0)
      cover({ x: kit.to * 1000, y: 0 }, 0)
    }
    if (kit.kind === 'band' && kit.from !== 'other-hand') {
      cover(project(vec(kit.from[0], kit.from[1]), view), 10)
    }
  }
  return { left: left - GAP, right: right + GAP, top: top - GAP }
}
