/** What an event may name. Apart from its schema, so that a player carries no parser. */
/** Where something hurts: a joint or region, or somewhere else. */
export const HURT_PLACES = [
  'knee',
  'hip',
  'ankle-or-foot',
  'lower-back',
  'neck',
  'shoulder',
  'elbow',
  'wrist',
  'elsewhere',
] as const
/** Signs that mean stop exercising; any of them ends the class for today. */
export const RED_FLAG_SIGNS = [
  'chest-pain',
  'breathless',
  'dizzy-or-faint',
  'irregular-heartbeat',
  'calf-or-leg-cramp',
  'severe-tiredness',
] as const
export const STOP_SIGNS = [...RED_FLAG_SIGNS, 'pain', 'want-to-stop', 'other'] as const
export const COUNTINGS = ['press', 'lead', 'afterwards'] as const
export const COUNTED_BY = ['member', 'lead', 'afterwards'] as const
