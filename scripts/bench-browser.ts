/** What the product comes to in Debian's Chromium: sound, picture, main thread, JavaScript, Web Vitals. */
import { gzipSync } from 'node:zlib'
import { chromium, type Browser, type BrowserContext, type Page } from '@playwright/test'
import { eq, sql } from 'drizzle-orm'
import { openDatabase, type Database } from '@/db/client'
import { people } from '@/db/schema/people'
import { demoClasses } from '@/db/seed/classes'
import { demoMovements } from '@/db/seed/movements'
import { demoMembers, demoStaff } from '@/db/seed/people'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'
// The browser test and the bench judge by one probe, which lies with the tests.
/* eslint-disable no-restricted-imports */
import { beepingClass, plantClass, signedInAs } from '@/tests/support/sound-class'
import {
  addProbe,
  eventsSentBy,
  instantOf,
  judgeSounds,
  percentile,
  pictureLagsMs,
  plannedSounds,
  readProbe,
  sizes,
  type ProbeLog,
  type SoundResult,
} from '@/tests/support/sound-probe'
import { openTabs } from '@/tests/support/tabs'
/* eslint-enable no-restricted-imports */
import type { BenchRow } from './bench-row'

const SLOWER = 4

/** Five minutes with 135 sounds: one in a hundred is then more than the worst single one. */
const beeps = beepingClass({
  type: 'intervals',
  rounds: 5,
  stations: [
    { movement: 'jumping-jack', work: 8, rest: 4 },
    { movement: 'march', work: 8, rest: 4 },
    { movement: 'goblet-squat', work: 31, rest: 5 },
  ],
})

const button = (page: Page, name: RegExp | string) => page.getByRole('button', { name }).first()

async function begin(page: Page, address: string): Promise<void> {
  await page.goto(address)
  await button(page, 'Start class').click()
}

interface Played {
  log: ProbeLog
  result: SoundResult
}

/** Begins a class in `page`; `judge`, once it is over, says what was heard and seen. */
async function playing(
  page: Page,
  address: string,
  version: PublishedVersion,
): Promise<{ judge(): Promise<Played> }> {
  const events = eventsSentBy(page)
  await begin(page, address)
  return {
    async judge() {
      const log = await readProbe(page)
      const started = events.find((event) => event.type === 'started')
      if (!started) throw new Error('The class did not start.')
      const planFrom = (atMs: number) => plannedSounds(version, atMs)
      const startMs = instantOf(log, started, planFrom)
      return { log, result: judgeSounds(log, planFrom(startMs), Infinity) }
    },
  }
}

function soundRow(what: string, { planned, errorsMs, ...result }: SoundResult): BenchRow {
  const worstMs = percentile(sizes(errorsMs), 0.99)
  const { missed, doubled, unplanned } = result
  const strays = doubled.length + unplanned.length
  for (const one of [...missed, ...doubled, ...unplanned]) console.error(`${what}: ${one}`)
  return {
    what: `sound, tab ${what}: ${planned.length} sounds planned against put on the audio clock`,
    measured: `p99 ${worstMs.toFixed(1)} ms, ${missed.length} missed, ${strays} doubled`,
    bar: '≤ 10 ms, none, none',
    isHeld: worstMs <= 10 && missed.length === 0 && strays === 0,
  }
}

/** One class in a tab that is seen, one in a tab behind it, at once and to their ends. */
async function soundRows(origin: string, db: Database): Promise<BenchRow[]> {
  const planted = await plantClass(db, beeps, 2)
  const { cookie } = await planted.member('Ada Sounding')
  const [one = '', other = ''] = planted.scheduledClassIds
  const tabs = await openTabs(origin, cookie)
  try {
    await addProbe(tabs.context)
    const behind = tabs.context.pages()[0] ?? (await tabs.context.newPage())
    const hidden = await playing(behind, `${origin}/play/${one}`, beeps)
    const front = await tabs.context.newPage()
    await front.bringToFront()
    const seen = await playing(front, `${origin}/play/${other}`, beeps)
    await front.waitForTimeout(compile(beeps).lengthMs + 2_000)
    const ofHidden = await hidden.judge()
    const ofSeen = await seen.judge()
    if (ofHidden.log.visibility.at(-1)?.state !== 'hidden') throw new Error('No tab was hidden.')
    const pictureMs = percentile(pictureLagsMs(ofSeen.log, ofSeen.result), 0.95)
    return [
      soundRow('seen', ofSeen.result),
      soundRow('hidden', ofHidden.result),
      {
        what: 'picture: the number changes with its sound',
        measured: `p95 ${pictureMs.toFixed(1)} ms`,
        bar: '≤ 34 ms',
        isHeld: pictureMs <= 34,
      },
    ]
  } finally {
    await tabs.close()
  }
}

const WARM_UP_MS = 4_000
const TRACED_MS = 25_000

interface TraceEvent {
  name: string
  ph: string
  pid: number
  tid: number
  /** Thread time, microseconds. */
  tdur?: number
  args?: { name?: string }
}

async function slowed(page: Page): Promise<void> {
  const session = await page.context().newCDPSession(page)
  await session.send('Emulation.setCPUThrottlingRate', { rate: SLOWER })
}

/** The demo's class of half an hour, begun with its first work: a real lane, cues and figures. */
function workFirst(): PublishedVersion {
  const { slipway } = demoClasses
  const blocks = slipway.blocks.slice(slipway.blocks.findIndex((block) => block.kind === 'work'))
  const [first, ...others] = blocks
  if (!first) throw new Error('The demo’s class has no work.')
  const { brief: _brief, briefSeconds: _briefSeconds, ...bare } = first
  return { spec: { ...slipway, blocks: [bare, ...others] }, movements: demoMovements }
}

/**
 * Twenty-five seconds of work, in which nothing happens but that time passes. By the thread's own time:
 * what else the computer does is not counted, the browser's slowing down is.
 */
async function mainThreadRow(origin: string, db: Database, browser: Browser): Promise<BenchRow> {
  const planted = await plantClass(db, workFirst())
  const { cookie } = await planted.member('Bela Sounding')
  const context = await contextOf(browser, origin, cookie)
  const page = await context.newPage()
  await begin(page, `${origin}/play/${planted.scheduledClassIds[0]}`)
  await button(page, /^Log round/).waitFor()
  await slowed(page)
  await page.waitForTimeout(WARM_UP_MS)
  await browser.startTracing(page, { categories: ['disabled-by-default-devtools.timeline'] })
  const fromMs = performance.now()
  await page.waitForTimeout(TRACED_MS)
  const tracedMs = performance.now() - fromMs
  const trace = await browser.stopTracing()
  await context.close()
  const { traceEvents } = JSON.parse(trace.toString()) as { traceEvents: TraceEvent[] }
  const tasksMs = busiestMainThread(traceEvents)
  const share = tasksMs.reduce((sum, ms) => sum + ms, 0) / tracedMs
  const longestMs = Math.max(...tasksMs)
  return {
    what: `main thread in work, ${SLOWER} × slower: share of a core, longest task`,
    measured: `${(share * 100).toFixed(1)} %, ${longestMs.toFixed(0)} ms`,
    bar: '≤ 25 %, ≤ 50 ms',
    isHeld: tasksMs.length > 0 && share <= 0.25 && longestMs <= 50,
  }
}

/** Lengths of the tasks on the page's main thread, milliseconds: of a browser's few pages the busy one. */
function busiestMainThread(events: readonly TraceEvent[]): number[] {
  const threads = events
    .filter((event) => event.name === 'thread_name' && event.args?.name === 'CrRendererMain')
    .map(({ pid, tid }) =>
      events
        .filter(
          (event) =>
            event.pid === pid && event.tid === tid && event.ph === 'X' && event.name === 'RunTask',
        )
        .map((event) => (event.tdur ?? 0) / 1_000),
    )
  const total = (tasks: number[]) => tasks.reduce((sum, ms) => sum + ms, 0)
  return threads.sort((a, b) => total(b) - total(a))[0] ?? []
}

async function contextOf(
  browser: Browser,
  origin: string,
  cookie: string | null,
): Promise<BrowserContext> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } })
  if (cookie) await context.addCookies([{ name: 'floorside', value: cookie, url: origin }])
  return context
}

/** Scripts that a page loads by name, with their length as sent. */
async function scriptsOf(
  context: BrowserContext,
  address: string,
  more: (page: Page) => Promise<void> = () => Promise.resolve(),
): Promise<Map<string, number>> {
  const page = await context.newPage()
  const reading: Promise<[string, number]>[] = []
  page.on('response', (response) => {
    if (response.request().resourceType() !== 'script' || !response.ok()) return
    reading.push(
      response.body().then((body) => [new URL(response.url()).pathname, gzipSync(body).length]),
    )
  })
  await page.goto(address)
  await page.waitForLoadState('networkidle')
  await more(page)
  const scripts = new Map(await Promise.all(reading))
  await page.close()
  return scripts
}

const total = (scripts: Map<string, number>) =>
  [...scripts.values()].reduce((sum, bytes) => sum + bytes, 0)
const kilobytes = (bytes: number) => `${(bytes / 1_000).toFixed(1)} kB`

/**
 * An empty page sends what every page does: what is common to two pages that have nothing in common but
 * the framework and the frame around every page.
 */
async function scriptsRow(origin: string, db: Database, browser: Browser): Promise<BenchRow> {
  const planted = await plantClass(db, beeps)
  const { cookie } = await planted.member('Cleo Sounding')
  // A context each: what one page has loaded, another would take from its cache.
  const loaded = async (path: string, more?: (page: Page) => Promise<void>) => {
    const context = await contextOf(browser, origin, cookie)
    const scripts = await scriptsOf(context, `${origin}${path}`, more)
    await context.close()
    return scripts
  }
  const player = await loaded(`/play/${planted.scheduledClassIds[0]}`, async (page) => {
    await button(page, 'Start class').click()
    await page.waitForTimeout(3_000)
  })
  const bare = await loaded('/nowhere')
  const empty = new Map([...bare].filter(([name]) => player.has(name)))
  const above = total(player) - total(empty)
  return {
    what: `JavaScript of the player above an empty page (${kilobytes(total(empty))}), gzip`,
    measured: kilobytes(above),
    bar: '≤ 90 kB',
    isHeld: above <= 90_000,
  }
}

interface Vitals {
  page: string
  lcpMs: number
  cls: number
  inpMs: number
}

/** Runs in the page before anything of its own: keeps what the browser says of its speed. */
function installVitals(): void {
  const vitals = { lcpMs: 0, cls: 0, inpMs: 0 }
  Object.assign(window, { benchVitals: vitals })
  const watch = (options: PerformanceObserverInit, work: (entry: PerformanceEntry) => void) =>
    new PerformanceObserver((list) => list.getEntries().forEach(work)).observe({
      buffered: true,
      ...options,
    })
  watch({ type: 'largest-contentful-paint' }, (entry) => {
    vitals.lcpMs = entry.startTime
  })
  watch({ type: 'layout-shift' }, (entry) => {
    const { value, hadRecentInput } = entry as PerformanceEntry & {
      value: number
      hadRecentInput: boolean
    }
    if (!hadRecentInput) vitals.cls += value
  })
  watch({ type: 'event', durationThreshold: 16 } as PerformanceObserverInit, (entry) => {
    const { interactionId } = entry as PerformanceEntry & { interactionId?: number }
    if (interactionId) vitals.inpMs = Math.max(vitals.inpMs, entry.duration)
  })
}

/** What somebody presses first on a page and stays on it. */
async function pressSomething(page: Page): Promise<void> {
  const start = button(page, 'Start class')
  if (await start.isVisible()) {
    await start.click()
    const log = button(page, /^Log round/)
    await log.waitFor({ timeout: 60_000 })
    await page.keyboard.press('Space')
    await page.keyboard.press('o')
    await page.waitForTimeout(500)
    return
  }
  const field = page.locator('main input:visible, main select:visible').first()
  if ((await field.count()) > 0) await field.click({ force: true })
  await page.locator('main h1, main h2').first().click()
  await page.keyboard.press('Tab')
  await page.waitForTimeout(500)
}

async function vitalsOf(context: BrowserContext, origin: string, path: string): Promise<Vitals> {
  const page = await context.newPage()
  await slowed(page)
  await page.goto(`${origin}${path}`)
  await page.waitForLoadState('networkidle', { timeout: 4_000 }).catch(() => undefined)
  await page.waitForTimeout(1_000)
  await pressSomething(page)
  const vitals = await page.evaluate(
    () => (window as unknown as { benchVitals: Omit<Vitals, 'page'> }).benchVitals,
  )
  await page.close()
  return { page: path.replace(/\/[0-9a-f-]{36}/g, '/…'), ...vitals }
}

async function vitalsRows(origin: string, db: Database, browser: Browser): Promise<BenchRow[]> {
  const cookieOf = async (name: string) => {
    const email = [...demoStaff, ...demoMembers].find((one) => one.name === name)?.email ?? ''
    const [person] = await db.select({ id: people.id }).from(people).where(eq(people.email, email))
    if (!person) throw new Error(`Nobody is called ${name}.`)
    return signedInAs(db, person.id)
  }
  const [attempt] = await db.execute<{ class_id: string; id: string }>(sql`
    select a.scheduled_class_id as class_id, a.id from attempts a
    join memberships m on m.id = a.membership_id join people p on p.id = m.person_id
    where p.name = 'Nadia Ferrante' and a.state = 'finished' order by a.created_at desc limit 1`)
  if (!attempt) throw new Error('The demo has no attempt that is finished.')
  // Work that is logged comes at once, not after a warm-up.
  const planted = await plantClass(
    db,
    beepingClass({
      type: 'rounds',
      seconds: 90,
      stations: [
        { movement: 'goblet-squat', reps: 2 },
        { movement: 'push-up', reps: 2 },
      ],
    }),
  )
  const player = await planted.member('Dora Sounding')
  const visits: [cookie: string | null, paths: string[]][] = [
    [null, ['/sign-in']],
    [
      await cookieOf('Nadia Ferrante'),
      [
        '/today',
        '/classes',
        `/classes/${attempt.class_id}`,
        '/tally',
        `/tally/${attempt.id}`,
        '/health',
        '/account',
      ],
    ],
    [player.cookie, [`/play/${planted.scheduledClassIds[0]}`]],
    [await cookieOf('Tomasz Brandt'), [`/board/${attempt.class_id}`, '/board/all']],
    [await cookieOf('Marta Lindqvist'), ['/gym']],
  ]
  const all: Vitals[] = []
  for (const [cookie, paths] of visits) {
    for (const path of paths) {
      // A first visit each: nothing of it is in the browser's cache.
      const context = await contextOf(browser, origin, cookie)
      await context.addInitScript('globalThis.__name ??= (value) => value')
      await context.addInitScript(installVitals)
      all.push(await vitalsOf(context, origin, path))
      await context.close()
    }
  }
  console.table(all.map((one) => ({ ...one, cls: Number(one.cls.toFixed(3)) })))
  const row = (
    name: string,
    key: 'lcpMs' | 'cls' | 'inpMs',
    bar: number,
    text: (value: number) => string,
  ): BenchRow => {
    const worst = all.reduce((a, b) => (b[key] > a[key] ? b : a))
    return {
      what: `${name}, worst of ${all.length} pages, ${SLOWER} × slower`,
      measured: `${text(worst[key])} (${worst.page})`,
      bar: `≤ ${text(bar)}`,
      isHeld: worst[key] <= bar,
    }
  }
  const ms = (value: number) => `${value.toFixed(0)} ms`
  return [
    row('LCP', 'lcpMs', 2_500, ms),
    row('CLS', 'cls', 0.1, (value) => value.toFixed(2)),
    row('INP', 'inpMs', 200, ms),
  ]
}

/** Measures the product served at `origin` on the database at `url`. */
export async function browserRows(origin: string, url: string): Promise<BenchRow[]> {
  const { db, sql: pool } = openDatabase(url, 4)
  try {
    const sound = await soundRows(origin, db)
    const browser = await chromium.launch({
      executablePath: '/usr/bin/chromium',
      args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'],
    })
    try {
      return [
        ...sound,
        await mainThreadRow(origin, db, browser),
        await scriptsRow(origin, db, browser),
        ...(await vitalsRows(origin, db, browser)),
      ]
    } finally {
      await browser.close()
    }
  } finally {
    await pool.end({ timeout: 5 })
  }
}
