import { describe, expect, it } from 'vitest'
import { indexedMemory, safeMemory, volatileMemory } from '@/hooks/player/memory'
import type { PlayerMemory } from '@/hooks/player/ports'
import type { ClassEvent } from '@/server/engine/tally/events'
import { eventually, playerBench, type PlayerBench, type Tab } from '../support/player-bench'

const LADDER = 'row-and-lunge'
/** Into the ladder: the warm-up's 300 s, the brief's 20 s, the count-in's 5 s, and some. */
const IN_LADDER_MS = 330_000

async function inLadder(bench: PlayerBench): Promise<Tab> {
  const tab = await bench.openTab()
  tab.player.store.getState().start(null)
  await bench.pass(IN_LADDER_MS, 5_000)
  expect(tab.state().position?.segment).toMatchObject({ block: LADDER, kind: 'work' })
  return tab
}

async function logRound(bench: PlayerBench, tab: Tab): Promise<void> {
  tab.state().send({ type: 'log-round', by: 'member' })
  await bench.pass(2_000)
}

const ladderOf = (tab: Tab) =>
  tab.state().tally?.blocks.find((block) => block.block === LADDER)?.rounds
const typesOf = (events: readonly ClassEvent[]) => events.map((event) => event.type)
const serverEvents = (bench: PlayerBench) =>
  [...bench.server.events.values()].map((one) => one.event).sort((a, b) => a.seq - b.seq)

describe('a class that is fitted to its member', () => {
  it('starts on the fitted options and tells of each whose choice it is', async () => {
    const bench = playerBench({
      fitted: [
        {
          block: 'row-and-lunge',
          station: 0,
          option: 'hand-on-a-chair',
          from: 'note',
          why: 'Hand on a chair, since your lower back is on your notes.',
          conflicts: [],
        },
        {
          block: 'warm-up',
          station: 1,
          option: 'hands-on-a-table',
          from: 'coach',
          why: null,
          conflicts: [],
        },
      ],
    })
    const tab = await bench.openTab()
    expect(tab.state().options).toMatchObject({ 'row-and-lunge/0': 'hand-on-a-chair' })
    tab.state().chooseStartOption('row-and-lunge/1', 'as-planned')
    tab.state().start(null)
    await bench.settle()
    const started = tab.state().events.find((event) => event.type === 'started')
    const from = (block: string, station: number) =>
      started?.options.find((one) => one.block === block && one.station === station)
    expect(from('row-and-lunge', 0)).toMatchObject({ option: 'hand-on-a-chair', from: 'fitted' })
    expect(from('warm-up', 1)).toMatchObject({ option: 'hands-on-a-table', from: 'coach' })
    expect(from('row-and-lunge', 1)).toMatchObject({ option: 'as-planned', from: 'coach' })
  })
})

describe('a class played', () => {
  it('is recorded by stamped events whose seq goes up by one, each sent exactly once', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    await logRound(bench, tab)
    await logRound(bench, tab)
    await eventually(() => expect(serverEvents(bench)).toHaveLength(tab.state().events.length))
    const events = serverEvents(bench)
    expect(events.map((event) => event.seq)).toEqual(events.map((_, index) => index + 1))
    expect(new Set(events.map((event) => event.id)).size).toBe(events.length)
    expect(typesOf(events).filter((type) => type === 'round-done')).toHaveLength(2)
    expect(bench.server.requests.flatMap((one) => one.input.events)).toHaveLength(events.length)
    expect(tab.state().saving).toEqual({ state: 'saved', unsent: 0, message: null })
    expect(ladderOf(tab)).toBe(2)
  })

  it('shows a round as done only once storage has it', async () => {
    const slow = indexedMemory()
    let release: (() => void) | null = null
    let isHeld = false
    const memory: PlayerMemory = safeMemory({
      ...slow,
      isDurable: true,
      async keepEvents(events) {
        if (isHeld) await new Promise<void>((resolve) => (release = resolve))
        await slow.keepEvents(events)
      },
    })
    const bench = playerBench()
    const tab = await bench.openTab({ memory })
    tab.state().start(null)
    await bench.pass(IN_LADDER_MS, 5_000)
    isHeld = true
    tab.state().send({ type: 'log-round', by: 'member' })
    await bench.settle()
    expect(ladderOf(tab)).toBe(0)
    expect(tab.state().saving.state).toBe('sending')
    expect(release).not.toBeNull()
    isHeld = false
    ;(release as (() => void) | null)?.()
    await eventually(() => expect(ladderOf(tab)).toBe(1))
  })

  it('goes to its rating when the last segment has run out, and keeps the screen awake until then', async () => {
    const bench = playerBench()
    const tab = await bench.openTab()
    tab.state().start('slept badly')
    expect(tab.awake).toBe(true)
    await bench.pass(2_100_000, 5_000)
    expect(tab.state().stage).toBe('after')
    expect(tab.awake).toBe(false)
    tab.state().send({ type: 'rate', rpe: 6 })
    await eventually(() => expect(typesOf(serverEvents(bench)).at(-1)).toBe('rated'))
    expect(typesOf(serverEvents(bench)).filter((type) => type === 'finished')).toHaveLength(1)
    expect(bench.server.requests[0]?.input.todayNote).toBe('slept badly')
  })

  it('ignores a second press within 1.5 s and says so', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    tab.state().send({ type: 'log-round', by: 'member' })
    await bench.pass(1_000)
    tab.state().send({ type: 'log-round', by: 'member' })
    await bench.settle()
    expect(ladderOf(tab)).toBe(1)
    expect(tab.state().notice?.text).toMatch(/second/)
  })

  it('shows a cue when it is due', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const bodyMs = tab.state().position?.bodyElapsedMs ?? 0
    await bench.pass(12_000 - bodyMs + 400)
    expect(tab.state().due?.text).toBe('Elbows to your back pockets')
    expect(tab.state().due?.sinceMs).toBeLessThanOrEqual(450)
    expect(tab.state().cueLine[0]).toMatchObject({ text: 'Breathe out as you pull' })
  })

  it('gives each event of another device its place: seq goes on from the highest that the server has', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const { attemptId } = tab.state()
    bench.server.events.set('other', {
      attemptId: attemptId ?? '',
      event: { id: 'other', device: 'phone', seq: 90, type: 'paused', classMs: 0, wallMs: 0 },
    })
    await logRound(bench, tab)
    await eventually(() => expect(tab.state().saving.state).toBe('saved'))
    await logRound(bench, tab)
    expect(tab.state().events.at(-1)?.seq).toBe(91)
  })
})

describe('the clock of the computer changed in mid-class', () => {
  it.each([
    ['back by an hour', -3_600_000],
    ['back by five seconds', -5_000],
    ['on by twenty seconds', 20_000],
  ])('%s: the class goes on unaffected, with one sentence', async (_, ms) => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const before = tab.state().position?.classMs ?? 0
    await bench.jumpWall(ms)
    expect(tab.state().stage).toBe('class')
    expect(tab.state().position?.classMs).toBe(before + 50)
    expect(tab.state().notice?.text).toContain('clock was changed')
    await logRound(bench, tab)
    expect(ladderOf(tab)).toBe(1)
  })

  it('on by an hour: paused from the last sign of life, and asked; nothing is lost', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    await logRound(bench, tab)
    const before = tab.state().position?.classMs ?? 0
    await bench.jumpWall(3_600_000)
    expect(tab.state()).toMatchObject({ stage: 'gap', gap: { reason: 'clock-changed' } })
    tab.state().goOn('where-i-was')
    await bench.pass(1_000)
    expect(tab.state().stage).toBe('class')
    expect(tab.state().position?.classMs).toBe(before + 1_000)
    expect(ladderOf(tab)).toBe(1)
  })

  it('asleep for two minutes: from where the clock would be is two minutes on', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const before = tab.state().position?.classMs ?? 0
    await bench.jumpWall(120_000)
    tab.state().goOn('where-the-clock-would-be')
    await bench.settle()
    expect(tab.state().position?.classMs).toBe(before + 120_050)
  })

  it('between two loads of the page, to before the class: asked before it goes on, with every round', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    await logRound(bench, first)
    first.kill()
    await bench.jumpWall(-7_200_000)
    const second = await bench.openTab()
    expect(second.state().stage).toBe('resume')
    second.state().resumeOpenAttempt()
    await eventually(() => expect(second.state().stage).toBe('class'))
    expect(second.state().position?.halted).toBe('paused')
    expect(ladderOf(second)).toBe(1)
  })
})

describe('gaps', () => {
  it.each([
    [30_000, 'class'],
    [30_001, 'gap'],
  ] as const)('a frozen tab of %i ms leaves the class at %s', async (ms, stage) => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const before = tab.state().position?.classMs ?? 0
    await bench.freeze(ms)
    expect(tab.state().stage).toBe(stage)
    expect(tab.state().position?.classMs).toBe(stage === 'class' ? before + ms : before)
  })

  it('sound nothing of what was missed, and no mark after the question until it is answered', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    const sounded = tab.sounds.length
    await bench.freeze(45_000)
    await bench.pass(20_000)
    expect(tab.sounds.slice(sounded).filter((one) => !one.isCalledOff)).toEqual([])
  })

  it('a reload within 30 s goes on unasked, at the instant where the clock is, with every round', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    for (let round = 0; round < 3; round += 1) await logRound(bench, first)
    first.state().send({
      type: 'choose-option',
      block: LADDER,
      station: 0,
      option: 'hand-on-a-chair',
    })
    await bench.pass(1_000)
    const before = first.state().position?.classMs ?? 0
    first.kill()
    bench.away(12_000)
    const second = await bench.openTab()
    await eventually(() => expect(second.state().stage).toBe('class'))
    expect(second.state().position?.classMs).toBe(before + 12_000)
    expect(ladderOf(second)).toBe(3)
    expect(second.state().options[`${LADDER}/0`]).toBe('hand-on-a-chair')
    expect(second.state().run?.blocks[1]?.options[0]).toBe('hand-on-a-chair')
  })

  it('closing and reopening offers to go on, then asks where; time spent at the offer counts', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    await logRound(bench, first)
    const before = first.state().position?.classMs ?? 0
    first.kill()
    bench.away(60_000)
    const second = await bench.openTab()
    expect(second.state().stage).toBe('resume')
    expect(second.state().tally?.blocks[1]?.rounds).toBe(1)
    bench.away(30_000)
    second.state().resumeOpenAttempt()
    await eventually(() => expect(second.state().stage).toBe('gap'))
    expect(second.state().gap?.awayMs).toBe(90_000)
    second.state().goOn('where-the-clock-would-be')
    await bench.settle()
    expect(second.state().position?.classMs).toBe(before + 90_000)
  })

  it('starting anew ends the old attempt where it was left and keeps both', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    await logRound(bench, first)
    const old = first.state().attemptId
    first.kill()
    bench.away(600_000)
    const second = await bench.openTab()
    second.state().discardOpenAttempt()
    await eventually(() => expect(second.state().stage).toBe('before'))
    second.state().start(null)
    await bench.pass(2_000)
    expect(second.state().attemptId).not.toBe(old)
    await eventually(() => {
      const ofOld = [...bench.server.events.values()].filter((one) => one.attemptId === old)
      expect(typesOf(ofOld.map((one) => one.event)).filter((type) => type === 'finished')).toEqual([
        'finished',
      ])
    })
    second.kill()
    bench.away(100_000)
    const third = await bench.openTab({
      data: {
        // What a server that had not heard of the end yet would still offer.
        openAttempt: {
          attemptId: old ?? '',
          events: [...bench.server.events.values()]
            .filter((one) => one.attemptId === old)
            .map((one) => one.event),
        },
      },
    })
    expect(third.state().attemptId).toBe(second.state().attemptId)
  })

  it('a paused class comes back paused', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    first.state().send({ type: 'pause' })
    const before = first.state().position?.classMs
    await bench.pass(5_000)
    first.kill()
    bench.away(5_000)
    const second = await bench.openTab()
    expect(second.state().position).toMatchObject({ halted: 'paused', classMs: before })
  })

  it('a stopped class comes back to its stop screen and never goes on by itself', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    first.state().send({ type: 'stop' })
    first.state().send({ type: 'describe-stop', sign: 'chest-pain' })
    await bench.pass(1_000)
    first.kill()
    bench.away(400_000)
    const second = await bench.openTab()
    await eventually(() => expect(second.state().stage).toBe('class'))
    expect(second.state().position).toMatchObject({ halted: 'stopped', redFlag: true })
  })

  it('a reload at the rating comes back to the rating, and once rated to before class', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    await logRound(bench, first)
    first.state().send({ type: 'end-class' })
    await bench.pass(500)
    expect(first.state().stage).toBe('after')
    first.kill()
    bench.away(90_000)
    const second = await bench.openTab()
    await eventually(() => expect(second.state().stage).toBe('after'))
    expect(ladderOf(second)).toBe(1)
    second.state().send({ type: 'rate', rpe: 8 })
    await eventually(() => expect(second.state().tally?.rating?.rpe).toBe(8))
    second.kill()
    const third = await bench.openTab()
    expect(third.state().stage).toBe('before')
  })

  it('an attempt begun on another device is offered with all that the server has', async () => {
    const phone = playerBench()
    const first = await inLadder(phone)
    await logRound(phone, first)
    await eventually(() => expect(first.state().saving.state).toBe('saved'))
    const openAttempt = {
      attemptId: first.state().attemptId ?? '',
      events: serverEvents(phone),
    }
    const laptop = playerBench({ openAttempt })
    laptop.away(IN_LADDER_MS + 60_000)
    const second = await laptop.openTab()
    expect(second.state().stage).toBe('resume')
    second.state().resumeOpenAttempt()
    await eventually(() => expect(second.state().position?.halted).toBe('paused'))
    expect(ladderOf(second)).toBe(1)
    await logRound(laptop, second)
    second.state().send({ type: 'resume' })
    await laptop.settle()
    const highest = Math.max(...openAttempt.events.map((event) => event.seq))
    for (const event of second.state().events.slice(openAttempt.events.length)) {
      expect(event.seq).toBeGreaterThan(highest)
    }
  })
})

describe('storage full or refused', () => {
  const refusing = (name: string): PlayerMemory => {
    const real = indexedMemory()
    return {
      ...real,
      isDurable: true,
      keepEvents: () => Promise.reject(new DOMException('No room', name)),
      keepAttempt: () => Promise.reject(new DOMException('No room', name)),
    }
  }

  it.each(['QuotaExceededError', 'SecurityError'])(
    '%s: the class goes on, says that it is not kept while anything is unsent, and sends all of it',
    async (name) => {
      const bench = playerBench()
      bench.server.mode = 'away'
      const tab = await bench.openTab({ memory: safeMemory(refusing(name)) })
      tab.state().start(null)
      await bench.pass(IN_LADDER_MS, 5_000)
      await logRound(bench, tab)
      expect(ladderOf(tab)).toBe(1)
      expect(tab.state().saving).toMatchObject({ state: 'not-kept' })
      expect(tab.state().saving.message).toMatch(/leave the page open/)
      bench.server.mode = 200
      await bench.pass(31_000)
      await eventually(() => expect(tab.state().saving.state).toBe('saved'))
      expect(serverEvents(bench).map((event) => event.id)).toEqual(
        tab.state().events.map((event) => event.id),
      )
    },
  )

  it('room again in mid-class: what was owed is kept, and a reload has every round', async () => {
    const bench = playerBench()
    bench.server.mode = 'away'
    const real = indexedMemory()
    let isFull = true
    const memory = safeMemory({
      ...real,
      isDurable: true,
      keepEvents: (events) =>
        isFull
          ? Promise.reject(new DOMException('No room', 'QuotaExceededError'))
          : real.keepEvents(events),
    })
    const first = await bench.openTab({ memory })
    first.state().start(null)
    await bench.pass(IN_LADDER_MS, 5_000)
    await logRound(bench, first)
    expect(memory.isDurable).toBe(false)
    isFull = false
    await logRound(bench, first)
    await eventually(() => expect(memory.isDurable).toBe(true))
    first.kill()
    bench.away(5_000)
    const second = await bench.openTab()
    await eventually(() => expect(ladderOf(second)).toBe(2))
  })

  it('no storage at all: playable, and said', async () => {
    const bench = playerBench()
    bench.server.mode = 'away'
    const tab = await bench.openTab({ memory: safeMemory(volatileMemory()) })
    expect(tab.state().stage).toBe('before')
    tab.state().start(null)
    await bench.pass(1_000)
    expect(tab.state().stage).toBe('class')
    expect(tab.state().saving.state).toBe('not-kept')
  })
})

describe('sound blocked', () => {
  it('says so, plays nothing before it runs, and loses no mark after', async () => {
    const bench = playerBench()
    bench.sound('blocked')
    const tab = await bench.openTab()
    expect(tab.state().sound).toBe('blocked')
    tab.state().start(null)
    await bench.pass(41_000)
    expect(tab.sounds).toEqual([])
    bench.sound('ready')
    expect(tab.state().sound).toBe('ready')
    await bench.pass(4_200)
    // The switch of five seconds after the first 40 s: three knocks and the bell, nothing from before.
    expect(tab.sounds.map((one) => one.name)).toEqual(['knock', 'knock', 'knock', 'bell'])
  })

  it('a sound check after the first press plays the count: three knocks and the bell, a second apart', async () => {
    const bench = playerBench()
    const tab = await bench.openTab()
    tab.state().playCount()
    await bench.settle()
    expect(tab.sounds.map((one) => one.name)).toEqual(['knock', 'knock', 'knock', 'bell'])
    const [first, ...rest] = tab.sounds
    expect(rest.map((one) => one.atMs - (first?.atMs ?? 0))).toEqual([1_000, 2_000, 3_000])
    tab.state().playCount()
    await bench.settle()
    expect(tab.sounds.filter((one) => !one.isCalledOff)).toHaveLength(4)
  })
})

describe('two tabs playing one attempt', () => {
  it('the second says so, writes nothing, can take over, and the first then says so and writes nothing', async () => {
    const bench = playerBench()
    const first = await inLadder(bench)
    await logRound(bench, first)
    const second = await bench.openTab()
    await eventually(() => expect(second.state().otherTab).toBe(true))
    second.state().send({ type: 'log-round', by: 'member' })
    await logRound(bench, first)
    expect(ladderOf(first)).toBe(2)

    second.state().takeOver()
    await eventually(() => expect(second.state().stage).toBe('class'))
    expect(second.state().otherTab).toBe(false)
    expect(first.state().otherTab).toBe(true)
    expect(ladderOf(second)).toBe(2)
    expect(second.state().position?.classMs).toBe(first.state().position?.classMs)

    const known = first.state().events.length
    const sounded = first.sounds.length
    first.state().send({ type: 'log-round', by: 'member' })
    await logRound(bench, second)
    await bench.pass(60_000)
    expect(first.state().events).toHaveLength(known)
    expect(first.sounds).toHaveLength(sounded)
    expect(ladderOf(second)).toBe(3)

    first.state().takeOver()
    await eventually(() => expect(first.state().otherTab).toBe(false))
    await eventually(() => expect(ladderOf(first)).toBe(3))
    expect(second.state().otherTab).toBe(true)
    const seqs = first.state().events.map((event) => event.seq)
    expect(new Set(seqs).size).toBe(seqs.length)
  })
})

describe('offline, then online', () => {
  it('rounds are kept here, counted as unsent, and sent when the network is back', async () => {
    const bench = playerBench()
    const tab = await inLadder(bench)
    await eventually(() => expect(tab.state().saving.state).toBe('saved'))
    bench.server.mode = 'away'
    await logRound(bench, tab)
    await logRound(bench, tab)
    await eventually(() =>
      expect(tab.state().saving).toMatchObject({ state: 'saved-here', unsent: 2 }),
    )
    bench.server.mode = 200
    await bench.pass(31_000)
    await eventually(() => expect(tab.state().saving).toMatchObject({ state: 'saved', unsent: 0 }))
    expect(typesOf(serverEvents(bench)).filter((type) => type === 'round-done')).toHaveLength(2)
  })
})

describe('the browser killed', () => {
  it('right after a round: the round is there at the next opening, and sent', async () => {
    const bench = playerBench()
    bench.server.mode = 'away'
    const first = await inLadder(bench)
    first.state().send({ type: 'log-round', by: 'member' })
    await eventually(() => expect(ladderOf(first)).toBe(1))
    first.kill()
    bench.server.mode = 200
    bench.away(3_000)
    const second = await bench.openTab()
    await eventually(() => expect(ladderOf(second)).toBe(1))
    await eventually(() =>
      expect(typesOf(serverEvents(bench))).toEqual(
        expect.arrayContaining(['started', 'round-done']),
      ),
    )
  })

  it('in the middle of the write: the class is there without that round, sound and playable', async () => {
    const bench = playerBench()
    const real = indexedMemory()
    let isCut = false
    const memory = safeMemory({
      ...real,
      isDurable: true,
      keepEvents: (events) => (isCut ? new Promise(() => undefined) : real.keepEvents(events)),
    })
    const first = await bench.openTab({ memory })
    first.state().start(null)
    await bench.pass(IN_LADDER_MS, 5_000)
    await logRound(bench, first)
    isCut = true
    first.state().send({ type: 'log-round', by: 'member' })
    await bench.settle()
    first.kill()
    bench.away(3_000)
    const second = await bench.openTab()
    await eventually(() => expect(second.state().stage).toBe('class'))
    expect(ladderOf(second)).toBe(1)
    await logRound(bench, second)
    expect(ladderOf(second)).toBe(2)
    const own = second.state().events
    expect(new Set(own.map((event) => event.seq)).size).toBe(own.length)
  })
})

describe('what the browser keeps for the next class', () => {
  it('preferences come back, by member', async () => {
    const bench = playerBench()
    const first = await bench.openTab()
    first.state().setPreferences({ counting: 'afterwards', distanceMetres: 3.5 })
    await bench.settle()
    const second = await bench.openTab()
    expect(second.state().preferences).toMatchObject({
      counting: 'afterwards',
      distanceMetres: 3.5,
    })
    const other = await bench.openTab({ data: { membershipId: 'another-member' } })
    expect(other.state().preferences.counting).toBe('press')
  })

  it('another member of the same computer neither sees nor sends what was not sent', async () => {
    const bench = playerBench()
    bench.server.mode = 'away'
    const first = await inLadder(bench)
    await logRound(bench, first)
    first.kill()
    bench.server.mode = 200
    const other = await bench.openTab({ data: { membershipId: 'another-member' } })
    await bench.pass(5_000)
    expect(other.state()).toMatchObject({ stage: 'before', events: [] })
    expect(bench.server.events.size).toBe(0)
  })
})
