import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { classCommand } from '@/scripts/class-command'

let folder = ''
const file = (name: string) => join(folder, name)
const station = (reps: number, more: object = {}) => ({
  movement: 'squat',
  reps,
  tempo: [1, 0, 1, 0],
  change: 5,
  ...more,
})
const classOf = (format: object) => ({
  spec: 1,
  title: 'Class',
  blocks: [{ id: 'a', kind: 'mobility', title: 'A', format }],
})

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'floorside-class-'))
  const write = (name: string, value: unknown) =>
    writeFileSync(file(name), typeof value === 'string' ? value : JSON.stringify(value))
  write('good.json', classOf({ type: 'rounds', seconds: 205, stations: [station(4), station(6)] }))
  write(
    'bare.json',
    classOf({ type: 'rounds', seconds: 60, stations: [{ movement: 'squat', reps: 5 }] }),
  )
  write('bad.json', { spec: 1, title: '', blocks: [] })
  write('broken.json', '{')
  const event = (seq: number, more: object) => ({
    id: `e${seq}`,
    device: 'd',
    seq,
    classMs: 0,
    wallMs: 0,
    ...more,
  })
  write('events.json', [
    event(3, { type: 'reps-noted', block: 'a', round: 3, reps: 7 }),
    event(1, { type: 'round-done', block: 'a', round: 1, by: 'member' }),
    event(2, { type: 'round-done', block: 'a', round: 2, by: 'member' }),
    event(2, { type: 'round-done', block: 'a', round: 2, by: 'member' }),
  ])
  write('no-events.json', { events: [] })
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const run = (args: string[]) => {
  const { code, stdout, stderr } = classCommand(args)
  return { status: code, stdout, stderr, json: () => JSON.parse(stdout) as unknown }
}

describe('the class command as a program', () => {
  it('reads standard input, prints JSON alone and ends with its code', { timeout: 30_000 }, () => {
    const program = (args: string[], input: string) =>
      spawnSync('npm', ['run', '--silent', 'class', '--', ...args], { encoding: 'utf8', input })
    const good = program(['compile', '-'], JSON.stringify(classOf({ type: 'rest', seconds: 20 })))
    expect(good.status).toBe(0)
    expect(good.stderr).toBe('')
    expect(JSON.parse(good.stdout)).toMatchObject({
      lengthMs: 20_000,
      segments: [{ kind: 'rest', block: 'a', startMs: 0, endMs: 20_000 }],
      pending: [],
    })
    const wrong = program(['check', '-'], '{')
    expect(wrong.status).toBe(2)
    expect(wrong.stdout).toBe('')
    expect(wrong.stderr.trim().split('\n')).toHaveLength(1)
  })
})

describe('the class command', () => {
  it('check prints an empty list for a sound class and every problem otherwise', () => {
    expect(run(['check', file('good.json')])).toMatchObject({
      status: 0,
      stdout: '[]\n',
      stderr: '',
    })
    const bad = run(['check', file('bad.json')])
    expect(bad.status).toBe(1)
    expect((bad.json() as { path: string }[]).map((one) => one.path).sort()).toEqual([
      'blocks',
      'title',
    ])
  })
  it('compile, forecast and captions print what check prints for a class with problems', () => {
    const problems = run(['check', file('bad.json')]).stdout
    for (const command of ['compile', 'forecast', 'captions']) {
      expect(run([command, file('bad.json')])).toMatchObject({ status: 1, stdout: problems })
    }
  })
  // Worked in the session spec: 7 + 0 in 205 s; one station of 5 reps at 3 s: 4 + 0.
  it('forecast gives the worked examples, with the default tempo and another', () => {
    expect(run(['forecast', file('good.json')]).json()).toEqual([
      { block: 'a', rounds: 7, reps: 0, totalReps: 70, perStation: [28, 42], finishSeconds: null },
    ])
    expect(run(['forecast', file('bare.json')]).json()).toMatchObject([{ rounds: 4, reps: 0 }])
    expect(run(['forecast', file('bare.json'), '--tempo', '6']).json()).toMatchObject([
      { rounds: 2, reps: 0 },
    ])
  })
  it('score folds events in any order, each once', () => {
    expect(run(['score', file('good.json'), file('events.json')]).json()).toEqual([
      { block: 'a', rounds: 2, reps: 7, totalReps: 27, finishSeconds: null },
    ])
  })
  it('captions prints WebVTT as it is, of a bare spec as well', () => {
    const { status, stdout, stderr } = run(['captions', file('bare.json')])
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' })
    expect(stdout.startsWith('WEBVTT\n\n')).toBe(true)
    expect(stdout).toContain('\n\nsegment/1\n00:00:00.000 --> 00:00:01.000\nSquat\n\n')
    expect(stdout).toContain('\n\ncall/1\n00:00:30.000 --> 00:00:31.000\n30 seconds\n\n')
  })
  it.each<[string, () => string[]]>([
    ['no command', () => []],
    ['an unknown command', () => ['cheer', file('good.json')]],
    ['no file', () => ['check']],
    ['two files', () => ['check', file('good.json'), file('good.json')]],
    ['a file that is not there', () => ['check', file('nowhere.json')]],
    ['a folder', () => ['check', folder]],
    ['no JSON', () => ['check', file('broken.json')]],
    ['an unknown option', () => ['forecast', file('good.json'), '--tires', '1']],
    ['an option of another command', () => ['compile', file('good.json'), '--tempo', '2']],
    ['captions of two files', () => ['captions', file('good.json'), file('bare.json')]],
    ['captions with an option', () => ['captions', file('good.json'), '--change', '2']],
    ['an option without its value', () => ['forecast', file('good.json'), '--tiring']],
    ['an option that is no number', () => ['forecast', file('good.json'), '--tempo', 'quick']],
    ['a tempo of 0', () => ['forecast', file('good.json'), '--tempo', '0']],
    ['events that are no list', () => ['score', file('good.json'), file('no-events.json')]],
  ])('ends with 2 and one line for %s', (_name, args) => {
    const { status, stdout, stderr } = run(args())
    expect(status).toBe(2)
    expect(stdout).toBe('')
    expect(stderr.trim().split('\n')).toHaveLength(1)
  })
})
