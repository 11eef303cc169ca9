/** What the commands share: steps that say what they do and how long it took, child processes that end. */
import { spawn } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

export const ROOT = fileURLToPath(new URL('../../', import.meta.url)).replace(/\/$/, '')
/** What the project makes for itself on this computer; never in the repository. */
export const HOME = `${ROOT}/.floorside`

/** Something a person can mend: shown as one line, without a stack. */
export class Problem extends Error {}

export function seconds(ms) {
  return ms < 10_000 ? `${(ms / 1000).toFixed(1)} s` : `${Math.round(ms / 1000)} s`
}

/** Says a step, does it, says how long it took. `work` may give back a remark. */
export async function step(title, work) {
  const from = Date.now()
  process.stdout.write(`${title} … `)
  try {
    const remark = await work()
    process.stdout.write(
      `${typeof remark === 'string' ? `${remark}, ` : ''}${seconds(Date.now() - from)}\n`,
    )
    return remark
  } catch (error) {
    process.stdout.write('failed\n')
    throw error
  }
}

const children = new Set()
const endings = []

/** To be done when the command ends, last first. */
export function atTheEnd(work) {
  endings.push(work)
}

/** To be done after everything else: the last word. */
export function atTheVeryEnd(work) {
  endings.unshift(work)
}

let isEnding = false
/** Ends every child and undoes what was set up; then the process. */
export async function finish(code) {
  if (isEnding) return
  isEnding = true
  for (const child of children) stopChild(child)
  await Promise.race([
    Promise.all([...children].map((child) => new Promise((done) => child.once('exit', done)))),
    new Promise((done) => setTimeout(done, 9_000)),
  ])
  for (const child of children) stopChild(child, 'SIGKILL')
  for (const work of endings.reverse()) {
    try {
      await work()
    } catch (error) {
      console.error(error instanceof Error ? error.message : error)
    }
  }
  process.exit(code)
}

function stopChild(child, signal = 'SIGTERM') {
  // Each child leads a group of its own, so what it started ends with it.
  try {
    process.kill(-child.pid, signal)
  } catch {
    child.kill(signal)
  }
}

/** Ctrl-C, a kill, a closed terminal, or the end of whoever started us: all end everything. */
export function endOnSignals() {
  for (const [signal, code] of [
    ['SIGINT', 130],
    ['SIGTERM', 143],
    ['SIGHUP', 129],
  ]) {
    process.on(signal, () => void finish(code))
  }
  const starters = startersOf()
  setInterval(() => {
    if (String(startersOf()) !== String(starters)) void finish(129)
  }, 2_000).unref()
}

/** Who started us: the parent and, behind the shell that `npm run` puts between, npm itself. */
function startersOf() {
  if (!process.env.npm_lifecycle_event) return [process.ppid]
  try {
    const status = readFileSync(`/proc/${process.ppid}/status`, 'utf8')
    return [process.ppid, /^PPid:\s*(\d+)/m.exec(status)?.[1]]
  } catch {
    return [process.ppid]
  }
}

/** Starts a program in a group of its own. Once the end has begun, only what belongs to it. */
export function start(command, args, { isEnd = false, ...options } = {}) {
  if (isEnding && !isEnd) throw new Problem('Ended before it was done.')
  const child = spawn(command, args, { cwd: ROOT, detached: true, ...options })
  children.add(child)
  child.once('exit', () => children.delete(child))
  child.once('error', () => children.delete(child))
  return child
}

/** Runs a program to its end; resolves with its code and output. Never rejects for the code. */
export function run(command, args, { show = false, input, ...options } = {}) {
  return new Promise((resolve, reject) => {
    // Nothing new once the end has begun; the process is over before anybody misses the answer.
    if (isEnding && !options.isEnd) return
    const child = start(command, args, {
      stdio: [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
      ...options,
    })
    let output = ''
    const keep = (chunk) => {
      output += chunk
      if (show) process.stdout.write(chunk)
    }
    child.stdout.on('data', keep)
    child.stderr.on('data', keep)
    child.once('error', reject)
    child.once('close', (code, signal) => resolve({ code: code ?? (signal ? 1 : 0), output }))
    if (input !== undefined) child.stdin.end(input)
  })
}

/** As `run`, but a code other than 0 is a problem with the program's last words. */
export async function must(command, args, options = {}) {
  const { code, output } = await run(command, args, options).catch((error) => ({
    code: 127,
    output: String(error.message),
  }))
  if (code !== 0) {
    const words = output.trim().split('\n').slice(-12).join('\n')
    throw new Problem(
      options.problem
        ? `${options.problem}\n${words}`
        : `${command} ${args.join(' ')} failed:\n${words}`,
    )
  }
  return output
}

/** Prints a problem as its line, anything else with its stack, and ends. */
export async function failWith(error) {
  if (isEnding) return
  console.error(error instanceof Problem ? `\n${error.message}` : error)
  await finish(1)
}
