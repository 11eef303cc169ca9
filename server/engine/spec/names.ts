/** The trade's lists that describe a movement. Apart from their schemas, so that a player carries no parser. */
export const PATTERNS = [
  'squat',
  'lunge',
  'hinge',
  'horizontal-push',
  'vertical-push',
  'horizontal-pull',
  'vertical-pull',
  'carry',
  'core',
  'locomotion',
  'jump',
  'mobility',
] as const
export const POSITIONS = [
  'standing',
  'seated',
  'kneeling',
  'hands-and-feet',
  'face-up',
  'face-down',
] as const
/** From which one has to get up. `seated` may be on a chair and is not among them. */
export const FLOOR_POSITIONS: readonly (typeof POSITIONS)[number][] = [
  'kneeling',
  'hands-and-feet',
  'face-up',
  'face-down',
]
export const IMPACTS = ['none', 'low', 'jump'] as const
export const JOINTS = [
  'knee',
  'hip',
  'ankle-or-foot',
  'lower-back',
  'neck',
  'shoulder',
  'elbow',
  'wrist',
] as const
/** Muscle groups as coaches speak of them. */
export const MUSCLES = [
  'quads',
  'glutes',
  'hamstrings',
  'calves',
  'hip-flexors',
  'inner-thighs',
  'lower-back',
  'upper-back',
  'lats',
  'chest',
  'shoulders',
  'biceps',
  'triceps',
  'forearms',
  'abdominals',
  'obliques',
  'neck',
] as const
/** Why a member would take an option. */
export const REASONS = [
  'load-too-heavy',
  'no-jumping',
  'knee',
  'hip',
  'ankle-or-foot',
  'lower-back',
  'neck',
  'shoulder',
  'wrist',
  'cannot-get-down',
  'cannot-kneel',
  'balance',
  'only-one-dumbbell',
  'wants-more',
] as const
export const LEVELS = ['easier', 'as-planned', 'harder'] as const
/** The option that every movement has: what the coach planned. */
export const AS_PLANNED = 'as-planned'
