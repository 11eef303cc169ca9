/** Library: hinge. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const hingeMovements: Movement[] = [
  {
    slug: 'suitcase-deadlift',
    name: 'Suitcase deadlift',
    pattern: 'hinge',
    position: 'standing',
    impact: 'none',
    joints: ['lower-back', 'hip'],
    kit: ['dumbbell', 'dumbbell'],
    tempo: [2, 0, 1, 0],
    change: 6,
    figure: 'suitcase-deadlift',
    start: 'A dumbbell outside each foot, hips back, shins nearly upright.',
    steps: [
      'Push the hips back and reach down with a long spine.',
      'Take the handles, press the feet into the floor and stand up.',
      'Send the hips back first on the way down.',
    ],
    cues: [
      'Close the car door with your seat',
      'Weights brush the trousers',
      'Long spine all the way',
    ],
    faults: [
      { fault: 'Squatting it', correction: 'Shins stay upright; the hips move back, not down.' },
      { fault: 'Back rounds to reach', correction: 'Start from a chair seat or a thick book.' },
    ],
    stopWhen: 'Any sharp pain in the back or pain down a leg.',
    options: [
      easier(
        'to-knee-height',
        'Only to knee height',
        ['lower-back', 'hip', 'load-too-heavy'],
        'Turn round when the hands pass the knees.',
        { figure: 'romanian-deadlift' },
      ),
      easier(
        'one-dumbbell',
        'One dumbbell, both hands',
        ['only-one-dumbbell', 'wrist', 'shoulder'],
        'Hold one dumbbell by its head between the feet.',
        { figure: 'romanian-deadlift' },
      ),
      planned('From the floor or as low as the spine stays long.'),
      harder('slow-down', 'Three seconds down', 'Lower for a slow count of three.', {
        tempo: [3, 1, 1, 0],
      }),
    ],
  },
  {
    slug: 'glute-bridge',
    name: 'Glute bridge',
    pattern: 'hinge',
    position: 'face-up',
    impact: 'none',
    joints: ['hip', 'lower-back', 'knee'],
    kit: ['mat'],
    tempo: [1, 0, 1, 1],
    change: 7,
    figure: 'glute-bridge',
    start: 'On your back, feet flat and close, arms beside you.',
    steps: [
      'Press the heels down and lift the hips until knees, hips and shoulders are one line.',
      'Hold for a breath.',
      'Lower bone by bone.',
    ],
    cues: ['Ribs stay down', 'Push through the heels', 'Squeeze, do not arch'],
    faults: [
      { fault: 'Arching the back', correction: 'Stop a hand lower and tuck the tail.' },
      { fault: 'Cramp in the hamstrings', correction: 'Move the feet a little nearer.' },
    ],
    stopWhen: 'Back pain or a cramp that does not ease.',
    options: [
      easier(
        'standing-hinge',
        'Standing hinge',
        ['cannot-get-down', 'neck', 'knee'],
        'Hips back and forward, hands on the thighs.',
        { figure: 'hip-hinge', change: 4 },
      ),
      easier(
        'half-height',
        'Half as high',
        ['lower-back', 'hip', 'load-too-heavy'],
        'Lift the hips only half the way.',
      ),
      planned('Both feet, one breath at the top.'),
      harder('one-leg', 'One leg', 'The other knee over the hip; half the reps each side.', {
        figure: 'single-leg-bridge',
        sides: 'alternate',
      }),
    ],
  },
]
