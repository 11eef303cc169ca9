/** Library: squat. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const squatMovements: Movement[] = [
  {
    slug: 'goblet-squat',
    name: 'Goblet squat',
    pattern: 'squat',
    position: 'standing',
    impact: 'none',
    joints: ['knee', 'hip', 'lower-back'],
    kit: ['dumbbell'],
    tempo: [2, 0, 1, 0],
    change: 5,
    figure: 'goblet-squat',
    start: 'Feet a little wider than the hips, one dumbbell held upright against the breastbone.',
    steps: [
      'Sit down between your heels and let the knees travel over the toes.',
      'Stop where your back would start to round.',
      'Push the floor away and stand tall without leaning back.',
    ],
    cues: ['Elbows inside the knees', 'Whole foot on the floor', 'Breathe out on the way up'],
    faults: [
      { fault: 'Heels lift', correction: 'Widen the stance or sit a hand less deep.' },
      { fault: 'Knees fall inwards', correction: 'Press the floor apart with both feet.' },
      {
        fault: 'Chest drops first',
        correction: 'Let the dumbbell lead: it goes down and up in one line.',
      },
    ],
    stopWhen: 'Sharp pain in the knee or groin, or your back rounds and you cannot hold it.',
    options: [
      easier(
        'to-a-chair',
        'To a chair',
        ['knee', 'balance', 'hip'],
        'Sit back until you touch a chair against the wall, then stand.',
        { figure: 'chair-squat' },
      ),
      easier(
        'no-weight',
        'Without weight',
        ['load-too-heavy', 'lower-back', 'shoulder', 'wrist'],
        'Arms crossed on the chest, same depth.',
        { figure: 'squat' },
      ),
      planned('One dumbbell at the chest, as deep as the back stays long.'),
      harder(
        'pause-low',
        'Pause at the bottom',
        'Two full seconds still at the bottom of every rep.',
        { tempo: [2, 2, 1, 0] },
      ),
    ],
  },
  {
    slug: 'squat-to-press',
    name: 'Squat to press',
    pattern: 'squat',
    position: 'standing',
    impact: 'none',
    joints: ['knee', 'hip', 'shoulder', 'lower-back'],
    kit: ['dumbbell', 'dumbbell'],
    tempo: [2, 0, 2, 0],
    change: 6,
    figure: 'squat-to-press',
    start: 'Dumbbells on the shoulders, feet a little wider than the hips.',
    steps: [
      'Squat with the elbows high.',
      'Stand up fast and let the drive carry the dumbbells overhead.',
      'Bring them to the shoulders, then squat again.',
    ],
    cues: ['Stand first, then press', 'Elbows high at the bottom', 'Soft knees on the way down'],
    faults: [
      {
        fault: 'Pressing before standing',
        correction: 'Split it: a full squat, then a full press.',
      },
      { fault: 'Leaning back overhead', correction: 'Ribs down, or stop at eye height.' },
    ],
    stopWhen: 'Pain in the shoulder or back, or you are too breathless to say a few words.',
    options: [
      easier(
        'to-a-chair',
        'To a chair, no press',
        ['knee', 'hip', 'shoulder', 'neck', 'balance'],
        'Sit to a chair and stand, dumbbells stay at the shoulders.',
        { figure: 'chair-squat', tempo: [2, 0, 1, 0] },
      ),
      easier(
        'one-dumbbell',
        'One dumbbell',
        ['only-one-dumbbell', 'load-too-heavy', 'lower-back', 'wrist'],
        'Both hands on one dumbbell.',
        { figure: 'squat-to-press' },
      ),
      planned('Both dumbbells overhead in one movement.'),
      harder('pause-low', 'Pause at the bottom', 'One second still in the squat.', {
        tempo: [2, 1, 2, 0],
      }),
    ],
  },
]
