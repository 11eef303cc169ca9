/**
 * `npm test`: everything, from nothing. Its last line is `N passed, N failed`; a step that is no test
 * runner counts as one test.
 */
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import {
  atTheVeryEnd,
  endOnSignals,
  failWith,
  finish,
  HOME,
  Problem,
  run,
  seconds,
  step,
} from './lib/steps.mjs'
import { ensureChromium } from './lib/debian.mjs'
import { freePort, startThrowAwayDatabase } from './lib/postgres.mjs'
import { bin, ensureBuild, ensurePackages, removeRouteTypes, UNIT } from './lib/project.mjs'

const DIST = '.next-test'
const total = { passed: 0, failed: 0 }

function count({ passed, failed }) {
  total.passed += passed
  total.failed += failed
}

/** Does what later steps need; counts as one test. Gives back whether it was done. */
async function prepared(title, work) {
  try {
    await step(title, work)
    count({ passed: 1, failed: 0 })
    return true
  } catch (error) {
    count({ passed: 0, failed: 1 })
    console.log(error instanceof Problem ? error.message : error)
    return false
  }
}

/** Runs a check; counts it as one test, or by the report that it writes. */
async function checked(title, command, args, { env = process.env, report, countsOf } = {}) {
  const from = Date.now()
  process.stdout.write(`${title} … `)
  if (report) rmSync(report, { force: true })
  const { code, output } = await run(command, args, { env }).catch((error) => ({
    code: 127,
    output: String(error.message),
  }))
  let counts = code === 0 && !report ? { passed: 1, failed: 0 } : { passed: 0, failed: 0 }
  if (report && existsSync(report)) counts = countsOf(JSON.parse(readFileSync(report, 'utf8')))
  // A runner that died, or found fault beside its tests, has failed whatever it counted.
  const isMissing = report !== undefined && !existsSync(report)
  if ((code !== 0 || isMissing) && counts.failed === 0) counts.failed = 1
  count(counts)
  console.log(`${counts.passed} passed, ${counts.failed} failed, ${seconds(Date.now() - from)}`)
  if (code !== 0 || isMissing) console.log(output)
}

const vitestCounts = (report) => ({ passed: report.numPassedTests, failed: report.numFailedTests })
const playwrightCounts = ({ stats, errors }) => ({
  passed: stats.expected + stats.flaky,
  failed: stats.unexpected + errors.length,
})

async function vitest(title, name, projects, env) {
  const report = `${HOME}/report-${name}.json`
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`]
  const chosen = projects.flatMap((project) => ['--project', project])
  await checked(title, bin('vitest'), ['run', ...chosen, ...reporters], {
    env,
    report,
    countsOf: vitestCounts,
  })
}

async function main() {
  const from = Date.now()
  mkdirSync(HOME, { recursive: true })
  if (!(await prepared('Packages', ensurePackages))) return finish(1)
  let url = ''
  const hasDatabase = await prepared('A database to throw away', async () => {
    url = await startThrowAwayDatabase()
  })
  const env = { ...process.env, NODE_ENV: 'test', TEST_DATABASE_URL: url, DATABASE_URL: url }
  removeRouteTypes()
  await checked('Format', bin('prettier'), ['--check', '--log-level', 'warn', '.'])
  await checked('Lint', bin('eslint'), ['.', '--max-warnings', '0'])
  await checked('Types', bin('tsc'), ['--noEmit'])
  await vitest('Unit tests', 'unit', UNIT, env)
  await vitest('Data tests', 'data', ['server'], env)
  const isBuilt = await prepared('Build', () => ensureBuild(DIST, env))
  const hasBrowser = await prepared('Browser', async () => {
    await ensureChromium()
  })
  if (isBuilt && hasBrowser && hasDatabase) {
    const report = `${HOME}/report-browser.json`
    const reporters = '--reporter=list,json'
    await checked('Browser tests', bin('playwright'), ['test', '--pass-with-no-tests', reporters], {
      env: {
        ...env,
        NEXT_DIST_DIR: DIST,
        TEST_PORT: String(await freePort()),
        PLAYWRIGHT_JSON_OUTPUT_NAME: report,
      },
      report,
      countsOf: playwrightCounts,
    })
  } else {
    console.log('Browser tests … not run, for want of what failed above')
    count({ passed: 0, failed: 1 })
  }
  console.log(`All in ${seconds(Date.now() - from)}.`)
  await finish(total.failed === 0 ? 0 : 1)
}

// The last line is said last: after the database was thrown away.
atTheVeryEnd(() => console.log(`${total.passed} passed, ${total.failed} failed`))
endOnSignals()
main().catch(async (error) => {
  total.failed += 1
  await failWith(error)
})
