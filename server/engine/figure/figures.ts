import { CARRY } from './data/carry'
import { CORE_MOBILITY } from './data/core-mobility'
import { HINGE } from './data/hinge'
import { JUMP_CRAWL } from './data/jump-crawl'
import { PUSH_PULL } from './data/push-pull'
import { SIDEWAYS } from './data/sideways'
import { SQUAT_LUNGE } from './data/squat-lunge'
import { STEPPING } from './data/stepping'
import { WARM_UP } from './data/warm-up'
import type { FigureSlug } from './slugs'
import type { FigureData } from './types'

/** Every figure as data. */
export const FIGURES: Record<FigureSlug, FigureData> = {
  ...WARM_UP,
  ...SQUAT_LUNGE,
  ...STEPPING,
  ...SIDEWAYS,
  ...JUMP_CRAWL,
  ...HINGE,
  ...PUSH_PULL,
  ...CARRY,
  ...CORE_MOBILITY,
}
