/**
 * The command line of a class: check, compile, forecast, score, captions. No database, no network. `class.ts` runs
 * it; apart, so that tests can call it.
 */
import { readFileSync } from 'node:fs'
import { captionsOf } from '@/server/engine/captions/write'
import { forecast } from '@/server/engine/pace/forecast'
import { parseSpecOrVersion } from '@/server/engine/spec/problems'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'
import { scoreBlocks } from '@/server/engine/tally/score'
import { compile } from '@/server/engine/timeline/compile'

const USAGE =
  'Use: check FILE | compile FILE | forecast FILE [--tiring F] [--tempo SECONDS] [--change SECONDS] | score FILE EVENTS | captions FILE. A FILE of - is standard input.'

/** A wrong call: one line, exit 2. */
class WrongCall extends Error {}

function readJson(file: string): unknown {
  let text: string
  try {
    text = readFileSync(file === '-' ? 0 : file, 'utf8')
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? String(error.code) : 'unreadable'
    throw new WrongCall(`Cannot read ${file === '-' ? 'standard input' : file} (${code}).`)
  }
  try {
    return JSON.parse(text.replace(/^\uFEFF/, ''))
  } catch (error) {
    const why = error instanceof Error ? error.message.split('\n')[0] : ''
    throw new WrongCall(`${file === '-' ? 'Standard input' : file} is not JSON: ${why}`)
  }
}

const OPTIONS = ['tiring', 'tempo', 'change'] as const
type Option = (typeof OPTIONS)[number]

interface Call {
  command: string
  files: string[]
  options: Partial<Record<Option, number>>
}

function parseCall(args: readonly string[]): Call {
  const files: string[] = []
  const options: Call['options'] = {}
  for (let index = 0; index < args.length; index += 1) {
    const arg = args[index] ?? ''
    if (arg === '-' || !arg.startsWith('-')) {
      files.push(arg)
      continue
    }
    const [name = '', joined] = arg.replace(/^--/, '').split(/=(.*)/s)
    const option = OPTIONS.find((one) => arg.startsWith('--') && one === name)
    if (!option) throw new WrongCall(`There is no option ${arg}. ${USAGE}`)
    if (options[option] !== undefined) throw new WrongCall(`${arg} is given twice.`)
    let value = joined
    if (value === undefined) {
      index += 1
      value = args[index]
    }
    options[option] = numberOf(option, value)
  }
  return { command: files.shift() ?? '', files, options }
}

function numberOf(option: Option, text: string | undefined): number {
  const value = text === undefined || text.trim() === '' ? NaN : Number(text)
  const isGood =
    Number.isFinite(value) && (option === 'tempo' ? value > 0 : value >= 0) && value <= 10_000
  if (!isGood) {
    const what =
      option === 'tiring'
        ? 'a number of 0 or more'
        : option === 'tempo'
          ? 'seconds above 0'
          : 'seconds of 0 or more'
    throw new WrongCall(`--${option} needs ${what}${text === undefined ? '' : `, not ‘${text}’`}.`)
  }
  return value
}

function readEvents(file: string): ClassEvent[] {
  const events = readJson(file)
  if (!Array.isArray(events))
    throw new WrongCall(`${file === '-' ? 'Standard input' : file} is no list of events.`)
  events.forEach((event: unknown, index) => {
    const isEvent =
      typeof event === 'object' &&
      event !== null &&
      'id' in event &&
      typeof event.id === 'string' &&
      'seq' in event &&
      Number.isInteger(event.seq) &&
      'type' in event &&
      typeof event.type === 'string'
    if (!isEvent)
      throw new WrongCall(`Event ${index} needs an id (text), a seq (whole number) and a type.`)
  })
  // The fold takes whatever events hold and changes nothing for what cannot be.
  return events as ClassEvent[]
}

const WITHOUT_OPTIONS = (options: Call['options'], command: string): void => {
  const [first] = Object.keys(options)
  if (first) throw new WrongCall(`${command} takes no option --${first}.`)
}

/** What a command prints for a sound class: a value as JSON, or a file's own text. */
type Work = (version: PublishedVersion) => unknown

function workFor({ command, files, options }: Call): Work {
  const wants = command === 'score' ? 2 : 1
  if (!['check', 'compile', 'forecast', 'score', 'captions'].includes(command)) {
    throw new WrongCall(command === '' ? USAGE : `There is no command ${command}. ${USAGE}`)
  }
  if (files.length !== wants) {
    throw new WrongCall(
      `${command} takes ${wants === 1 ? 'one file' : 'a class and its events'}. ${USAGE}`,
    )
  }
  if (command !== 'forecast') WITHOUT_OPTIONS(options, command)
  if (command === 'check') return () => []
  if (command === 'compile') return (version) => compile(version)
  if (command === 'captions') return captionsOf
  if (command === 'forecast') {
    return (version) =>
      forecast(version, {
        tiring: options.tiring ?? 0,
        tempoSeconds: options.tempo,
        changeSeconds: options.change,
      })
  }
  const [classFile, eventsFile = ''] = files
  if (classFile === '-' && eventsFile === '-')
    throw new WrongCall('Only one of the two can be standard input.')
  return (version) => scoreBlocks(version, readEvents(eventsFile))
}

export interface CommandResult {
  /** 0; 1 where the spec has problems (they are the output); 2 for a wrong call or an unreadable file. */
  code: 0 | 1 | 2
  stdout: string
  stderr: string
}

/** What `npm run --silent class -- …args` prints and ends with. A file of `-` is standard input. */
export function classCommand(args: readonly string[]): CommandResult {
  const printed = (value: unknown, code: 0 | 1): CommandResult => ({
    code,
    stdout: typeof value === 'string' ? value : `${JSON.stringify(value, null, 2)}\n`,
    stderr: '',
  })
  try {
    const call = parseCall(args)
    const work = workFor(call)
    const { version, problems } = parseSpecOrVersion(readJson(call.files[0] ?? ''))
    return problems ? printed(problems, 1) : printed(work(version), 0)
  } catch (error) {
    if (!(error instanceof WrongCall)) throw error
    return { code: 2, stdout: '', stderr: `${error.message}\n` }
  }
}
