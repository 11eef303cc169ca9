/** Small classes for the engine's tests; invented. */
import type { Movement } from '@/server/engine/spec/movement'
import type { Block, Format, SessionSpec } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'

export const squat: Movement = {
  slug: 'goblet-squat',
  name: 'Goblet squat',
  pattern: 'squat',
  position: 'standing',
  impact: 'none',
  joints: ['knee', 'hip'],
  kit: ['dumbbell'],
  secondsPerRep: 3,
  change: 4,
  start: 'Feet a little wider than the hips.',
  steps: ['Sit down between the heels.', 'Stand up tall.'],
  cues: ['Knees over toes'],
  faults: [],
  stopWhen: 'The back rounds.',
  options: [
    {
      option: 'to-a-chair',
      name: 'To a chair',
      level: 'easier',
      reasons: ['knee', 'balance'],
      description: 'Touch the chair and stand up.',
      reps: 4,
    },
    {
      option: 'no-load',
      name: 'Without load',
      level: 'easier',
      reasons: ['load-too-heavy'],
      description: 'Hands in front of the chest.',
    },
    { option: 'as-planned', name: 'As planned', level: 'as-planned', reasons: [], description: '' },
    {
      option: 'slow',
      name: 'Slow',
      level: 'harder',
      reasons: ['wants-more', 'shoulder'],
      description: 'Five seconds down.',
      secondsPerRep: 7,
    },
  ],
}

export const press: Movement = {
  ...squat,
  slug: 'floor-press',
  name: 'Floor press',
  pattern: 'horizontal-push',
  position: 'face-up',
  joints: ['shoulder', 'elbow', 'wrist'],
  options: [
    { option: 'as-planned', name: 'As planned', level: 'as-planned', reasons: [], description: '' },
  ],
}

export function block(id: string, format: Format, more: Partial<Block> = {}): Block {
  return {
    id,
    kind: format.type === 'rest' ? 'rest' : 'work',
    title: id,
    format,
    ...more,
  }
}

export function versionOf(
  blocks: Block[],
  movements: Movement[] = [squat, press],
): PublishedVersion {
  const spec: SessionSpec = { spec: 1, title: 'Test class', blocks }
  return { spec, movements }
}

type DistributiveOmit<T, K extends PropertyKey> = T extends unknown ? Omit<T, K> : never
export type Draft = DistributiveOmit<ClassEvent, 'id' | 'device' | 'seq' | 'wallMs' | 'classMs'> & {
  classMs?: number
}

/** Events in order from drafts, as one device would stamp them. */
export function stamped(drafts: Draft[], device = 'laptop'): ClassEvent[] {
  return drafts.map((draft, index) => stamp(draft, index + 1, device))
}

export function stamp(draft: Draft, seq: number, device = 'laptop'): ClassEvent {
  return {
    classMs: 0,
    ...draft,
    id: `${device}-${String(seq).padStart(6, '0')}`,
    device,
    seq,
    wallMs: 1_764_000_000_000 + seq,
  }
}

/** Seeded random numbers in [0, 1): mulberry32. */
export function randomOf(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
}
