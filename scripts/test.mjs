/**
 * `npm test`: everything, from nothing. Its last line is `N passed, N failed`; a step that is no test
 * runner counts as one test.
 */
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import {
  atTheEnd,
  atTheVeryEnd,
  endOnSignals,
  failWith,
  finish,
  HOME,
  run,
  seconds,
  step,
} from './lib/steps.mjs'
import { ensureChromium } from './lib/debian.mjs'
import { startThrowAwayDatabase } from './lib/postgres.mjs'
import { ensureBuild, ensurePackages } from './lib/project.mjs'

const DIST = '.next-test'
const bin = (name) => `node_modules/.bin/${name}`
const total = { passed: 0, failed: 0 }

/** Runs a step; counts it as one test, or by the report that it writes. */
async function counted(title, command, args, { env = process.env, report, countsOf } = {}) {
  const from = Date.now()
  process.stdout.write(`${title} … `)
  if (report) rmSync(report, { force: true })
  const { code, output } = await run(command, args, { env })
  const counts =
    report && existsSync(report)
      ? countsOf(JSON.parse(readFileSync(report, 'utf8')))
      : { passed: code === 0 ? 1 : 0, failed: code === 0 ? 0 : 1 }
  // A runner that died, or found fault beside its tests, has failed whatever it counted.
  if (code !== 0 && counts.failed === 0) counts.failed = 1
  total.passed += counts.passed
  total.failed += counts.failed
  console.log(`${counts.passed} passed, ${counts.failed} failed, ${seconds(Date.now() - from)}`)
  if (code !== 0) console.log(output)
}

const vitestCounts = (report) => ({ passed: report.numPassedTests, failed: report.numFailedTests })
const playwrightCounts = (report) => ({
  passed: report.stats.expected + report.stats.flaky,
  failed: report.stats.unexpected,
})

async function vitest(title, projects, env) {
  const report = `${HOME}/report-${title.split(' ')[0].toLowerCase()}.json`
  await counted(
    title,
    bin('vitest'),
    [
      'run',
      ...projects.flatMap((name) => ['--project', name]),
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${report}`,
    ],
    { env, report, countsOf: vitestCounts },
  )
}

async function main() {
  const from = Date.now()
  await step('Packages', ensurePackages)
  mkdirSync(HOME, { recursive: true })
  let url = ''
  await step('A database to throw away', async () => {
    const database = await startThrowAwayDatabase()
    atTheEnd(database.stop)
    url = database.url
  })
  const env = { ...process.env, TEST_DATABASE_URL: url, DATABASE_URL: url, NEXT_DIST_DIR: DIST }
  await counted('Format', bin('prettier'), ['--check', '--log-level', 'warn', '.'])
  await counted('Lint', bin('eslint'), ['.', '--max-warnings', '0'])
  await counted('Types', bin('tsc'), ['--noEmit'])
  await vitest('Unit tests', ['engine', 'contract', 'components', 'hooks'], env)
  await vitest('Data tests', ['server'], env)
  let isBuilt = false
  try {
    await step('Build', () => ensureBuild(DIST, env))
    isBuilt = true
    total.passed += 1
  } catch (error) {
    total.failed += 1
    console.log(error.message)
  }
  if (isBuilt) {
    await step('Browser', ensureChromium)
    const report = `${HOME}/report-browser.json`
    await counted('Browser tests', bin('playwright'), ['test'], {
      env: { ...env, PLAYWRIGHT_JSON_OUTPUT_NAME: report },
      report,
      countsOf: playwrightCounts,
    })
  }
  console.log(`All in ${seconds(Date.now() - from)}.`)
  await finish(total.failed === 0 && total.passed > 0 ? 0 : 1)
}

// The last line is said last: after the database was thrown away.
atTheVeryEnd(() => console.log(`${total.passed} passed, ${total.failed} failed`))
endOnSignals()
main().catch(async (error) => {
  total.failed += 1
  await failWith(error)
})
