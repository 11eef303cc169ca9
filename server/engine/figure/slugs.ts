/**
 * Every drawn figure by name. Movements and options refer to these (`figure` in movement.ts);
 * a name that is not among them is drawn as `standing`.
 */
export const FIGURE_SLUGS = [
  'standing',
  // Warm-up, cardio
  'march-in-place',
  'high-knees',
  'seated-march',
  'knee-raise',
  'arm-circles',
  'shoulder-rolls',
  'jumping-jack',
  'step-jack',
  'side-step',
  'skater-hop',
  'mountain-climber',
  'incline-mountain-climber',
  'burpee-step-back',
  'burpee',
  'pogo-hop',
  'bear-crawl',
  // Squat
  'squat',
  'goblet-squat',
  'front-squat',
  'wide-squat',
  'chair-squat',
  'squat-jump',
  'squat-to-press',
  'wall-sit',
  'calf-raise',
  // Lunge
  'reverse-lunge',
  'supported-lunge',
  'forward-lunge',
  'side-lunge',
  'split-squat',
  'rear-foot-raised-split-squat',
  'step-up',
  'kneel-to-stand',
  // Hinge
  'hip-hinge',
  'romanian-deadlift',
  'single-leg-deadlift',
  'suitcase-deadlift',
  'kettlebell-deadlift',
  'band-deadlift',
  'dumbbell-swing',
  'kettlebell-swing',
  'glute-bridge',
  'single-leg-bridge',
  'hip-thrust',
  // Push
  'push-up',
  'incline-push-up',
  'knee-push-up',
  'wall-push-up',
  'floor-press',
  'standing-press',
  'seated-press',
  'half-kneeling-press',
  'lateral-raise',
  // Pull and carry
  'bent-over-row',
  'supported-row',
  'band-row',
  'band-pull-apart',
  'curl',
  'suitcase-march',
  'farmer-march',
  'goblet-march',
  'overhead-march',
  'suitcase-hold',
  // Core
  'dead-bug',
  'heel-taps',
  'plank',
  'knee-plank',
  'incline-plank',
  'side-plank',
  'knee-side-plank',
  'bird-dog',
  // Mobility
  'cat-cow',
  'seated-cat-cow',
  'childs-pose',
  'hip-flexor-stretch',
  'hamstring-stretch',
  'seated-hamstring-stretch',
  'chest-opener',
  'quad-stretch',
] as const

export type FigureSlug = (typeof FIGURE_SLUGS)[number]

const known: ReadonlySet<string> = new Set(FIGURE_SLUGS)

/** Whether a figure of this name is drawn. */
export function isFigureSlug(slug: string): slug is FigureSlug {
  return known.has(slug)
}
