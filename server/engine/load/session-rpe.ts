/** Session rating of perceived exertion: how hard the whole class felt, and the load it stands for. */

interface RpeAnchor {
  rating: number
  /** Null where the scale has a number without words. */
  anchor: string | null
}

/**
 * The CR-10 scale as modified by Foster, with its verbal anchors: Egan AD et al., J Sports Sci Med
 * 2006;5:289-295, table 1.
 */
export const CR10_ANCHORS: readonly RpeAnchor[] = [
  { rating: 0, anchor: 'Rest' },
  { rating: 1, anchor: 'Very, very easy' },
  { rating: 2, anchor: 'Easy' },
  { rating: 3, anchor: 'Moderate' },
  { rating: 4, anchor: 'Somewhat hard' },
  { rating: 5, anchor: 'Hard' },
  { rating: 6, anchor: null },
  { rating: 7, anchor: 'Very hard' },
  { rating: 8, anchor: null },
  { rating: 9, anchor: null },
  { rating: 10, anchor: 'Maximal' },
]

/** Asked after class. */
export const RPE_QUESTION = 'How hard was the whole class for you?'

/**
 * Session load in arbitrary units: rating (0 to 10) × minutes, 0 or more (Foster et al., J Strength
 * Cond Res 2001;15(1):109-115). Null where either is not a usable number. An estimate.
 */
export function sessionLoad(rpe: number, minutes: number): number | null {
  if (!(rpe >= 0 && rpe <= 10) || !(minutes >= 0) || !Number.isFinite(minutes)) return null
  return rpe * minutes
}
