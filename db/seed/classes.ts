/** Classes of the invented gym. Pairings, rep schemes and texts are invented for the demo. */
import type { SessionSpec } from '@/server/engine/spec/schema'

/** The short one: the whole loop can be tried in about four minutes. */
const breakwater: SessionSpec = {
  spec: 1,
  title: 'Breakwater',
  focus: 'Four minutes, no kit: try the whole loop',
  intendedRpe: 4,
  kit: [{ item: 'chair', count: 1, optional: true }],
  blocks: [
    {
      id: 'wake-up',
      kind: 'warm-up',
      title: 'Wake up',
      brief: 'March, then big slow arm circles. Keep it easy.',
      briefSeconds: 8,
      format: {
        type: 'intervals',
        rounds: 1,
        stations: [
          { movement: 'march', work: 25, rest: 5 },
          { movement: 'shoulder-circles', work: 20, rest: 0 },
        ],
      },
      cues: [
        {
          id: 'tall',
          text: 'Tall as a mast, soft feet',
          kind: 'form',
          at: { from: 'start', s: 6 },
        },
      ],
    },
    {
      id: 'ladder',
      kind: 'work',
      title: 'Squat and push',
      brief:
        'Up the ladder: 2 squats and 2 push-ups, then 4 and 4, then 6. Press once for every full round.',
      briefSeconds: 14,
      format: {
        type: 'rounds',
        seconds: 90,
        stations: [
          {
            movement: 'goblet-squat',
            reps: { from: 2, step: 2 },
            note: 'Without weight is fine today.',
          },
          { movement: 'push-up', reps: { from: 2, step: 2 } },
        ],
      },
      cues: [
        {
          id: 'foot',
          text: 'Whole foot on the floor',
          kind: 'form',
          at: { from: 'start', s: 8 },
          show: { station: 0 },
        },
        { id: 'round-two', text: 'Four each now: same speed', kind: 'pace', at: { round: 2 } },
        {
          id: 'breathe',
          text: 'Breathe out as you push',
          kind: 'breath',
          at: { from: 'end', s: 35 },
          show: { station: 1 },
        },
        {
          id: 'line',
          text: 'Hips sag? Take option 1',
          kind: 'option',
          at: { from: 'end', s: 18 },
          show: { station: 1, option: 'hands-on-table' },
        },
      ],
    },
    {
      id: 'breath',
      kind: 'rest',
      title: 'Breathe',
      format: { type: 'rest', seconds: 20, atLeast: 10, atMost: 45 },
      cues: [
        { id: 'shake', text: 'Shake out your hands', kind: 'breath', at: { from: 'start', s: 3 } },
      ],
    },
    {
      id: 'finish',
      kind: 'finisher',
      title: 'Quick feet',
      format: {
        type: 'intervals',
        rounds: 2,
        stations: [{ movement: 'jumping-jack', work: 15, rest: 8 }],
      },
      cues: [{ id: 'soft', text: 'Land like a cat, or step out', kind: 'form', at: { round: 1 } }],
    },
    {
      id: 'settle',
      kind: 'cool-down',
      title: 'Settle',
      brief: 'One stretch a side. Breathe slowly.',
      briefSeconds: 6,
      format: {
        type: 'holds',
        stations: [{ movement: 'hamstring-stretch', seconds: 15, sides: 'each', switch: 4 }],
      },
      cues: [
        { id: 'mild', text: 'Mild, never sharp', kind: 'safety', at: { from: 'start', s: 4 } },
      ],
    },
  ],
}

const slipway: SessionSpec = {
  spec: 1,
  title: 'Slipway',
  focus: 'Full body, two dumbbells',
  intendedRpe: 7,
  kit: [
    { item: 'dumbbell', count: 2 },
    { item: 'mat', count: 1 },
    { item: 'chair', count: 1, optional: true },
  ],
  blocks: [
    {
      id: 'warm-up',
      kind: 'warm-up',
      title: 'Warm-up',
      brief:
        'Five minutes to get warm: march, circles, cat and cow, easy squats. Clear the floor, shoes on.',
      briefSeconds: 20,
      format: {
        type: 'intervals',
        rounds: 2,
        stations: [
          { movement: 'march', work: 40, rest: 0 },
          { movement: 'shoulder-circles', work: 30, rest: 5 },
          { movement: 'cat-cow', work: 40, rest: 5 },
          {
            movement: 'goblet-squat',
            work: 25,
            rest: 5,
            note: 'No weight yet.',
            options: [{ option: 'to-a-chair' }, { option: 'no-weight' }, { option: 'as-planned' }],
          },
        ],
      },
      cues: [
        {
          id: 'nose',
          text: 'Breathe through the nose if you can',
          kind: 'breath',
          at: { from: 'start', s: 12 },
        },
        { id: 'wave', text: 'One breath, one wave', kind: 'form', at: { station: 2 } },
      ],
    },
    {
      id: 'squat-push',
      kind: 'work',
      title: 'Squat and push',
      brief:
        'Five minutes. 4 goblet squats, 4 push-ups, then 6 and 6, 8 and 8. Log every full round.',
      format: {
        type: 'rounds',
        seconds: 300,
        stations: [
          { movement: 'goblet-squat', reps: { from: 4, step: 2 } },
          { movement: 'push-up', reps: { from: 4, step: 2 } },
        ],
      },
      cues: [
        {
          id: 'elbows',
          text: 'Elbows inside the knees',
          kind: 'form',
          at: { from: 'start', s: 10 },
          show: { station: 0 },
        },
        {
          id: 'screw',
          text: 'Screw your hands into the floor',
          kind: 'form',
          at: { from: 'start', s: 50 },
          show: { station: 1 },
        },
        {
          id: 'round-three',
          text: 'Eights now: keep the same speed',
          kind: 'pace',
          at: { round: 3 },
        },
        {
          id: 'option',
          text: 'Wrists sore? Hands on a table',
          kind: 'option',
          at: { from: 'end', s: 120 },
          show: { station: 1, option: 'hands-on-table' },
        },
        {
          id: 'breathe',
          text: 'Breathe out on every push',
          kind: 'breath',
          at: { from: 'end', s: 75 },
        },
      ],
    },
    {
      id: 'quick-feet',
      kind: 'finisher',
      title: 'Quick feet',
      format: {
        type: 'intervals',
        rounds: 3,
        stations: [{ movement: 'jumping-jack', work: 15, rest: 5 }],
      },
      cues: [
        {
          id: 'soft',
          text: 'Soft landings, or step out',
          kind: 'safety',
          at: { from: 'start', s: 3 },
        },
      ],
    },
    {
      id: 'rest-1',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 105, atLeast: 75, atMost: 135 },
      cues: [
        {
          id: 'shake',
          text: 'Shake out your hands. In for four, out for six.',
          kind: 'breath',
          at: { from: 'start', s: 8 },
        },
        { id: 'kit', text: 'Pick up two dumbbells', kind: 'kit', at: { from: 'end', s: 30 } },
      ],
    },
    {
      id: 'row-lunge',
      kind: 'work',
      title: 'Row and lunge',
      brief:
        'Six minutes. Rows and reverse lunges, 4 of each, then 6, 8, 10. Lunges count left and right together.',
      format: {
        type: 'rounds',
        seconds: 360,
        stations: [
          { movement: 'bent-over-row', reps: { from: 4, step: 2 } },
          { movement: 'reverse-lunge', reps: { from: 4, step: 2 }, sides: 'alternate' },
        ],
      },
      cues: [
        {
          id: 'pockets',
          text: 'Elbows to your back pockets, shoulders away from ears',
          kind: 'form',
          at: { from: 'start', s: 12 },
          show: { station: 0 },
        },
        {
          id: 'heel',
          text: 'Front heel stays heavy, back knee close to the floor',
          kind: 'form',
          at: { from: 'start', s: 55 },
          show: { station: 1 },
        },
        {
          id: 'breath',
          text: 'Breathe out as you pull',
          kind: 'breath',
          at: { from: 'start', s: 110 },
        },
        {
          id: 'back',
          text: 'Back tired? One hand on the chair',
          kind: 'option',
          at: { from: 'end', s: 150 },
          show: { station: 0, option: 'hand-on-chair' },
        },
        { id: 'chest', text: 'Chest tall', kind: 'form', at: { from: 'end', s: 95 } },
      ],
    },
    {
      id: 'winch',
      kind: 'finisher',
      title: 'Curl and hold',
      format: {
        type: 'every',
        seconds: 30,
        times: 3,
        stations: [{ movement: 'curl', reps: 10 }],
      },
    },
    {
      id: 'rest-2',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 105, atLeast: 75, atMost: 135 },
      cues: [{ id: 'mat', text: 'Roll out the mat', kind: 'kit', at: { from: 'end', s: 40 } }],
    },
    {
      id: 'hinge-press',
      kind: 'work',
      title: 'Hinge and press',
      brief:
        'Five minutes. Suitcase deadlift 6, half-kneel press 5 each side. The reps stay the same.',
      format: {
        type: 'rounds',
        seconds: 300,
        stations: [
          { movement: 'suitcase-deadlift', reps: 6 },
          { movement: 'half-kneel-press', reps: 5, sides: 'each' },
        ],
      },
      cues: [
        {
          id: 'door',
          text: 'Close the car door with your seat',
          kind: 'form',
          at: { from: 'start', s: 10 },
          show: { station: 0 },
        },
        {
          id: 'ribs',
          text: 'Ribs down as you press',
          kind: 'form',
          at: { from: 'start', s: 45 },
          show: { station: 1 },
        },
        {
          id: 'knee',
          text: 'Knee on the mat hurts? Sit on a chair',
          kind: 'option',
          at: { from: 'end', s: 140 },
          show: { station: 1, option: 'on-a-chair' },
        },
      ],
    },
    {
      id: 'last-push',
      kind: 'finisher',
      title: 'Last push',
      format: {
        type: 'intervals',
        rounds: 3,
        stations: [{ movement: 'mountain-climber', work: 15, rest: 5 }],
      },
    },
    {
      id: 'rest-3',
      kind: 'rest',
      title: 'Breathe',
      format: { type: 'rest', seconds: 60, atLeast: 30, atMost: 120 },
    },
    {
      id: 'mobility',
      kind: 'mobility',
      title: 'Mobility',
      brief: 'Four minutes on the floor or a chair. Nothing sharp.',
      format: {
        type: 'holds',
        stations: [
          { movement: 'hip-flexor-stretch', seconds: 45, sides: 'each', switch: 5, rest: 5 },
          { movement: 'hamstring-stretch', seconds: 45, sides: 'each', switch: 5, rest: 5 },
          { movement: 'cat-cow', seconds: 40 },
        ],
      },
      cues: [{ id: 'long', text: 'Long breath out', kind: 'breath', at: { from: 'start', s: 15 } }],
    },
  ],
}

const lowWater: SessionSpec = {
  spec: 1,
  title: 'Low water',
  focus: 'Against the clock, then core',
  intendedRpe: 8,
  kit: [
    { item: 'dumbbell', count: 2 },
    { item: 'mat', count: 1 },
  ],
  blocks: [
    {
      id: 'warm-up',
      kind: 'warm-up',
      title: 'Warm-up',
      brief: 'Three rounds of marching and circles, a little bigger each time.',
      format: {
        type: 'intervals',
        rounds: 3,
        stations: [
          { movement: 'march', work: 40, rest: 5 },
          { movement: 'shoulder-circles', work: 30, rest: 5 },
        ],
      },
    },
    {
      id: 'minute-sets',
      kind: 'work',
      title: 'On the minute',
      brief:
        'Ten minutes: 8 squats to press on one minute, 10 bridges on the next. What is left is rest.',
      format: {
        type: 'every',
        seconds: 60,
        times: 10,
        stations: [
          { movement: 'squat-to-press', reps: 8 },
          { movement: 'glute-bridge', reps: 10 },
        ],
      },
      cues: [
        {
          id: 'stand',
          text: 'Stand first, then press',
          kind: 'form',
          at: { station: 0 },
          show: { station: 0 },
        },
        {
          id: 'ribs',
          text: 'Ribs stay down',
          kind: 'form',
          at: { station: 1 },
          show: { station: 1 },
        },
        { id: 'half', text: 'Half of it done: same weights', kind: 'pace', at: { round: 3 } },
      ],
    },
    {
      id: 'rest-1',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 90, atLeast: 60, atMost: 150 },
    },
    {
      id: 'against-the-clock',
      kind: 'work',
      title: 'Four rounds for time',
      brief:
        'Four rounds: 8 rows, 8 lunges, 6 push-ups. As steady as you can; eight minutes at most.',
      format: {
        type: 'for-time',
        rounds: 4,
        cap: 480,
        stations: [
          { movement: 'bent-over-row', reps: 8 },
          { movement: 'reverse-lunge', reps: 8, sides: 'alternate' },
          { movement: 'push-up', reps: 6 },
        ],
      },
      cues: [
        {
          id: 'steady',
          text: 'Start slower than you want to',
          kind: 'pace',
          at: { from: 'start', s: 8 },
        },
        { id: 'last', text: 'Last round: keep the line', kind: 'form', at: { round: 4 } },
        {
          id: 'sharp',
          text: 'Sharp pain means stop, not push',
          kind: 'safety',
          at: { from: 'start', s: 200 },
        },
      ],
    },
    {
      id: 'rest-2',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 75, atLeast: 45, atMost: 120 },
    },
    {
      id: 'core',
      kind: 'finisher',
      title: 'Core',
      format: {
        type: 'holds',
        stations: [
          { movement: 'plank', seconds: 40, rest: 15 },
          { movement: 'side-plank', seconds: 25, sides: 'each', switch: 5, rest: 15 },
          { movement: 'plank', seconds: 30 },
        ],
      },
      cues: [
        { id: 'away', text: 'Push the floor away', kind: 'form', at: { from: 'start', s: 8 } },
      ],
    },
    {
      id: 'cool-down',
      kind: 'cool-down',
      title: 'Cool-down',
      format: {
        type: 'holds',
        stations: [
          { movement: 'hip-flexor-stretch', seconds: 30, sides: 'each', switch: 5, rest: 5 },
          { movement: 'cat-cow', seconds: 45 },
        ],
      },
    },
  ],
}

const harbourLights: SessionSpec = {
  spec: 1,
  title: 'Harbour lights',
  focus: 'Intervals without kit',
  intendedRpe: 6,
  kit: [
    { item: 'mat', count: 1 },
    { item: 'chair', count: 1, optional: true },
  ],
  blocks: [
    {
      id: 'warm-up',
      kind: 'warm-up',
      title: 'Warm-up',
      brief: 'March, circles, cat and cow.',
      format: {
        type: 'intervals',
        rounds: 2,
        stations: [
          { movement: 'march', work: 40, rest: 5 },
          { movement: 'shoulder-circles', work: 30, rest: 5 },
          { movement: 'cat-cow', work: 30, rest: 5 },
        ],
      },
    },
    {
      id: 'intervals',
      kind: 'work',
      title: 'Forty on, twenty off',
      brief:
        'Three rounds of four movements: forty seconds of work, twenty of rest. Choose the option you can keep up.',
      format: {
        type: 'intervals',
        rounds: 3,
        roundRest: 60,
        stations: [
          { movement: 'squat-jump', work: 40, rest: 20 },
          { movement: 'push-up', work: 40, rest: 20 },
          { movement: 'reverse-lunge', work: 40, rest: 20, sides: 'each', switch: 5 },
          { movement: 'dead-bug', work: 40, rest: 20 },
        ],
      },
      cues: [
        {
          id: 'quiet',
          text: 'Quiet landings, or rise to the toes',
          kind: 'safety',
          at: { station: 0 },
          show: { station: 0, option: 'rise-to-toes' },
        },
        {
          id: 'paint',
          text: 'Slow as paint',
          kind: 'form',
          at: { station: 3 },
          show: { station: 3 },
        },
        { id: 'round-three', text: 'Last time round', kind: 'pace', at: { round: 3 } },
      ],
    },
    {
      id: 'rest-1',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 60, atLeast: 30, atMost: 120 },
    },
    {
      id: 'down-the-ladder',
      kind: 'finisher',
      title: 'Down the ladder',
      brief: '12, 9, 6, 3 squats and mountain climbers. When the last rung is done you may go on.',
      format: {
        type: 'rounds',
        seconds: 240,
        stations: [
          {
            movement: 'goblet-squat',
            reps: { from: 12, step: -3, to: 3, then: 'done' },
            options: [{ option: 'to-a-chair' }, { option: 'no-weight' }],
          },
          { movement: 'mountain-climber', reps: { from: 12, step: -3, to: 3, then: 'done' } },
        ],
      },
      cues: [{ id: 'level', text: 'Hips level', kind: 'form', at: { from: 'start', s: 30 } }],
    },
    {
      id: 'cool-down',
      kind: 'cool-down',
      title: 'Cool-down',
      brief: 'Slow it down.',
      format: {
        type: 'holds',
        stations: [
          { movement: 'hip-flexor-stretch', seconds: 30, sides: 'each', switch: 5, rest: 5 },
          { movement: 'hamstring-stretch', seconds: 30, sides: 'each', switch: 5 },
        ],
      },
    },
  ],
}

const anchorWatch: SessionSpec = {
  spec: 1,
  title: 'Anchor watch',
  focus: 'Straight sets and a steady core',
  intendedRpe: 5,
  kit: [
    { item: 'dumbbell', count: 2 },
    { item: 'mat', count: 1 },
    { item: 'chair', count: 1, optional: true },
  ],
  blocks: [
    {
      id: 'warm-up',
      kind: 'warm-up',
      title: 'Warm-up',
      brief: 'Easy marching and a few waves of the spine.',
      format: {
        type: 'intervals',
        rounds: 2,
        stations: [
          { movement: 'march', work: 45, rest: 5 },
          { movement: 'cat-cow', work: 40, rest: 5 },
        ],
      },
    },
    {
      id: 'sets',
      kind: 'work',
      title: 'Straight sets',
      brief: 'Three sets of deadlifts and three of presses, one every ninety seconds.',
      format: {
        type: 'every',
        seconds: 90,
        times: 6,
        stations: [
          { movement: 'suitcase-deadlift', reps: 8 },
          { movement: 'half-kneel-press', reps: 6, sides: 'each' },
        ],
      },
      cues: [
        {
          id: 'long',
          text: 'Long spine all the way',
          kind: 'form',
          at: { station: 0 },
          show: { station: 0 },
        },
        {
          id: 'squeeze',
          text: 'Squeeze the kneeling side',
          kind: 'form',
          at: { station: 1 },
          show: { station: 1 },
        },
      ],
    },
    {
      id: 'rest-1',
      kind: 'rest',
      title: 'Rest',
      format: { type: 'rest', seconds: 60, atLeast: 30, atMost: 120 },
    },
    {
      id: 'pyramid',
      kind: 'work',
      title: 'Row pyramid',
      brief: 'Rows and dead bugs: 4, 6, 8, 6, 4, then again from the start. Six minutes, no hurry.',
      format: {
        type: 'rounds',
        seconds: 360,
        stations: [
          { movement: 'bent-over-row', reps: { list: [4, 6, 8, 6, 4] } },
          { movement: 'dead-bug', reps: { list: [4, 6, 8, 6, 4] }, sides: 'alternate' },
        ],
      },
      cues: [
        {
          id: 'neck',
          text: 'Long neck, eyes on the floor',
          kind: 'form',
          at: { from: 'start', s: 15 },
        },
        { id: 'top', text: 'Top of the pyramid', kind: 'pace', at: { round: 3 } },
      ],
    },
    {
      id: 'mobility',
      kind: 'mobility',
      title: 'Mobility',
      format: {
        type: 'holds',
        stations: [
          { movement: 'hip-flexor-stretch', seconds: 40, sides: 'each', switch: 5, rest: 5 },
          { movement: 'hamstring-stretch', seconds: 40, sides: 'each', switch: 5 },
        ],
      },
    },
  ],
}

export const demoClasses = { breakwater, slipway, lowWater, harbourLights, anchorWatch }
export type DemoClass = keyof typeof demoClasses
