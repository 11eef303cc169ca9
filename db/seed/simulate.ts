/**
 * Results of the demo gym, made by driving the real engine as a member would: every event comes out of
 * `apply`. Who does what is drawn from seeded randomness; nothing of it was ever done by a person.
 */
import { v7 } from 'uuid'
import { blockPlan, type BlockPlan } from '@/server/engine/pace/block-plan'
import { optionsOf } from '@/server/engine/spec/options'
import type { Block } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent, HurtPlace, StopSign } from '@/server/engine/tally/events'
import { apply, newRun, positionAt } from '@/server/engine/timeline/run'
import type { Command, EventDraft, Position, Run } from '@/server/engine/timeline/run-types'
import type { DemoMember } from './people'
import type { Random } from './random'

export interface Simulation {
  version: PublishedVersion
  versionId: string
  member: DemoMember
  startedAt: Date
  random: Random
  /** The class is broken off here (somebody who is still in it); null: to the end. */
  untilMs: number | null
  /** Something that happens at this class time. */
  incident?: { atClassMs: number; hurt?: HurtPlace; stop?: StopSign; note?: string }
}

/** Time over the planned one that a rep takes at the end of a block, as a share. */
const TIRING = 0.35

type StationOptions = Map<string, string>

function stationKey(block: string, station: number): string {
  return `${block}/${station}`
}

/** The option that the member starts each station with. */
function startOptions({ version, member, random }: Simulation): StationOptions {
  const chosen: StationOptions = new Map()
  for (const block of version.spec.blocks) {
    if (block.format.type === 'rest') continue
    block.format.stations.forEach((station, index) => {
      const movement = version.movements.find((one) => one.slug === station.movement)
      const options = optionsOf(station, movement)
      const kinder = options.find(
        (one) =>
          one.level === 'easier' && one.reasons.some((reason) => member.takes.includes(reason)),
      )
      const more =
        member.wantsMore && random.chance(0.5)
          ? options.find((one) => one.level === 'harder')
          : undefined
      const option = kinder ?? more
      if (option) chosen.set(stationKey(block.id, index), option.option)
    })
  }
  return chosen
}

/** Seconds that round `round` takes this member from `atSeconds` into the block. */
function roundSeconds(
  plan: BlockPlan,
  round: number,
  atSeconds: number,
  member: DemoMember,
  random: Random,
): number {
  let seconds = 0
  for (const station of plan.stations) {
    const tired = 1 + (TIRING * (atSeconds + seconds)) / plan.seconds
    seconds +=
      station.repsIn(round) * station.secondsPerRep * tired * member.pace * random.wobble(0.12)
    if (plan.stations.length > 1) seconds += station.changeSeconds * tired * random.wobble(0.3)
  }
  return Math.max(4, seconds)
}

interface Planned {
  atMs: number
  command: Command
}

/** What the member will do in the `rounds` or `for-time` work that begins now, on the run's clock. */
function planRounds(
  simulation: Simulation,
  run: Run,
  block: Block,
  now: number,
  lengthMs: number,
): Planned[] {
  const { member, random, version } = simulation
  const blockIndex = version.spec.blocks.indexOf(block)
  const plan = blockPlan(version, block, run.blocks[blockIndex]?.options)
  if (!plan || member.countsAfterwards) return []
  const todo: Planned[] = []
  let atSeconds = random.between(0, 1.5)
  for (let round = 1; round <= Math.min(plan.roundLimit, 60); round += 1) {
    if (random.chance(0.06)) {
      const restSeconds = random.between(8, 35)
      todo.push({ atMs: now + atSeconds * 1_000, command: { type: 'rest-as-needed' } })
      atSeconds += restSeconds
      todo.push({ atMs: now + atSeconds * 1_000, command: { type: 'end-rest-as-needed' } })
    }
    atSeconds += roundSeconds(plan, round, atSeconds, member, random)
    todo.push({ atMs: now + atSeconds * 1_000, command: { type: 'log-round', by: 'member' } })
    atSeconds += random.between(0.3, 1.2)
  }
  return todo.filter((one) => one.atMs < now + lengthMs - 200)
}

/** Events of one attempt in order, with the wall clock of the member's computer. */
export function simulateAttempt(simulation: Simulation): ClassEvent[] {
  const { version, versionId, member, startedAt, random, untilMs, incident } = simulation
  const device = `demo-${v7({ msecs: startedAt.getTime(), random: random.bytes(16) })}`
  const events: ClassEvent[] = []
  let run = newRun(version, versionId, { waitAtBriefs: false, changeExtraMs: 0 })
  let seq = 0
  const stamp = (draft: EventDraft, now: number) => {
    seq += 1
    const wallMs = startedAt.getTime() + Math.round(now)
    const id = v7({ msecs: wallMs, random: random.bytes(16), seq })
    events.push({ ...draft, id, device, seq, wallMs } as ClassEvent)
  }
  const send = (command: Command, now: number): boolean => {
    const applied = apply(run, command, Math.round(now))
    run = applied.run
    for (const draft of applied.events) stamp(draft, now)
    return applied.refused === null
  }

  const options = startOptions(simulation)
  let now = 0
  send(
    {
      type: 'start',
      versionId,
      counting: member.countsAfterwards ? 'afterwards' : 'press',
      options: version.spec.blocks.flatMap((block) =>
        block.format.type === 'rest'
          ? []
          : block.format.stations.map((_, station) => ({
              block: block.id,
              station,
              option: options.get(stationKey(block.id, station)) ?? 'as-planned',
              from: options.has(stationKey(block.id, station))
                ? ('chosen' as const)
                : ('coach' as const),
            })),
      ),
    },
    0,
  )

  let incidentDone = incident === undefined
  /** Runs to `until` in the run's time, doing what is due; false where the attempt breaks off there. */
  const runTo = (until: number, todo: Planned[]): boolean => {
    for (const one of todo) {
      if (one.atMs > until) break
      if (untilMs !== null && one.atMs > untilMs) return false
      send(one.command, one.atMs)
    }
    if (untilMs !== null && until > untilMs) return false
    now = until
    return true
  }

  for (let guard = 0; guard < 5_000; guard += 1) {
    const at: Position = positionAt(run, Math.round(now))
    if (at.owed) send(at.owed, now)
    if (at.phase === 'over') break
    if (at.phase === 'brief') {
      if (random.chance(0.25)) send({ type: 'pass-brief' }, now + random.between(2_000, 5_000))
      const after = positionAt(run, Math.round(now))
      if (!runTo(now + (after.phase === 'brief' ? (after.briefLeftMs ?? 0) : 0), [])) return events
      continue
    }
    const block = version.spec.blocks[at.blockIndex]
    const { segment } = at
    if (!block || !segment) break
    const endsAt = now + at.leftMs
    if (
      !incidentDone &&
      incident &&
      at.classMs + at.leftMs > incident.atClassMs &&
      segment.kind === 'work'
    ) {
      incidentDone = true
      const todo = planRounds(simulation, run, block, now, at.leftMs)
      const happensAt = Math.max(now + 1_000, now + incident.atClassMs - at.classMs)
      if (!runTo(happensAt, todo)) return events
      if (incident.stop) {
        send({ type: 'stop' }, happensAt)
        send(
          {
            type: 'describe-stop',
            sign: incident.stop,
            ...(incident.note ? { note: incident.note } : {}),
          },
          happensAt + 9_000,
        )
        return events
      }
      if (incident.hurt) {
        send(
          { type: 'hurt', where: incident.hurt, ...(incident.note ? { note: incident.note } : {}) },
          happensAt,
        )
        const movement = version.movements.find(
          (one) => block.format.type !== 'rest' && one.slug === block.format.stations[0]?.movement,
        )
        const station = block.format.type === 'rest' ? undefined : block.format.stations[0]
        const kinder = station && optionsOf(station, movement).find((one) => one.level === 'easier')
        if (kinder)
          send(
            { type: 'choose-option', block: block.id, station: 0, option: kinder.option },
            happensAt + 3_000,
          )
      }
      if (
        !runTo(
          endsAt,
          todo.filter((one) => one.atMs > happensAt),
        )
      )
        return events
      continue
    }
    const todo = planRounds(simulation, run, block, now, at.leftMs)
    if (
      segment.kind === 'rest' &&
      at.rest &&
      random.chance(0.12) &&
      at.rest.mayLengthenMs >= 15_000
    ) {
      todo.push({
        atMs: now + random.between(2_000, 6_000),
        command: { type: 'lengthen-rest', ms: 15_000 },
      })
    }
    if (segment.kind === 'work' && block.kind === 'finisher' && random.chance(0.01)) {
      todo.push({ atMs: now + 2_000, command: { type: 'skip-block', reason: 'Out of breath' } })
    }
    if (todo.length === 0) {
      if (!runTo(endsAt, [])) return events
    } else {
      // A command may move the segment's end (finished for time, rest lengthened), so look again after each.
      for (const one of todo) {
        const current = positionAt(run, Math.round(now))
        if (current.segmentIndex !== at.segmentIndex || current.phase !== 'segment') break
        if (one.atMs >= now + current.leftMs) break
        if (!runTo(one.atMs, [one])) return events
      }
      const current = positionAt(run, Math.round(now))
      if (current.phase === 'segment' && current.segmentIndex === at.segmentIndex) {
        if (!runTo(now + current.leftMs, [])) return events
      }
    }
    if (segment.kind === 'work') noteReps(block)
  }

  function noteReps(block: Block): void {
    if (member.countsAfterwards || !random.chance(0.8)) return
    const blockIndex = version.spec.blocks.indexOf(block)
    const plan = blockPlan(version, block, run.blocks[blockIndex]?.options)
    const logged = run.blocks[blockIndex]?.logged ?? []
    if (!plan || logged.length >= plan.roundLimit) return
    const round = logged.length + 1
    const asked = plan.stations.reduce((sum, station) => sum + station.repsIn(round), 0)
    send(
      { type: 'note-reps', block: block.id, round, reps: Math.floor(random.between(0, asked)) },
      now + 4_000,
    )
  }

  if (member.countsAfterwards) {
    for (const [blockIndex, block] of version.spec.blocks.entries()) {
      const plan = blockPlan(version, block, run.blocks[blockIndex]?.options)
      if (!plan) continue
      let seconds = 0
      for (let round = 1; round <= Math.min(plan.roundLimit, 40); round += 1) {
        seconds += roundSeconds(plan, round, seconds, member, random)
        if (seconds > plan.seconds) break
        send(
          { type: 'set-round', block: block.id, round, done: true, by: 'afterwards' },
          now + 20_000,
        )
      }
    }
  }
  const meant = version.spec.intendedRpe ?? 6
  const rpe = Math.min(10, Math.max(1, Math.round(meant + random.between(-1.6, 1.8))))
  const notes = [
    '',
    '',
    '',
    'Felt good',
    'Last block was long',
    'Slept badly',
    'Could do more next time',
  ] as const
  const note = random.pick(notes)
  if (untilMs === null) {
    send(
      {
        type: 'rate',
        rpe,
        ...(note ? { note } : {}),
        ...(incident?.hurt ? { hurts: [{ where: incident.hurt }] } : {}),
      },
      now + 60_000,
    )
  }
  return events
}
