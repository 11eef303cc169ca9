/**
 * A figure's data: key positions with seconds between them. Angles are degrees in the room, not
 * against the neighbouring bone, since a coach sees a shin or a back against the upright:
 * a limb's angle is 0 hanging straight down, 90 pointing forward, 180 straight up; the trunk's is 0
 * upright, 90 bent to the horizontal (face down), -90 lying face up. Lengths are fractions of stature.
 */
import type { Tempo } from '../spec/schema'
import type { Vec } from './vector'

export type Point = readonly [x: number, y: number, z?: number]

/** What holds a foot in place: its flat sole (the point lies under the ankle), its toes, or the knee. */
export type Plant =
  | { sole: Point }
  /** `lift`: the foot's slope, 0 flat, 90 heel straight above the toes, 180 lying on its back. */
  | { toes: Point; lift: number }
  | { knee: Point }

export interface LegPose {
  plant?: Plant
  /** Without them a planted leg is solved from hip to ankle. */
  thigh?: number
  shank?: number
  /** Sideways, away from the middle. */
  thighOut?: number
  shankOut?: number
  /** A free foot's slope against the shank: 0 square to it, positive with the toes pointed. */
  pointed?: number
  /** A foot's slope in the room, where `pointed` would be awkward. */
  slope?: number
  toesOut?: number
  /** Room angle towards which the knee of a solved leg bends; without it to the body's front. */
  kneeTowards?: number
}

export interface ArmPose {
  upper?: number
  forearm?: number
  upperOut?: number
  forearmOut?: number
  /** Where the closed hand's grip (or the open hand's wrist) is held: the arm is solved to it. */
  hand?: Point
  /** Sideways pull on a solved elbow, 0 none, 1 as much as back or down. */
  elbowOut?: number
  /** Room angle towards which the elbow of a solved arm bends. */
  elbowTowards?: number
  /** An open hand, pointing along this room angle (90: flat on the floor, fingers forward). */
  open?: number
}

export interface BodyPose {
  /** Middle of the hips. Without it the body stands on the leg (or arm) named by `on`. */
  at?: Point
  /** The leg, with angles and plant given, that carries the body. */
  on?: 'near' | 'far'
  lean: number
  /** Sideways lean, towards the near side. */
  tilt?: number
  /** Rounding of the spine: positive rounds, negative arches. */
  round?: number
  /** Turn of the shoulders against the hips, positive brings the far shoulder forward. */
  twist?: number
  /** The head against the upper trunk, positive nods. */
  nod?: number
}

/** Which of the tempo's four figures a way belongs to: the eccentric, the bottom, the concentric, the top. */
export type TempoPart = 'down' | 'bottom' | 'up' | 'top'

export interface KeyPose {
  body: BodyPose
  legs?: LegPose
  nearLeg?: LegPose
  farLeg?: LegPose
  arms?: ArmPose
  nearArm?: ArmPose
  farArm?: ArmPose
}

export interface Key extends KeyPose {
  /** Seconds to the next key (from the last: back to the first), as drawn without a tempo. */
  seconds: number
  part?: TempoPart
  /** This key is where the lowering ends, or where the lift ends: a tempo's pauses are held here. */
  end?: 'bottom' | 'top'
}

export type Kit =
  | {
      kind: 'dumbbell' | 'kettlebell'
      hand: 'near' | 'far' | 'both'
      hold?: 'across' | 'upright' | 'level' | 'hanging' | 'end-on'
    }
  /** From a fixed point, or the other hand, to the hand. */
  | { kind: 'band'; from: Point | 'other-hand'; hand: 'near' | 'far' | 'both' }
  | { kind: 'chair'; x: number; facing: 'left' | 'right'; near?: boolean }
  | { kind: 'table' | 'wall' | 'step'; x: number }
  | { kind: 'mat'; from: number; to: number }

export interface FigureData {
  /** One sentence for those who cannot see it. */
  description: string
  /** Degrees that the viewer has walked round: 0 from the side, 90 from the front. */
  view: 'side' | 'three-quarter' | 'front'
  keys: readonly [Key, ...Key[]]
  /** Reps in one cycle of the keys: 2 where the sides change. */
  reps?: 1 | 2
  kit?: readonly Kit[]
  /**
   * The position that shows the movement best when it stands still, as an index of the keys, which
   * may lie between two (0.5: half-way from the first to the second); without it the middle key.
   */
  still?: number
}

/** A movement's planned pace; over `secondsPerRep` where both are given. */
export interface FigureTiming {
  tempo?: Tempo | undefined
  secondsPerRep?: number | undefined
}

export interface ArmJoints {
  shoulder: Vec
  elbow: Vec
  wrist: Vec
  /** Middle of the closed hand, or the open hand's knuckles. */
  hand: Vec
}

export interface LegJoints {
  hip: Vec
  knee: Vec
  ankle: Vec
  heel: Vec
  toe: Vec
}

export interface Joints {
  pelvis: Vec
  waist: Vec
  chest: Vec
  head: Vec
  near: ArmJoints & LegJoints
  far: ArmJoints & LegJoints
}
