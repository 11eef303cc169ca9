/** Library: lunge. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const lungeMovements: Movement[] = [
  {
    slug: 'reverse-lunge',
    name: 'Reverse lunge',
    pattern: 'lunge',
    position: 'standing',
    impact: 'none',
    joints: ['knee', 'hip', 'ankle-or-foot'],
    kit: ['dumbbell', 'dumbbell'],
    tempo: [2, 0, 1, 0],
    change: 5,
    figure: 'reverse-lunge',
    start: 'Stand tall, feet under the hips, dumbbells at your sides.',
    steps: [
      'Step one foot straight back and sink until the back knee is just above the floor.',
      'Keep most of your weight on the front heel.',
      'Push through the front foot and bring the feet together; change sides.',
    ],
    cues: ['Front heel stays heavy', 'Chest tall', 'Two rails, not a tightrope'],
    faults: [
      { fault: 'Front knee caves in', correction: 'Step back wider, on your own rail.' },
      { fault: 'Landing hard on the back knee', correction: 'Step shorter and slower.' },
    ],
    stopWhen: 'Pain under or inside the front knee, or you lose balance twice in a row.',
    options: [
      easier(
        'hold-a-wall',
        'Hand on the wall',
        ['balance', 'ankle-or-foot'],
        'Same step with one hand on a wall, no weight in that hand.',
        { figure: 'supported-lunge' },
      ),
      easier(
        'step-shorter',
        'Step shorter',
        ['knee', 'hip', 'load-too-heavy'],
        'Half a step back, half as deep, without weight if you like.',
        { figure: 'split-squat' },
      ),
      planned('Alternate sides, back knee a hand above the floor.'),
      harder(
        'rear-foot-up',
        'Rear foot up',
        'Rear foot on a low chair; half the reps on one side, then the other.',
        { figure: 'rear-foot-raised-split-squat', tempo: [2, 1, 1, 0] },
      ),
    ],
  },
]
