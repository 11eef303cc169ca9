/** Library: push. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const pushMovements: Movement[] = [
  {
    slug: 'push-up',
    name: 'Push-up',
    pattern: 'horizontal-push',
    position: 'hands-and-feet',
    impact: 'none',
    joints: ['shoulder', 'wrist', 'elbow'],
    kit: ['mat'],
    tempo: [2, 0, 1, 0],
    change: 7,
    figure: 'push-up',
    start: 'Hands under the shoulders, body one line from head to heels.',
    steps: [
      'Lower the chest between the hands, elbows back at about 45 degrees.',
      'Keep ribs and hips together; nothing sags.',
      'Push the floor away until the arms are long.',
    ],
    cues: [
      'Screw the hands into the floor',
      'Hips and ribs travel together',
      'Breathe out as you push',
    ],
    faults: [
      { fault: 'Hips sag', correction: 'Squeeze the seat, or take the hands up on a table.' },
      { fault: 'Elbows flare wide', correction: 'Point the elbow creases forward.' },
    ],
    stopWhen: 'Pain at the front of the shoulder or in the wrist, or you cannot keep the line.',
    options: [
      easier(
        'hands-on-table',
        'Hands on a table',
        ['wrist', 'shoulder', 'cannot-get-down', 'cannot-kneel', 'load-too-heavy'],
        'Hands on a sturdy table or worktop: the higher, the lighter.',
        { figure: 'incline-push-up', change: 5 },
      ),
      easier(
        'knees-down',
        'Knees down',
        ['load-too-heavy', 'lower-back'],
        'Knees on the mat, line from head to knees.',
        { figure: 'knee-push-up' },
      ),
      planned('From the toes, chest to a fist above the floor.'),
      harder('slow-down', 'Four seconds down', 'Lower for a slow count of four, then push up.', {
        tempo: [4, 0, 1, 0],
      }),
    ],
  },
  {
    slug: 'half-kneel-press',
    name: 'Half-kneel press',
    pattern: 'vertical-push',
    position: 'kneeling',
    impact: 'none',
    joints: ['shoulder', 'knee', 'neck'],
    kit: ['dumbbell', 'mat'],
    tempo: [2, 0, 1, 0],
    change: 8,
    figure: 'half-kneeling-press',
    start:
      'One knee on the mat, the other foot in front, dumbbell at the shoulder on the kneeling side.',
    steps: [
      'Squeeze the seat of the kneeling side.',
      'Press the dumbbell up until the arm is beside the ear.',
      'Lower it back to the shoulder under control.',
    ],
    cues: ['Ribs down as you press', 'Squeeze the kneeling side', 'Breathe out on the way up'],
    faults: [
      { fault: 'Leaning back', correction: 'Lighter dumbbell, ribs over the hips.' },
      { fault: 'Pressing forward', correction: 'Finish with the arm beside the ear.' },
    ],
    stopWhen: 'Pinching at the top of the shoulder or tingling in the arm.',
    options: [
      easier(
        'on-a-chair',
        'Seated on a chair',
        ['knee', 'cannot-kneel', 'cannot-get-down', 'balance', 'hip'],
        'Sit tall at the front of a chair, same press.',
        { figure: 'seated-press', change: 6 },
      ),
      easier(
        'to-eye-height',
        'Only to eye height',
        ['shoulder', 'neck', 'load-too-heavy'],
        'Stop when the hand is level with your eyes.',
        { figure: 'seated-press' },
      ),
      planned('Same side as the knee that is down.'),
      harder('slow-down', 'Four seconds down', 'Lower for a slow count of four.', {
        tempo: [4, 0, 1, 0],
      }),
    ],
  },
]
