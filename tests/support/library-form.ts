/** A movement's form as a browser would send it. */
import { AS_PLANNED } from '@/server/engine/spec/names'

/** A form that is sound, with `more` in place of or beside its fields; a list is a field sent several times. */
export function movementForm(more: Record<string, string | string[]> = {}): FormData {
  const fields: Record<string, string | string[]> = {
    name: 'Harbour squat',
    pattern: 'squat',
    position: 'standing',
    impact: 'none',
    joints: ['knee', 'hip'],
    'kit.dumbbell': '2',
    otherKit: 'Sandbag',
    'tempo.0': '2',
    'tempo.1': '0',
    'tempo.2': '1',
    'tempo.3': '0,5',
    change: '5',
    figure: 'goblet-squat',
    start: 'Feet under the hips.',
    steps: 'Sit down.\n\n  Stand up.  \n',
    cues: 'Whole foot',
    'faults.f0.fault': 'Heels lift',
    'faults.f0.correction': 'Sit less deep.',
    'faults.f1.fault': '',
    'faults.f1.correction': '',
    stopWhen: 'Sharp pain.',
    'options.a.option': '',
    'options.a.name': 'To a chair',
    'options.a.reasons': ['knee', 'balance'],
    'options.a.description': 'Touch the chair.',
    'options.a.reps': '12, 9, 6',
    'options.b.option': AS_PLANNED,
    'options.b.name': 'As planned',
    'options.b.description': 'As deep as it stays calm.',
    'options.c.option': '',
    'options.c.name': 'Pause low',
    'options.c.reasons': ['wants-more'],
    'options.c.description': 'Two seconds at the bottom.',
    ...more,
  }
  const form = new FormData()
  for (const [name, value] of Object.entries(fields)) {
    for (const one of Array.isArray(value) ? value : [value]) form.append(name, one)
  }
  return form
}
