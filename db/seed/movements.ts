/**
 * The library of the invented gym, by pattern. The words are the project's own; what they say of form and
 * faults is common coaching practice, no source. Options are listed easier first.
 */
import type { Movement } from '@/server/engine/spec/movement'
import { squatMovements } from './library/squat'
import { lungeMovements } from './library/lunge'
import { hingeMovements } from './library/hinge'
import { pushMovements } from './library/push'
import { pullMovements } from './library/pull'
import { carryMovements } from './library/carry'
import { coreMovements } from './library/core'
import { locomotionMovements } from './library/locomotion'
import { jumpMovements } from './library/jump'
import { mobilityMovements } from './library/mobility'

export const demoMovements: Movement[] = [
  ...squatMovements,
  ...lungeMovements,
  ...hingeMovements,
  ...pushMovements,
  ...pullMovements,
  ...carryMovements,
  ...coreMovements,
  ...locomotionMovements,
  ...jumpMovements,
  ...mobilityMovements,
]
