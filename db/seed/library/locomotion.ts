/** Library: locomotion. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const locomotionMovements: Movement[] = [
  {
    slug: 'march',
    name: 'March',
    pattern: 'locomotion',
    position: 'standing',
    impact: 'low',
    joints: ['hip', 'ankle-or-foot'],
    kit: [],
    secondsPerRep: 1.2,
    change: 3,
    figure: 'march-in-place',
    start: 'Stand tall, feet under the hips.',
    steps: [
      'Lift one knee to hip height, opposite arm forward.',
      'Set the foot down softly and change.',
    ],
    cues: ['Tall as a mast', 'Soft feet', 'Breathe through the nose if you can'],
    faults: [{ fault: 'Leaning back', correction: 'Lift the knee less high.' }],
    stopWhen: 'Pain in hip or foot, or dizziness.',
    options: [
      easier(
        'low-knees',
        'Low knees',
        ['hip', 'ankle-or-foot', 'balance', 'load-too-heavy'],
        'Lift the feet just off the floor, hand on a wall if you like.',
        { figure: 'march-in-place' },
      ),
      planned('Knees to hip height.'),
      harder('knee-drive', 'Quick knee drive', 'Drive the knees up faster.', {
        secondsPerRep: 0.9,
      }),
    ],
  },
]
