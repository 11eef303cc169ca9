import type { ArmPose, FigureData, KeyPose } from '../types'
import { key } from './common'

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

export const JUMP_CRAWL = {
  'pogo-hop': {
    description:
      'Low, quick hops on the balls of both feet, knees soft, hands as if they turned a rope.',
    view: 'side',
    keys: [key(hopLow, 0.17), key(hopOff, 0.13), key(hopHigh, 0.13), key(hopDown, 0.17)],
    still: 2,
  },
} satisfies Record<string, FigureData>
