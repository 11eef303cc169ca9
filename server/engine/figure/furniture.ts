/** What figures sit, lean and step on, in fractions of a stature of 1.70 m: a chair of 45 cm, a table of 68 cm, a step of 27 cm. */
export const SEAT_HEIGHT = 0.265
export const CHAIR_DEPTH = 0.235
export const CHAIR_BACK_HEIGHT = 0.5
export const TABLE_HEIGHT = 0.4
export const TABLE_DEPTH = 0.3
export const STEP_HEIGHT = 0.16
export const STEP_DEPTH = 0.3
