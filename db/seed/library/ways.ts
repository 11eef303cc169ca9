/** How a movement's options are written in the library. */
import type { MovementOption, Reason } from '@/server/engine/spec/movement'

type Timing = Partial<
  Pick<MovementOption, 'tempo' | 'secondsPerRep' | 'reps' | 'sides' | 'figure' | 'change'>
>

export const easier = (
  option: string,
  name: string,
  reasons: Reason[],
  description: string,
  more: Timing = {},
): MovementOption => ({ option, name, level: 'easier', reasons, description, ...more })

export const planned = (description: string): MovementOption => ({
  option: 'as-planned',
  name: 'As planned',
  level: 'as-planned',
  reasons: [],
  description,
})

export const harder = (
  option: string,
  name: string,
  description: string,
  more: Timing = {},
): MovementOption => ({
  option,
  name,
  level: 'harder',
  reasons: ['wants-more'],
  description,
  ...more,
})
