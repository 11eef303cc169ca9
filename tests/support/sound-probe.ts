/**
 * What a player sounded and showed, recorded in its own page, and what that comes to against the plan.
 * The test and the bench judge by this same code.
 */
import type { BrowserContext, Page } from '@playwright/test'
import { clockText } from '@/components/player/texts'
import type { ClassEvent } from '@/server/engine/tally/events'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'
import { soundsOf } from '@/server/engine/timeline/mark-sound'
import type { Segment } from '@/server/engine/timeline/types'

/** `…Ms`: performance.now() of the page; `…Seconds`: currentTime of its audio context. */
interface Start {
  name: string
  whenSeconds: number
  contextSeconds: number
  atMs: number
  /** When it was stopped, if it was. */
  calledOffSeconds: number | null
  /** Counts the times that the context stopped or went on: its clock has one rate in between. */
  epoch: number
}

interface Stamp {
  atMs: number
  epoch: number
  /** What the context says is heard at an instant. */
  heardSeconds: number
  heardAtMs: number
}

export interface ProbeLog {
  starts: Start[]
  stamps: Stamp[]
  /** What the countdown says, at each change. */
  texts: { atMs: number; text: string }[]
  /** Clicks and keys, on both clocks. */
  presses: { atMs: number; wallMs: number }[]
  visibility: { atMs: number; state: string }[]
}

interface Probe {
  log: ProbeLog
  /** The context that sounds are put on. */
  context: AudioContext | null
}

declare global {
  interface Window {
    soundProbe: Probe
  }
}

/** Runs in the page before anything of its own. */
function installProbe(): void {
  const log: ProbeLog = { starts: [], stamps: [], texts: [], presses: [], visibility: [] }
  const probe: Probe = { log, context: null }
  window.soundProbe = probe
  let epoch = 0
  const names = new WeakMap<object, string>()
  const startOf = new WeakMap<AudioScheduledSourceNode, Start>()

  const stamp = () => {
    const { contextTime, performanceTime } = probe.context?.getOutputTimestamp() ?? {}
    if (contextTime === undefined || !performanceTime) return
    log.stamps.push({
      atMs: performance.now(),
      epoch,
      heardSeconds: contextTime,
      heardAtMs: performanceTime,
    })
  }
  setInterval(stamp, 200)

  // A buffer is known by the file that it was decoded from.
  const arrayBuffer = Response.prototype.arrayBuffer
  Response.prototype.arrayBuffer = async function () {
    const body = await arrayBuffer.call(this)
    names.set(body, this.url)
    return body
  }
  const decode = BaseAudioContext.prototype.decodeAudioData
  BaseAudioContext.prototype.decodeAudioData = async function (body, ...rest) {
    const address = names.get(body)
    const buffer = await decode.call(this, body, ...rest)
    if (address) names.set(buffer, address.replace(/^.*\/|\.\w+$/g, ''))
    return buffer
  }
  const { start, stop } = AudioBufferSourceNode.prototype
  AudioBufferSourceNode.prototype.start = function (when = 0, ...rest) {
    const name = this.buffer ? names.get(this.buffer) : undefined
    if (name !== undefined) {
      if (probe.context === null && this.context instanceof AudioContext) {
        probe.context = this.context
        this.context.addEventListener('statechange', () => {
          epoch += 1
        })
      }
      stamp()
      const one: Start = {
        name,
        whenSeconds: when,
        contextSeconds: this.context.currentTime,
        atMs: performance.now(),
        calledOffSeconds: null,
        epoch,
      }
      log.starts.push(one)
      startOf.set(this, one)
    }
    start.call(this, when, ...rest)
  }
  AudioBufferSourceNode.prototype.stop = function (when) {
    const one = startOf.get(this)
    if (one) one.calledOffSeconds ??= Math.max(when ?? 0, this.context.currentTime)
    stop.call(this, when)
  }

  let shown: string | null = null
  new MutationObserver(() => {
    const text = document.querySelector('[data-testid="countdown"]')?.textContent ?? null
    if (text === shown) return
    shown = text
    if (text !== null) log.texts.push({ atMs: performance.now(), text })
  }).observe(document, { subtree: true, childList: true, characterData: true })
  for (const press of ['click', 'keydown']) {
    window.addEventListener(
      press,
      () => log.presses.push({ atMs: performance.now(), wallMs: Date.now() }),
      true,
    )
  }
  document.addEventListener('visibilitychange', () => {
    log.visibility.push({ atMs: performance.now(), state: document.visibilityState })
  })
}

export async function addProbe(context: BrowserContext): Promise<void> {
  // A loader that keeps functions' names calls this helper, which a page does not have.
  await context.addInitScript('globalThis.__name ??= (value) => value')
  await context.addInitScript(installProbe)
}

export const readProbe = (page: Page): Promise<ProbeLog> =>
  page.evaluate(() => window.soundProbe.log)

/** The events that a page sends, as it sends them. */
export function eventsSentBy(page: Page): ClassEvent[] {
  const events: ClassEvent[] = []
  page.on('request', (request) => {
    if (request.method() !== 'POST' || !request.url().endsWith('/events')) return
    const body = request.postDataJSON() as { events: ClassEvent[] }
    const known = new Set(events.map((event) => event.id))
    events.push(...body.events.filter((event) => !known.has(event.id)))
  })
  return events
}

/**
 * Between which instants of the page's clock the player dated what an event tells: from the press that
 * led to it to the stamp of the event. Of the computer's clock only the time between the two is used.
 */
export function boundsOf(log: ProbeLog, event: ClassEvent): [number, number] {
  const press = log.presses.findLast((one) => one.wallMs <= event.wallMs)
  if (!press) throw new Error(`Nothing was pressed before '${event.type}'.`)
  return [press.atMs - 1, press.atMs + (event.wallMs - press.wallMs) + 1]
}

/**
 * The instant within those bounds that fits the sounds best: all of them being off by more than a press
 * takes to be worked on is an error, and every interval between two of them counts in full.
 */
export function instantOf(
  log: ProbeLog,
  event: ClassEvent,
  planFrom: (atMs: number) => readonly PlannedSound[],
): number {
  const [earliest, latest] = boundsOf(log, event)
  const { errorsMs } = judgeSounds(log, planFrom(latest), Infinity)
  const best = latest + (errorsMs.length > 0 ? percentile(errorsMs, 0.5) : 0)
  return Math.min(latest, Math.max(earliest, best))
}

export interface PlannedSound {
  name: string
  atMs: number
  /** What the countdown says from this instant on. */
  text: string
}

/** Sounds of a compiled class that began at `startMs`, and stood for `pause.ms` at `pause.classMs`. */
export function plannedSounds(
  version: PublishedVersion,
  startMs: number,
  pause: { classMs: number; ms: number } | null = null,
): PlannedSound[] {
  const timeline = compile(version)
  return soundsOf(timeline).map(({ atMs, name }) => {
    const later = pause && atMs > pause.classMs ? pause.ms : 0
    return { name, atMs: startMs + atMs + later, text: textAt(timeline.segments, atMs) }
  })
}

function textAt(segments: readonly Segment[], classMs: number): string {
  const segment = segments.find((one) => one.startMs <= classMs && classMs < one.endMs)
  if (!segment) return ''
  const leftMs = segment.endMs - classMs
  return segment.kind === 'count-in' ? String(Math.ceil(leftMs / 1_000)) : clockText(leftMs)
}

/** A sound further than this from every planned one of its name belongs to none of them. */
const BELONGS_WITHIN_MS = 450

export interface SoundResult {
  planned: PlannedSound[]
  /** When each was heard, by index of `planned`; null where it was not. */
  heardMs: (number | null)[]
  /** Heard against planned, milliseconds; negative is early. */
  errorsMs: number[]
  missed: string[]
  doubled: string[]
  unplanned: string[]
  /** How far ahead of its start each was put on the audio clock, milliseconds. */
  aheadMs: number[]
}

/** Sounds up to `untilMs` against their plan; none may come in `silent`, from and to on the page's clock. */
export function judgeSounds(
  log: ProbeLog,
  plan: readonly PlannedSound[],
  untilMs: number,
  silent: readonly [number, number][] = [],
): SoundResult {
  const sounded = log.starts
    .filter((one) => one.calledOffSeconds === null || one.calledOffSeconds > one.whenSeconds)
    .map((one) => ({
      name: one.name,
      heardMs: heardAtMs(log, one),
      aheadMs: (one.whenSeconds - one.contextSeconds) * 1_000,
    }))
    .filter((one) => one.heardMs <= untilMs)
  const planned = plan.filter(
    ({ atMs }) => atMs <= untilMs && !silent.some(([from, to]) => atMs >= from && atMs <= to),
  )
  const words = (one: { name: string }, ms: number) => `${one.name} at ${Math.round(ms)} ms`
  const heardMs: (number | null)[] = []
  const result: SoundResult = {
    planned,
    heardMs,
    errorsMs: [],
    missed: [],
    doubled: [],
    unplanned: [],
    aheadMs: [],
  }
  const left = new Set(sounded)
  for (const one of planned) {
    const mine = [...left].filter(
      ({ name, heardMs: ms }) => name === one.name && Math.abs(ms - one.atMs) <= BELONGS_WITHIN_MS,
    )
    const [first, ...more] = mine
    heardMs.push(first?.heardMs ?? null)
    if (!first) result.missed.push(words(one, one.atMs))
    else {
      result.errorsMs.push(first.heardMs - one.atMs)
      result.aheadMs.push(first.aheadMs)
    }
    result.doubled.push(...more.map((again) => words(again, again.heardMs)))
    for (const again of mine) left.delete(again)
  }
  result.unplanned.push(...[...left].map((one) => words(one, one.heardMs)))
  return result
}

/**
 * When a sound was to be heard, by what the audio clock was as it was put there: the middle one of the
 * readings before, at and after, for a single one is off by a buffer now and then.
 */
function heardAtMs(log: ProbeLog, start: Start): number {
  const stamps = log.stamps.filter((one) => one.epoch === start.epoch)
  const own = stamps.findLastIndex((one) => one.atMs <= start.atMs)
  const offsets = stamps
    .slice(Math.max(0, own - 1), own + 2)
    .map((one) => one.heardAtMs - one.heardSeconds * 1_000)
  return start.whenSeconds * 1_000 + percentile(offsets, 0.5)
}

/** How far from each heard sound the countdown changed to what it then says, milliseconds; Infinity where it did not. */
export function pictureLagsMs(log: ProbeLog, { planned, heardMs }: SoundResult): number[] {
  return planned.flatMap(({ text }, index) => {
    const at = heardMs[index]
    if (at === null || at === undefined || text === '') return []
    const lags = log.texts.filter((one) => one.text === text).map((one) => Math.abs(one.atMs - at))
    const nearest = Math.min(...lags)
    return [nearest < 2 * BELONGS_WITHIN_MS ? nearest : Infinity]
  })
}

/** Nearest rank; NaN of nothing. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? Number.NaN
}

export const sizes = (values: readonly number[]): number[] => values.map(Math.abs)
