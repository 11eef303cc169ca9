/**
 * Seeded random command sequences, driven as the player's rim does: windows of marks up to a
 * look-ahead, asked again from the instant of every command.
 */
import { describe, expect, it } from 'vitest'
import type { SessionSpec } from '@/server/engine/spec/schema'
import { eventSchema, type ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import {
  apply,
  marksBetween,
  newRun,
  positionAt,
  runFromEvents,
} from '@/server/engine/timeline/run'
import type { Command, DueMark, EventDraft, Run } from '@/server/engine/timeline/run-types'
import { block, randomOf, versionOf } from './classes'

const squats = { movement: 'goblet-squat', reps: 5 }
const cue = (id: string, at: NonNullable<SessionSpec['blocks'][number]['cues']>[number]['at']) => ({
  id,
  text: id,
  kind: 'form' as const,
  at,
})
const version = versionOf([
  block(
    'warm',
    {
      type: 'holds',
      stations: [
        { movement: 'goblet-squat', seconds: 20, sides: 'each', rest: 8 },
        { movement: 'floor-press', seconds: 35 },
      ],
    },
    {
      kind: 'warm-up',
      brief: 'Gently in.',
      briefSeconds: 12,
      cues: [cue('breathe', { from: 'start', s: 10 }), cue('soon', { from: 'end', s: 0 })],
    },
  ),
  block(
    'rest-a',
    { type: 'rest', seconds: 40, atLeast: 15, atMost: 70 },
    { cues: [cue('drink', { from: 'end', s: 20 })] },
  ),
  block(
    'main',
    {
      type: 'rounds',
      seconds: 130,
      stations: [squats, { movement: 'floor-press', reps: { from: 2, step: 2 } }],
    },
    {
      brief: 'Steady.',
      briefSeconds: 8,
      cues: [
        cue('two', { round: 2 }),
        cue('press', { station: 1, round: 2 }),
        cue('late', { from: 'end', s: 30 }),
      ],
    },
  ),
  block('ladder', {
    type: 'rounds',
    seconds: 60,
    stations: [{ movement: 'goblet-squat', reps: { from: 3, step: -1, to: 1, then: 'done' } }],
  }),
  block(
    'beats',
    {
      type: 'intervals',
      rounds: 2,
      roundRest: 31,
      stations: [
        { movement: 'goblet-squat', work: 30, rest: 10 },
        { movement: 'floor-press', work: 12, rest: 0, sides: 'each', switch: 3 },
      ],
    },
    { countIn: 0, cues: [cue('second', { round: 2 })] },
  ),
  block(
    'minute',
    {
      type: 'every',
      seconds: 20,
      times: 4,
      stations: [squats, { movement: 'floor-press', reps: 4 }],
    },
    { countIn: 3 },
  ),
  block('race', { type: 'for-time', rounds: 3, cap: 90, stations: [squats] }, { kind: 'finisher' }),
  block(
    'down',
    { type: 'rest', seconds: 20 },
    { kind: 'cool-down', brief: 'Breathe.', briefSeconds: 5 },
  ),
])

const LOOK_AHEAD_MS = 100

class Player {
  run: Run
  now = 0
  events: EventDraft[] = []
  heard: DueMark[] = []
  private scheduled: DueMark[] = []
  private cursor = 0
  constructor(waitAtBriefs: boolean, changeExtraMs: number) {
    this.run = newRun(version, 'v1', { waitAtBriefs, changeExtraMs })
  }
  send(command: Command): void {
    const applied = apply(this.run, command, this.now)
    const before = this.run
    this.run = applied.run
    this.events.push(...applied.events)
    if (applied.run === before) {
      expect(applied.events).toEqual([])
      return
    }
    // The rim's part: what was scheduled for later is cancelled, and asked for again from here.
    this.scheduled = this.scheduled.filter((mark) => mark.dueAtMs <= this.now)
    this.cursor = this.now
  }
  tick(ms: number): void {
    this.now += ms
    const to = this.now + LOOK_AHEAD_MS
    const kept = new Set(this.scheduled.map((mark) => mark.key))
    const asked = marksBetween(this.run, this.cursor, to)
    this.scheduled.push(...asked.filter((mark) => !kept.has(mark.key)))
    this.cursor = to
    this.heard.push(...this.scheduled.filter((mark) => mark.dueAtMs < this.now))
    this.scheduled = this.scheduled.filter((mark) => mark.dueAtMs >= this.now)
  }
  stored(): ClassEvent[] {
    return this.events.map((event, index) => ({
      ...event,
      id: `e${String(index).padStart(5, '0')}`,
      device: 'laptop',
      seq: index + 1,
      wallMs: 0,
    }))
  }
}

function commandOf(random: () => number, player: Player): Command {
  const pick = <T>(all: readonly T[]): T => {
    const one = all[Math.floor(random() * all.length)]
    if (one === undefined) throw new Error('nothing to pick')
    return one
  }
  const blockId = pick(version.spec.blocks).id
  const round = 1 + Math.floor(random() * 5)
  const isHalted = positionAt(player.run, player.now).halted
  if (isHalted === 'paused' && random() < 0.5) return { type: 'resume' }
  if (isHalted === 'stopped' && random() < 0.7) return { type: 'go-on-after-stop' }
  return pick<Command>([
    { type: 'log-round', by: 'member' },
    { type: 'log-round', by: 'member' },
    { type: 'follow-lead', logs: random() < 0.6, ...(random() < 0.5 ? { station: 1 } : {}) },
    { type: 'follow-lead', logs: true },
    { type: 'leave-lead' },
    { type: 'undo-round' },
    { type: 'pause' },
    { type: 'resume' },
    { type: 'pass-brief' },
    { type: 'pass-brief' },
    { type: 'lengthen-rest', ms: 1 + Math.floor(random() * 20_000) },
    { type: 'cut-rest' },
    ...(random() < 0.15 ? [{ type: 'skip-block' } as const] : []),
    { type: 'finish-block' },
    { type: 'set-round', block: blockId, round, done: random() < 0.6, by: 'afterwards' },
    { type: 'note-reps', block: blockId, round, reps: Math.floor(random() * 12) },
    {
      type: 'choose-option',
      block: blockId,
      station: Math.floor(random() * 3),
      option: pick(['to-a-chair', 'no-load', 'as-planned', 'x']),
    },
    { type: 'rest-as-needed' },
    { type: 'end-rest-as-needed' },
    { type: 'hurt', where: 'knee', note: 'o'.repeat(2_000) },
    ...(random() < 0.1 ? [{ type: 'stop' } as const] : []),
    { type: 'rate', rpe: 5 },
  ])
}

interface Played {
  seed: number
  player: Player
  /** What broke while it ran; collected, since an assertion a step would take minutes. */
  broken: string[]
  reloads: { now: number; run: Run; stored: ClassEvent[] }[]
}

function play(seed: number): Played {
  const random = randomOf(seed)
  const player = new Player(random() < 0.3, random() < 0.3 ? 4_000 : 0)
  const played: Played = { seed, player, broken: [], reloads: [] }
  player.send({
    type: 'start',
    versionId: 'v1',
    counting: random() < 0.4 ? 'lead' : 'press',
    options: [],
  })
  let before = positionAt(player.run, player.now)
  for (let step = 0; step < 3_000; step += 1) {
    player.tick(random() < 0.9 ? Math.floor(random() * 400) : Math.floor(random() * 5_000))
    const at = positionAt(player.run, player.now)
    if (at.classMs < before.classMs) played.broken.push(`class time fell at ${player.now}`)
    if (at.classMs > player.run.timeline.lengthMs)
      played.broken.push(`past the end at ${player.now}`)
    if (at.leftMs < 0 || at.bodyLeftMs < 0) played.broken.push(`less than nothing at ${player.now}`)
    const stood = before.halted !== null && at.halted !== null
    if (stood && (at.classMs !== before.classMs || at.briefLeftMs !== before.briefLeftMs)) {
      played.broken.push(`time passed while halted at ${player.now}`)
    }
    if (random() < 0.01) {
      played.reloads.push({ now: player.now, run: player.run, stored: player.stored() })
    }
    if (at.owed) player.send(at.owed)
    else if (random() < 0.12) player.send(commandOf(random, player))
    const after = positionAt(player.run, player.now)
    if (after.classMs < at.classMs) played.broken.push(`a command took time back at ${player.now}`)
    before = after
    if (at.phase === 'over' && random() < 0.05) break
  }
  return played
}

const ALL = Array.from({ length: 40 }, (_, index) => play(index + 1))

describe('random sequences of commands', () => {
  it('reach every part of the class in some of the runs', () => {
    const reached = ALL.filter(({ player }) => player.run.ended).length
    expect(reached).toBeGreaterThan(10)
    const types = new Set(ALL.flatMap(({ player }) => player.events.map((event) => event.type)))
    expect(types).toContain('rest-taken')
    expect(types).toContain('block-finished')
    expect(types).toContain('rest-cut')
    expect(types).toContain('lead-followed')
    const byLead = ALL.flatMap(({ player }) =>
      player.events.filter((event) => event.type === 'round-done' && event.by === 'lead'),
    )
    expect(byLead.length).toBeGreaterThan(50)
  })

  it('leave only events that the door of the server lets in', () => {
    const refused = ALL.flatMap(({ seed, player }) =>
      player.stored().flatMap((event) => {
        const parsed = eventSchema.safeParse(event)
        return parsed.success ? [] : [`${seed}: ${event.type}: ${parsed.error.message}`]
      }),
    )
    expect(refused).toEqual([])
  })

  it('never take class time back, and let none pass while halted', () => {
    expect(ALL.flatMap(({ seed, broken }) => broken.map((one) => `${seed}: ${one}`))).toEqual([])
  })

  it('sound no beep and no call twice', () => {
    const twice = ALL.flatMap(({ seed, player }) => {
      const seen = new Set<string>()
      return player.heard.flatMap(({ what, key }) => {
        if (what === 'cue' || what === 'next') return []
        if (seen.has(key)) return [`${seed}: ${key}`]
        seen.add(key)
        return []
      })
    })
    expect(twice).toEqual([])
  })

  it('lose no mark of a segment that ran out as it was', () => {
    let compared = 0
    const lost = ALL.flatMap(({ seed, player }) => {
      const heard = new Set(player.heard.map((mark) => mark.key))
      const at = positionAt(player.run, player.now)
      return player.run.timeline.marks.flatMap((mark) => {
        const isUntouched = !player.run.edits[mark.segmentIndex]
        const isPast = mark.segmentIndex < (at.place?.segment ?? 0) && !player.run.ended
        if (!isUntouched || (!isPast && mark.atMs >= at.classMs)) return []
        compared += 1
        return heard.has(mark.key) ? [] : [`${seed}: ${mark.key}`]
      })
    })
    expect(lost).toEqual([])
    expect(compared).toBeGreaterThan(1_000)
  })

  it('leave events that fold to what the run itself holds', () => {
    for (const { seed, player } of ALL) {
      const tally = fold(version, player.stored())
      const folded = tally.blocks.map((one) => ({
        rounds: one.logged.map((logged) => logged.round),
        options: one.options.map((option) => option.option),
      }))
      const own = player.run.blocks.map((one) => ({
        rounds: one.logged.map((logged) => logged.round),
        options: one.options,
      }))
      expect({ seed, folded }).toEqual({ seed, folded: own })
      const { halted, phase } = positionAt(player.run, player.now)
      const running = halted === 'paused' ? 'paused' : 'in-class'
      const state =
        player.run.halted === 'stopped' ? 'stopped' : phase === 'over' ? 'finished' : running
      if (phase !== 'over' || player.run.ended) {
        expect({ seed, state: tally.state }).toEqual({ seed, state })
      }
    }
  })

  it('come back from a reload at any instant to the same place, and stay there', () => {
    let compared = 0
    for (const { seed, reloads } of ALL) {
      const random = randomOf(seed)
      for (const { now, run, stored } of reloads) {
        const { place } = positionAt(run, now)
        const agoMs = Math.floor(random() * 30_000)
        // The clock of the page starts anew with a reload.
        const pageNow = 1_234
        const back = runFromEvents(version, 'v1', run.settings, stored, pageNow, { agoMs, place })
        expect(back.gap).toBeNull()
        for (const later of [0, 5_000, 60_000]) {
          expect(positionAt(back.run, pageNow + later)).toEqual(
            positionAt(run, now + agoMs + later),
          )
        }
        expect(back.run.timeline).toEqual(run.timeline)
        compared += 1
      }
    }
    expect(compared).toBeGreaterThan(200)
  })
})
