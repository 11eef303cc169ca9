/** How large text must be on this screen to be read from where the member stands. */

/** Cap height in minutes of arc: ISO 9241-303 names 20 to 22 as preferred, 16 as the least. */
export const CAP_ARC_MINUTES = 22
/** Cap height of the text face as a share of its size, measured from the shipped font file. */
export const CAP_RATIO = 0.671
const MM_PER_INCH = 25.4

/** Height in millimetres of what subtends `arcMinutes` at `distanceMetres`: 2·d·tan(θ/2). */
export function heightMm(distanceMetres: number, arcMinutes: number): number {
  return 2 * distanceMetres * 1_000 * Math.tan((arcMinutes * Math.PI) / 10_800 / 2)
}

export interface Screen {
  diagonalInches: number
  distanceMetres: number
  /** The whole screen in CSS pixels. */
  widthPx: number
  heightPx: number
}

/** Font size in CSS pixels at which the text face's capitals subtend `CAP_ARC_MINUTES`. */
export function distanceTextPx(screen: Screen): number {
  const pxPerMm =
    Math.hypot(screen.widthPx, screen.heightPx) / (screen.diagonalInches * MM_PER_INCH)
  return (heightMm(screen.distanceMetres, CAP_ARC_MINUTES) * pxPerMm) / CAP_RATIO
}

/** Shorter side, in CSS pixels, below which a touched screen is a phone's. */
const PHONE_PX = 600

/** The screen that a browser most likely runs on: a phone in the hand, or a laptop at two metres. */
export function usualScreen(shortSidePx: number, isTouched: boolean) {
  return isTouched && shortSidePx < PHONE_PX
    ? { screenDiagonalInches: 6, distanceMetres: 0.4 }
    : { screenDiagonalInches: 14, distanceMetres: 2 }
}
