import { describe, expect, it } from 'vitest'
import { figureOf, motionOf, poseAt, timeKeys } from '@/server/engine/figure/motion'
import { FIGURES } from '@/server/engine/figure/figures'
import { armOf, legOf, type SideName } from '@/server/engine/figure/pose'
import { FIGURE_SLUGS, isFigureSlug } from '@/server/engine/figure/slugs'
import { distance, type Vec } from '@/server/engine/figure/vector'
import type { Joints, Plant } from '@/server/engine/figure/types'

/** One per cent of stature: what issue 4 allows a planted hand or foot to slide or sink. */
const SLACK = 0.01
const SIDES: readonly SideName[] = ['near', 'far']

function frames(slug: string, count = 90): Joints[] {
  const motion = motionOf(slug)
  return Array.from({ length: count }, (_, index) => motion.at((motion.cycleMs * index) / count))
}

/** Length fractions of stature. Source: Winter fig. 4.1 after Drillis and Contini 1966. */
const WINTER = { upperArm: 0.186, forearm: 0.146, thigh: 0.245, shank: 0.246, foot: 0.152 }

describe.each(FIGURE_SLUGS)('%s', (slug) => {
  it('keeps every bone at its published length in every frame', () => {
    for (const joints of frames(slug)) {
      for (const side of SIDES) {
        const limb = joints[side]
        expect(distance(limb.shoulder, limb.elbow)).toBeCloseTo(WINTER.upperArm, 6)
        expect(distance(limb.elbow, limb.wrist)).toBeCloseTo(WINTER.forearm, 6)
        expect(distance(limb.hip, limb.knee)).toBeCloseTo(WINTER.thigh, 6)
        expect(distance(limb.knee, limb.ankle)).toBeCloseTo(WINTER.shank, 6)
        expect(distance(limb.heel, limb.toe)).toBeCloseTo(WINTER.foot, 6)
      }
      const spine = distance(joints.pelvis, joints.waist) + distance(joints.waist, joints.chest)
      expect(spine).toBeCloseTo(0.818 - 0.53, 6)
    }
  })

  it('sinks no hand, foot or knee under the floor', () => {
    for (const joints of frames(slug)) {
      for (const side of SIDES) {
        const { heel, toe, knee, elbow, wrist, hand } = joints[side]
        for (const point of [heel, toe, knee, elbow, wrist, hand]) {
          expect(point.y).toBeGreaterThan(-SLACK)
        }
      }
      expect(joints.head.y).toBeGreaterThan(0.04)
    }
  })

  it('lets no planted foot, knee or hand slide', () => {
    const figure = FIGURES[slug]
    const motion = motionOf(slug)
    figure.keys.forEach((key, index) => {
      const nextIndex = (index + 1) % figure.keys.length
      const next = figure.keys[nextIndex]
      const start = motion.keyStartsMs[index]
      if (!next || start === undefined || key.seconds === 0) return
      const end =
        nextIndex === 0 ? motion.cycleMs : (motion.keyStartsMs[nextIndex] ?? motion.cycleMs)
      for (const side of SIDES) {
        const held = heldPoint(legOf(key, side).plant, legOf(next, side).plant, side)
        const hands = [armOf(key, side), armOf(next, side)]
        const sameHand =
          hands[0]?.hand !== undefined && String(hands[0].hand) === String(hands[1]?.hand)
        const first = motion.at(start)
        for (let part = 0; part <= 1; part += 0.1) {
          const joints = motion.at(start + (end - start) * part * 0.999)
          if (held) expect(distance(held(joints), held(first))).toBeLessThan(SLACK)
          if (sameHand) {
            const wristOrGrip = hands[0]?.open === undefined ? 'hand' : 'wrist'
            expect(distance(joints[side][wristOrGrip], first[side][wristOrGrip])).toBeLessThan(
              SLACK,
            )
          }
        }
      }
    })
  })

  it('moves without a jump from frame to frame', () => {
    const motion = motionOf(slug)
    let last = motion.at(0)
    for (let ms = 1000 / 60; ms <= motion.cycleMs; ms += 1000 / 60) {
      const joints = motion.at(ms)
      for (const side of SIDES) {
        for (const name of ['hand', 'elbow', 'knee', 'toe'] as const) {
          expect(distance(joints[side][name], last[side][name])).toBeLessThan(0.08)
        }
      }
      last = joints
    }
  })

  it('is told in words', () => {
    expect(FIGURES[slug].description).toMatch(/^[A-Z].{10,}\.$/)
  })
})

function heldPoint(
  from: Plant | undefined,
  to: Plant | undefined,
  side: SideName,
): ((joints: Joints) => Vec) | null {
  if (!from || !to || JSON.stringify({ ...from, lift: 0 }) !== JSON.stringify({ ...to, lift: 0 })) {
    return null
  }
  if ('sole' in from) return (joints) => joints[side].ankle
  if ('toes' in from) return (joints) => joints[side].toe
  return (joints) => joints[side].knee
}

describe('timing', () => {
  it('gives the eccentric, the bottom, the concentric and the top the seconds of the tempo', () => {
    const { keys, cycleSeconds } = timeKeys(figureOf('goblet-squat'), { tempo: [3, 1, 2, 0.5] })
    expect(cycleSeconds).toBeCloseTo(6.5, 6)
    // Top held half a second, three down, one at the bottom, two up.
    expect(keys.map((key) => key.startSeconds)).toEqual([0, 0.5, expect.closeTo(3.5, 9), 4.5])
  })

  it('makes a cycle with both sides last as long as two reps', () => {
    expect(motionOf('dead-bug', { tempo: [2, 0, 2, 0] }).cycleMs).toBeCloseTo(8000, 6)
    expect(motionOf('march-in-place', { secondsPerRep: 0.6 }).cycleMs).toBeCloseTo(1200, 6)
  })

  it.each(FIGURE_SLUGS)('keeps the planned seconds per rep of %s', (slug) => {
    const motion = motionOf(slug, { tempo: [2, 1, 1, 1], secondsPerRep: 9 })
    expect(motion.cycleMs / motion.reps).toBeCloseTo(5000, 3)
    const plain = motionOf(slug, { secondsPerRep: 3 })
    expect(plain.cycleMs / plain.reps).toBeCloseTo(3000, 3)
  })

  it('repeats: a cycle later the pose is the same', () => {
    const motion = motionOf('reverse-lunge')
    expect(
      distance(motion.at(700).near.knee, motion.at(700 + motion.cycleMs).near.knee),
    ).toBeLessThan(1e-9)
    expect(distance(motion.at(-300).head, motion.at(motion.cycleMs - 300).head)).toBeLessThan(1e-9)
  })
})

describe('names', () => {
  it('stands where a name is not known', () => {
    expect(isFigureSlug('handstand-walk')).toBe(false)
    expect(poseAt('handstand-walk', 0)).toEqual(poseAt('standing', 0))
  })

  it('names nothing twice', () => {
    expect(new Set(FIGURE_SLUGS).size).toBe(FIGURE_SLUGS.length)
    expect(Object.keys(FIGURES).sort()).toEqual([...FIGURE_SLUGS].sort())
  })
})
