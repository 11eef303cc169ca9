/** Library: pull. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const pullMovements: Movement[] = [
  {
    slug: 'bent-over-row',
    name: 'Bent-over row',
    pattern: 'horizontal-pull',
    position: 'standing',
    impact: 'none',
    joints: ['lower-back', 'shoulder', 'hip'],
    kit: ['dumbbell', 'dumbbell'],
    tempo: [1, 0, 1, 1],
    change: 6,
    figure: 'bent-over-row',
    start:
      'Hinge until the chest looks at the floor in front of you, dumbbells hanging under the shoulders.',
    steps: [
      'Pull both elbows towards your back pockets.',
      'Pause with the shoulder blades drawn together.',
      'Lower until the arms are long; the trunk stays where it is.',
    ],
    cues: [
      'Elbows to your back pockets',
      'Shoulders away from ears',
      'Long neck, eyes on the floor',
    ],
    faults: [
      {
        fault: 'Trunk rises with every rep',
        correction: 'Take a lighter pair or put one hand on a chair.',
      },
      { fault: 'Shrugging', correction: 'Pull lower, towards the hip.' },
    ],
    stopWhen: 'Your lower back aches or pinches, or you cannot hold the hinge.',
    options: [
      easier(
        'hand-on-chair',
        'Hand on a chair',
        ['lower-back', 'hip', 'balance', 'only-one-dumbbell'],
        'One hand on a chair seat, row with the other; half the reps each side.',
        { figure: 'supported-row', sides: 'alternate' },
      ),
      easier(
        'lighter-pair',
        'Lighter, elbows low',
        ['load-too-heavy', 'shoulder', 'neck'],
        'The lighter pair, elbows close to the body and not past it.',
      ),
      planned('Both dumbbells, trunk still.'),
      harder('pause-top', 'Pause at the top', 'Hold the shoulder blades together for two counts.', {
        tempo: [1, 0, 1, 2],
      }),
    ],
  },
  {
    slug: 'curl',
    name: 'Curl',
    pattern: 'vertical-pull',
    position: 'standing',
    impact: 'none',
    joints: ['elbow', 'wrist', 'shoulder'],
    kit: ['dumbbell', 'dumbbell'],
    tempo: [2, 0, 1, 0],
    change: 5,
    figure: 'curl',
    start: 'Stand tall, dumbbells at your sides, palms forward.',
    steps: ['Bend the elbows; they stay at your sides.', 'Lower all the way.'],
    cues: ['Elbows glued', 'All the way down', 'No swinging'],
    faults: [{ fault: 'Swinging the trunk', correction: 'Lighter, or back against a wall.' }],
    stopWhen: 'Pain inside the elbow or in the wrist.',
    options: [
      easier(
        'thumbs-up',
        'Thumbs up',
        ['wrist', 'shoulder', 'load-too-heavy'],
        'Hold the dumbbells like hammers, lighter if you like.',
      ),
      easier(
        'one-at-a-time',
        'One at a time',
        ['only-one-dumbbell', 'lower-back'],
        'One arm, then the other; half the reps each.',
        { sides: 'alternate' },
      ),
      planned('Both arms together.'),
      harder('slow-down', 'Four seconds down', 'Lower for a slow count of four.', {
        tempo: [4, 0, 1, 0],
      }),
    ],
  },
]
