/** A class with every format and what a member brings to it, for the player's own tests. */
import type { PlayerData } from '@/server/contract/classes'
import { fit } from '@/server/engine/fit/fit'
import type { Movement, MovementOption } from '@/server/engine/spec/movement'
import type { SessionSpec } from '@/server/engine/spec/schema'

function option(
  slug: string,
  name: string,
  level: MovementOption['level'],
  reasons: MovementOption['reasons'],
): MovementOption {
  return { option: slug, name, level, reasons, description: `${name}.`, secondsPerRep: 3 }
}

function movement(
  slug: string,
  name: string,
  easier: MovementOption,
  harder: MovementOption,
  more: Partial<Movement> = {},
): Movement {
  return {
    slug,
    name,
    pattern: 'squat',
    position: 'standing',
    impact: 'none',
    joints: ['knee'],
    kit: ['dumbbell'],
    tempo: [2, 0, 1, 0],
    change: 5,
    start: 'Stand with your feet under your hips.',
    steps: ['Move with control.'],
    cues: ['Ribs down, breathe out on the way up'],
    faults: [{ fault: 'Heels lift', correction: 'Sit back a little' }],
    stopWhen: 'Anything pinches.',
    options: [easier, option('as-planned', 'As planned', 'as-planned', []), harder],
    ...more,
  }
}

export const FIXTURE_MOVEMENTS: Movement[] = [
  movement(
    'bent-over-row',
    'Bent-over row',
    option('hand-on-a-chair', 'Hand on a chair', 'easier', ['lower-back']),
    option('pause-at-the-top', 'Pause at the top', 'harder', ['wants-more']),
    { pattern: 'horizontal-pull', joints: ['lower-back', 'shoulder'] },
  ),
  movement(
    'reverse-lunge',
    'Reverse lunge',
    option('step-shorter', 'Step shorter', 'easier', ['knee']),
    option('rear-foot-up', 'Rear foot up', 'harder', ['wants-more']),
    { pattern: 'lunge', joints: ['knee', 'hip'] },
  ),
  movement(
    'goblet-squat',
    'Goblet squat',
    option('to-a-chair', 'To a chair', 'easier', ['knee', 'balance']),
    option('slow-down', 'Three seconds down', 'harder', ['wants-more']),
  ),
  movement(
    'push-up',
    'Push-up',
    option('hands-on-a-table', 'Hands on a table', 'easier', ['wrist', 'cannot-get-down']),
    option('feet-up', 'Feet up', 'harder', ['wants-more']),
    { pattern: 'horizontal-push', position: 'face-down', joints: ['wrist', 'shoulder'], kit: [] },
  ),
  movement(
    'suitcase-deadlift',
    'Suitcase deadlift',
    option('from-a-box', 'From a box', 'easier', ['lower-back']),
    option('two-dumbbells', 'Two dumbbells', 'harder', ['wants-more']),
    { pattern: 'hinge', joints: ['lower-back', 'hip'] },
  ),
  movement(
    'side-plank',
    'Side plank',
    option('knees-down', 'Knees down', 'easier', ['shoulder']),
    option('top-leg-up', 'Top leg up', 'harder', ['wants-more']),
    { pattern: 'core', position: 'face-down', joints: ['shoulder'], kit: ['mat'] },
  ),
]

export const FIXTURE_SPEC: SessionSpec = {
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
      format: {
        type: 'intervals',
        rounds: 2,
        stations: [
          { movement: 'reverse-lunge', work: 40, rest: 20, sides: 'each', switch: 5 },
          { movement: 'push-up', work: 30, rest: 10 },
        ],
        roundRest: 30,
      },
    },
    {
      id: 'row-and-lunge',
      kind: 'work',
      title: 'Row and lunge',
      brief: 'A ladder in two movements. Start light: the rungs get longer.',
      briefSeconds: 20,
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
          id: 'c1',
          text: 'Elbows to your back pockets',
          kind: 'form',
          at: { from: 'start', s: 12 },
        },
        { id: 'c2', text: 'Breathe out as you pull', kind: 'breath', at: { from: 'start', s: 30 } },
        {
          id: 'c3',
          text: 'Front heel stays heavy, back knee close to the floor',
          kind: 'form',
          at: { from: 'start', s: 60 },
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
          id: 'r1',
          text: 'Shake out your hands. Breathe in for four, out for six.',
          kind: 'breath',
          at: { from: 'start', s: 10 },
        },
      ],
    },
    {
      id: 'five-for-time',
      kind: 'work',
      title: 'Five rounds for time',
      format: {
        type: 'for-time',
        rounds: 5,
        cap: 420,
        stations: [
          { movement: 'goblet-squat', reps: 12 },
          { movement: 'push-up', reps: 8 },
          { movement: 'suitcase-deadlift', reps: 6, sides: 'each' },
        ],
      },
    },
    {
      id: 'rest-2',
      kind: 'rest',
      title: 'Short rest',
      format: { type: 'rest', seconds: 12 },
    },
    {
      id: 'every-minute',
      kind: 'work',
      title: 'Every minute',
      format: {
        type: 'every',
        seconds: 60,
        times: 6,
        stations: [
          { movement: 'goblet-squat', reps: 10, note: 'Squat, then curl: that is one rep.' },
          { movement: 'push-up', reps: { list: [6, 8, 10] } },
        ],
      },
    },
    {
      id: 'not-counted',
      kind: 'finisher',
      title: 'Floor finisher',
      format: {
        type: 'rounds',
        seconds: 60,
        counted: false,
        stations: [
          { movement: 'push-up', reps: 3 },
          { movement: 'goblet-squat', reps: 3 },
        ],
      },
    },
    {
      id: 'holds',
      kind: 'cool-down',
      title: 'Holds',
      format: {
        type: 'holds',
        stations: [{ movement: 'side-plank', seconds: 40, sides: 'each', rest: 15 }],
      },
    },
  ],
}

export function playerFixture(change: Partial<PlayerData> = {}): PlayerData {
  const version = { spec: FIXTURE_SPEC, movements: FIXTURE_MOVEMENTS }
  return {
    scheduledClass: {
      scheduledClassId: '01920000-0000-7000-8000-000000000001',
      versionId: '01920000-0000-7000-8000-000000000002',
      title: FIXTURE_SPEC.title,
      focus: FIXTURE_SPEC.focus ?? null,
      day: '2026-12-01',
      opensAt: '2026-12-01T05:00:00.000Z',
      closesAt: '2026-12-01T22:00:00.000Z',
      group: 'Evening group',
      coachName: 'Ifeoma Adeyemi',
      realLengthMs: 1_980_000,
      classLengthMs: 1_960_000,
      blocks: [],
      myAttempts: [],
    },
    versionId: '01920000-0000-7000-8000-000000000002',
    version,
    membershipId: '01920000-0000-7000-8000-000000000003',
    memberName: 'Agnes Thorsby',
    kit: { dumbbell: 2, mat: 1 },
    health: {
      answers: null,
      answeredAt: '2026-10-21T10:00:00.000Z',
      goodUntil: '2027-01-19T10:00:00.000Z',
      standing: 'clear',
      clearedAt: null,
      limits: [],
      consentMissing: false,
    },
    holds: [],
    fitted: fit(change.version ?? version, {
      notes: [],
      holds: (change.holds ?? [])
        .filter((hold) => hold.memberClearedAt === null || hold.coachClearedAt === null)
        .map((hold) => hold.place),
      wantsMore: false,
      kit: null,
      rules: [],
    }),
    emergencyNumber: '112',
    openAttempt: null,
    lastTally: null,
    ...change,
  }
}
