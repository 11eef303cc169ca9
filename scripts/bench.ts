/** What `npm run bench` measures and shows; see bench.mjs. */
import { performance } from 'node:perf_hooks'
import { demoMovements } from '@/db/seed/movements'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { forecast } from '@/server/engine/pace/forecast'
import { leadSchedule } from '@/server/engine/pace/lead'
import { FROM_THE_START, TIRING } from '@/server/engine/pace/walk'
import { check } from '@/server/engine/spec/problems'
import type { Block, Cue } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import { compile, realLengthMs } from '@/server/engine/timeline/compile'
import { browserRows } from './bench-browser'
import { dataRows } from './bench-data'
import { loadRow } from './bench-load'
import type { BenchRow } from './bench-row'

/** `measuredMs`, `barMs`: milliseconds. */
function timeRow(what: string, measuredMs: number, barMs: number): BenchRow {
  return {
    what,
    measured: `${measuredMs.toFixed(3)} ms`,
    bar: `≤ ${barMs} ms`,
    isHeld: measuredMs <= barMs,
  }
}

const WARM_UP_RUNS = 20
const RUNS = 101

/** Median of many runs after warming up, in milliseconds. */
function medianMs(work: () => unknown): number {
  for (let run = 0; run < WARM_UP_RUNS; run += 1) work()
  const times = Array.from({ length: RUNS }, () => {
    const from = performance.now()
    work()
    return performance.now() - from
  }).sort((a, b) => a - b)
  return times[Math.floor(times.length / 2)] ?? Number.NaN
}

const BLOCKS = 40
const BLOCK_SECONDS = 240
const CUES = 60
const STATIONS = 12

function cues(): Cue[] {
  return Array.from({ length: CUES }, (_, index) => ({
    id: `cue-${index}`,
    text: 'Breathe out on the way up',
    kind: 'breath',
    at: { from: 'start', s: index * 4 },
  }))
}

/** The longest class that a spec may describe: 40 blocks, 3 hours, 60 cues a block. */
function longestClass(): PublishedVersion {
  const slugs = demoMovements.slice(0, STATIONS).map((movement) => movement.slug)
  const at = (index: number) => slugs[index % slugs.length] ?? ''
  const stations = Array.from({ length: STATIONS }, (_, index) => at(index))
  const blocks = Array.from({ length: BLOCKS }, (_, index): Block => {
    const isRounds = index % 2 === 0
    return {
      id: `block-${index}`,
      kind: 'work',
      title: `Block ${index + 1}`,
      brief: 'One line of what is to come.',
      briefSeconds: 24,
      cues: cues(),
      format: isRounds
        ? {
            type: 'rounds',
            seconds: BLOCK_SECONDS,
            stations: stations.map((movement) => ({ movement, reps: { from: 1, step: 1 } })),
          }
        : {
            type: 'intervals',
            rounds: 4,
            stations: stations.map((movement) => ({ movement, work: 4, rest: 1 })),
          },
    }
  })
  return { spec: { spec: 1, title: 'The longest', blocks }, movements: demoMovements }
}

/** A block of ten minutes, as coaches write them. */
function tenMinutes(): PublishedVersion {
  const [first, second] = demoMovements
  if (!first || !second) throw new Error('The demo has no movements.')
  const stations = [first, second].map(({ slug }) => ({
    movement: slug,
    reps: { from: 2, step: 2 },
  }))
  const block: Block = {
    id: 'ten',
    kind: 'work',
    title: 'Ten minutes',
    format: { type: 'rounds', seconds: 600, stations },
  }
  return { spec: { spec: 1, title: 'Ten minutes', blocks: [block] }, movements: demoMovements }
}

/** Rounds done, some taken back, options changed: `count` events of one attempt, as read from storage. */
function manyEvents(count: number): ClassEvent[] {
  const events = Array.from({ length: count }, (_, index): ClassEvent => {
    const block = `block-${(Math.floor(index / 250) * 2) % BLOCKS}`
    const round = (index % 250) + 1
    const stamp = {
      id: `event-${index}`,
      device: 'bench',
      seq: index + 1,
      classMs: index * 1_000,
      wallMs: 1_764_000_000_000 + index * 1_000,
      block,
    }
    if (index % 20 === 7)
      return { ...stamp, type: 'option-chosen', station: 0, option: 'as-planned' }
    if (index % 20 === 13) return { ...stamp, type: 'round-undone', round, by: 'member' }
    return { ...stamp, type: 'round-done', round, by: 'member' }
  })
  return JSON.parse(JSON.stringify(events)) as ClassEvent[]
}

function engineRows(): BenchRow[] {
  const longest = longestClass()
  const problems = check(longest.spec)
  if (problems.length > 0)
    throw new Error(`The class to measure is not allowed: ${JSON.stringify(problems)}`)
  const events = manyEvents(10_000)
  const ten = tenMinutes()
  const hours = (realLengthMs(longest) / 3_600_000).toFixed(1)
  return [
    timeRow(
      `compile the longest class (${BLOCKS} blocks, ${hours} h, ${CUES} cues a block)`,
      medianMs(() => compile(longest)),
      5,
    ),
    timeRow(
      'fold 10,000 events',
      medianMs(() => fold(longest, events)),
      10,
    ),
    timeRow(
      'forecast and lead of a block of ten minutes',
      medianMs(() => {
        forecast(ten, { tiring: TIRING.expected })
        const plan = blockPlan(ten, ten.spec.blocks[0] as Block)
        return plan && leadSchedule(plan, FROM_THE_START)
      }),
      1,
    ),
  ]
}

async function main(): Promise<void> {
  const parts = process.env.BENCH_PARTS?.split(',') ?? []
  const url = process.env.TEST_DATABASE_URL ?? ''
  const origin = process.env.BENCH_ORIGIN ?? ''
  const rows: BenchRow[] = []
  if (parts.includes('engine')) rows.push(...engineRows())
  if (parts.includes('data')) rows.push(...(await dataRows(url)))
  if (parts.includes('browser')) rows.push(...(await browserRows(origin, url)))
  if (parts.includes('load')) rows.push(await loadRow(origin, url))
  if (rows.length === 0) throw new Error('Say `npm run bench`: it starts what this measures on.')
  console.table(rows.map(({ isHeld, ...row }) => ({ ...row, held: isHeld ? 'yes' : 'NO' })))
  if (rows.some((row) => !row.isHeld)) process.exitCode = 1
}

main().catch((error: unknown) => {
  console.error(error)
  process.exitCode = 1
})
