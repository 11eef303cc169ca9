/** Library: jump. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'
import { easier, harder, planned } from './ways'

export const jumpMovements: Movement[] = [
  {
    slug: 'jumping-jack',
    name: 'Jumping jack',
    pattern: 'jump',
    position: 'standing',
    impact: 'jump',
    joints: ['knee', 'ankle-or-foot', 'shoulder'],
    kit: [],
    secondsPerRep: 1.2,
    change: 3,
    figure: 'jumping-jack',
    start: 'Feet together, arms at your sides.',
    steps: [
      'Jump the feet wide and swing the arms overhead.',
      'Land softly on the balls of the feet.',
      'Jump back together.',
    ],
    cues: ['Land like a cat', 'Soft knees', 'Arms as high as is kind to you'],
    faults: [{ fault: 'Stiff landings', correction: 'Bend the knees, or step instead.' }],
    stopWhen: 'Pain in the calf, shin, knee or chest.',
    options: [
      easier(
        'step-out',
        'Step out',
        ['no-jumping', 'knee', 'ankle-or-foot', 'balance', 'load-too-heavy', 'hip'],
        'Step one foot out at a time, arms as planned.',
        { figure: 'step-jack', secondsPerRep: 1.8 },
      ),
      easier(
        'arms-low',
        'Arms to shoulder height',
        ['shoulder', 'neck'],
        'Jump as planned, hands no higher than the shoulders.',
      ),
      planned('Full jump, arms overhead.'),
      harder('low-landing', 'Land in a quarter squat', 'Sink a little on every landing.', {
        secondsPerRep: 1.5,
      }),
    ],
  },
  {
    slug: 'squat-jump',
    name: 'Squat jump',
    pattern: 'jump',
    position: 'standing',
    impact: 'jump',
    joints: ['knee', 'ankle-or-foot', 'hip'],
    kit: [],
    secondsPerRep: 2,
    change: 3,
    figure: 'squat-jump',
    start: 'Feet under the hips, arms forward.',
    steps: [
      'Sit to a half squat.',
      'Jump up, arms swing back.',
      'Land quietly and stand still for a moment.',
    ],
    cues: ['Quiet landing', 'Knees over toes', 'Reset every jump'],
    faults: [
      { fault: 'Knees cave on landing', correction: 'Rise to the toes instead of jumping.' },
    ],
    stopWhen: 'Knee, shin or calf pain, or landings get loud.',
    options: [
      easier(
        'rise-to-toes',
        'Rise to the toes',
        ['no-jumping', 'knee', 'ankle-or-foot', 'load-too-heavy', 'balance'],
        'Squat, then rise to the toes; no jump.',
        { figure: 'calf-raise' },
      ),
      easier('to-a-chair', 'To a chair', ['hip', 'lower-back'], 'Sit to a chair and stand.', {
        figure: 'chair-squat',
      }),
      planned('Small jump, quiet landing.'),
      harder('higher', 'Jump higher', 'As high as you can land quietly.'),
    ],
  },
]
