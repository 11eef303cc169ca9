import type { ArmPose, FigureData, KeyPose, LegPose } from '../types'
import { key, STANDING_HIPS } from './common'

/** Elbows at the ribs, hands out in front as with a rope. */
const rope = (forearm: number): ArmPose => ({ upper: -14, upperOut: 6, forearm, forearmOut: 18 })
const BALLS = [0.112, 0] as const

const hopLow: KeyPose = {
  body: { at: [0.045, 0.522], lean: 3 },
  legs: { plant: { toes: BALLS, lift: 10 } },
  arms: rope(56),
}
const hopOff: KeyPose = {
  body: { at: [0.05, 0.576], lean: 1 },
  legs: { plant: { toes: BALLS, lift: 34 } },
  arms: rope(66),
}
const hopHigh: KeyPose = {
  body: { at: [0.05, 0.62], lean: 1 },
  legs: { thigh: 5, shank: -6, pointed: 34 },
  arms: rope(72),
}
const hopDown: KeyPose = { ...hopOff, arms: rope(58) }

const crawlHand = (x: number, y = 0): ArmPose => ({
  hand: [0.29 + x, 0.022 + y],
  open: 90,
  elbowTowards: -60,
})
const crawlFoot = (x: number, y = 0): LegPose => ({
  plant: { toes: [-0.225 + x, y], lift: 62 },
})
/** `near`: how far the near hand and the far foot have come; `far`: the other pair; `lift`: who is in the air. */
const crawl = (near: number, far: number, lift: 'near' | 'far' | 'none' = 'none'): KeyPose => {
  const nearHand = lift === 'near' ? 0.045 : 0
  const farHand = lift === 'far' ? 0.045 : 0
  return {
    body: { at: [(near + far) / 2, 0.362], lean: 91, nod: -18 },
    nearArm: crawlHand(near, nearHand),
    farLeg: crawlFoot(near, nearHand * 0.7),
    farArm: crawlHand(far, farHand),
    nearLeg: crawlFoot(far, farHand * 0.7),
  }
}
const CRAWL_STEP = 0.12

const openHanging: ArmPose = { upper: 2, forearm: 12, open: 10 }
const FLOOR_HANDS: ArmPose = { hand: [0.33, 0.022], open: 90 }
const BURPEE_FEET: LegPose = { plant: { toes: [0.112, 0], lift: 0 } }
const PLANK_FEET: LegPose = { plant: { toes: [-0.37, 0], lift: 65 } }
const burpeeStand: KeyPose = {
  body: { at: [0, STANDING_HIPS], lean: 0 },
  legs: BURPEE_FEET,
  arms: openHanging,
}
const burpeeCrouch: KeyPose = {
  body: { at: [-0.05, 0.27], lean: 76, round: 34, nod: -30 },
  legs: { plant: { toes: [0.112, 0], lift: 10 }, kneeTowards: 80 },
  arms: FLOOR_HANDS,
}
/** Both feet off the floor at once, the weight on the hands. */
const burpeeFeetFly: KeyPose = {
  body: { at: [0, 0.352], lean: 88, round: 12, nod: -20 },
  legs: { thigh: 36, shank: -84, slope: 58 },
  arms: FLOOR_HANDS,
}
const burpeePlank: KeyPose = {
  body: { at: [0.085, 0.267], lean: 72.4, nod: -8 },
  legs: PLANK_FEET,
  arms: FLOOR_HANDS,
}
const burpeeRise: KeyPose = {
  body: { at: [-0.07, 0.36], lean: 40, nod: -10 },
  legs: { plant: { toes: [0.112, 0], lift: 6 }, kneeTowards: 70 },
  arms: { upper: 24, forearm: 40, open: 40 },
}
const burpeeOff: KeyPose = {
  body: { at: [0.05, 0.58], lean: 2 },
  legs: { plant: { toes: [0.112, 0], lift: 42 } },
  arms: { upper: 130, forearm: 140, open: 140 },
}
const burpeeUp: KeyPose = {
  body: { at: [0.05, 0.65], lean: 0 },
  legs: { thigh: 6, shank: -10, pointed: 42 },
  arms: { upper: 168, forearm: 172, open: 172 },
}
const burpeeLand: KeyPose = {
  body: { at: [-0.03, 0.47], lean: 14, nod: -4 },
  legs: { plant: { toes: [0.112, 0], lift: 4 }, kneeTowards: 80 },
  arms: { upper: 50, forearm: 66, open: 60 },
}

export const JUMP_CRAWL = {
  'pogo-hop': {
    description:
      'Low, quick hops on the balls of both feet, knees soft, hands as if they turned a rope.',
    view: 'side',
    keys: [key(hopLow, 0.17), key(hopOff, 0.13), key(hopHigh, 0.13), key(hopDown, 0.17)],
    still: 2,
  },
  'bear-crawl': {
    description:
      'On hands and toes, knees low, one hand and the opposite foot step forward, then the other pair, and back again.',
    view: 'side',
    reps: 2,
    keys: [
      key(crawl(0, 0), 0.3),
      key(crawl(CRAWL_STEP * 0.55, 0, 'near'), 0.3),
      key(crawl(CRAWL_STEP, 0), 0.3),
      key(crawl(CRAWL_STEP, CRAWL_STEP * 0.55, 'far'), 0.3),
      key(crawl(CRAWL_STEP, CRAWL_STEP), 0.3),
      key(crawl(CRAWL_STEP * 0.45, CRAWL_STEP, 'near'), 0.3),
      key(crawl(0, CRAWL_STEP), 0.3),
      key(crawl(0, CRAWL_STEP * 0.45, 'far'), 0.3),
    ],
    still: 2,
  },
  burpee: {
    description:
      'Hands to the floor, both feet hop back to a plank and in again, then a small jump with the arms up.',
    view: 'side',
    keys: [
      key(burpeeStand, 0.6),
      key(burpeeCrouch, 0.25),
      key(burpeeFeetFly, 0.25),
      key(burpeePlank, 0.6),
      key(burpeeFeetFly, 0.25),
      key(burpeeCrouch, 0.35),
      key(burpeeRise, 0.32),
      key(burpeeOff, 0.22),
      key(burpeeUp, 0.22),
      key(burpeeOff, 0.3),
      key(burpeeLand, 0.45),
    ],
    still: 3,
  },
} satisfies Record<string, FigureData>
