/**
 * The body that every figure shares, in fractions of stature (1 = standing height).
 * Source: Winter DA, Biomechanics and Motor Control of Human Movement, fig. 4.1, after Drillis R and
 * Contini R, Body Segment Parameters (1966).
 */
export const UPPER_ARM = 0.186
export const FOREARM = 0.146
export const THIGH = 0.245
export const SHANK = 0.246
export const ANKLE_HEIGHT = 0.039
export const FOOT_LENGTH = 0.152
export const HIP_HEIGHT = 0.53
export const SHOULDER_HEIGHT = 0.818
export const CHIN_HEIGHT = 0.87
/** Outer breadths: acromion to acromion, and over the hips. */
export const SHOULDER_BREADTH = 0.259
export const HIP_BREADTH = 0.191

export const TRUNK = SHOULDER_HEIGHT - HIP_HEIGHT
/** The spine bends here: the part of the trunk that goes with the pelvis. */
export const LOWER_TRUNK = TRUNK * 0.42
export const UPPER_TRUNK = TRUNK - LOWER_TRUNK
/** From the middle of the shoulders to the middle of the head. */
export const NECK_AND_HEAD = (CHIN_HEIGHT + 1) / 2 - SHOULDER_HEIGHT
export const HEAD_HALF_LENGTH = (1 - CHIN_HEIGHT) / 2

/** The closed hand's grip lies this far beyond the wrist; an open hand reaches to its knuckles. */
export const GRIP = 0.042
export const OPEN_HAND = 0.082
/** How far the heel lies behind the ankle. */
export const HEEL_BACK = 0.04
export const TOE_FORWARD = FOOT_LENGTH - HEEL_BACK

/** The joints lie half a limb inside the outer breadths, so that the drawn outline has them. */
export const SHOULDER_HALF = SHOULDER_BREADTH / 2 - 0.029
export const HIP_HALF = HIP_BREADTH / 2 - 0.043
