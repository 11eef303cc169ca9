/** What is installed and built, and whether it still fits the sources. */
import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs'
import { mkdir, readFile, writeFile } from 'node:fs/promises'
import { HOME, must, ROOT } from './steps.mjs'

const SOURCES = [
  'app',
  'components',
  'server',
  'db',
  'hooks',
  'public',
  'instrumentation.ts',
  'next.config.ts',
  'postcss.config.mjs',
  'tsconfig.json',
  'package-lock.json',
  'scripts/service-worker.mjs',
]

function* filesUnder(path) {
  if (!existsSync(path)) return
  if (!statSync(path).isDirectory()) {
    yield path
    return
  }
  for (const name of readdirSync(path).sort()) {
    if (name === 'sw.js' || name === 'node_modules') continue
    yield* filesUnder(`${path}/${name}`)
  }
}

/** A digest of everything that the build is made from. */
export function sourceDigest() {
  const digest = createHash('sha256').update(process.version)
  for (const source of SOURCES) {
    for (const file of filesUnder(`${ROOT}/${source}`)) {
      digest.update(file.slice(ROOT.length)).update('\0').update(readFileSync(file))
    }
  }
  return digest.digest('hex').slice(0, 16)
}

async function kept(name) {
  return existsSync(`${HOME}/${name}`) ? (await readFile(`${HOME}/${name}`, 'utf8')).trim() : null
}
async function keep(name, value) {
  await mkdir(HOME, { recursive: true })
  await writeFile(`${HOME}/${name}`, `${value}\n`)
}

/** Whether node_modules holds what the lock file asks for. npm keeps a lock file of what it installed there. */
function packagesFit() {
  const installed = `${ROOT}/node_modules/.package-lock.json`
  if (!existsSync(installed)) return false
  const wanted = JSON.parse(readFileSync(`${ROOT}/package-lock.json`, 'utf8')).packages
  const there = JSON.parse(readFileSync(installed, 'utf8')).packages
  return Object.entries(wanted).every(
    ([path, { version, optional }]) =>
      path === '' || (there[path] ? there[path].version === version : optional === true),
  )
}

/** npm's packages as the lock file has them; nothing where they fit already. */
export async function ensurePackages() {
  if (packagesFit()) return 'up to date'
  // Development packages too: the build needs them, and NODE_ENV=production would leave them out.
  await must('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    problem: 'The packages could not be installed. Is there a network? Then try again. npm said:',
  })
  return 'installed'
}

export const next = `${ROOT}/node_modules/next/dist/bin/next`
export const tsx = `${ROOT}/node_modules/tsx/dist/cli.mjs`

/** Builds into `folder` when the sources changed since it was last built there. */
export async function ensureBuild(folder, env = process.env) {
  const digest = sourceDigest()
  if (existsSync(`${ROOT}/${folder}/BUILD_ID`) && (await kept(`build-${folder}`)) === digest)
    return 'up to date'
  await must(process.execPath, [`${ROOT}/scripts/service-worker.mjs`, digest])
  await must(process.execPath, [next, 'build'], {
    env: { ...env, NODE_ENV: 'production', NEXT_DIST_DIR: folder, NEXT_TELEMETRY_DISABLED: '1' },
    problem: 'The build failed:',
  })
  await keep(`build-${folder}`, digest)
  return 'built'
}

export const bin = (name) => `${ROOT}/node_modules/.bin/${name}`
/** The test projects that need no database and no browser. */
export const UNIT = ['engine', 'contract', 'components', 'hooks']

/** Types that builds made of their routes; those of a page that is gone would fail the types of all others. */
export function removeRouteTypes() {
  for (const folder of ['.next/types', '.next-dev/dev/types', '.next-test/types']) {
    rmSync(`${ROOT}/${folder}`, { recursive: true, force: true })
  }
}
