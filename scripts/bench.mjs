/**
 * `npm run bench [-- engine|data|browser|load …]`: what the product's figures come to on this computer,
 * against the bars it holds itself to, on a database that is thrown away (engine and data: or on the
 * server that TEST_DATABASE_URL names). Ends with 1 where a bar is missed. Not part of `npm test`: a busy
 * computer fails it for no fault. The browser's part takes some eight minutes, five of them a class.
 */
import { ensureChromium } from './lib/debian.mjs'
import { freePort, startThrowAwayDatabase } from './lib/postgres.mjs'
import { ensureBuild, ensurePackages, tsx } from './lib/project.mjs'
import { endOnSignals, failWith, finish, Problem, start, step } from './lib/steps.mjs'

const PARTS = ['engine', 'data', 'browser', 'load']
const DIST = '.next-test'

async function main() {
  const parts = process.argv.slice(2)
  const unknown = parts.find((part) => !PARTS.includes(part))
  if (unknown) throw new Problem(`There is no part ${unknown}. Use: ${PARTS.join(', ')}.`)
  const wanted = parts.length > 0 ? parts : PARTS
  const isServed = wanted.includes('browser') || wanted.includes('load')
  await step('Packages', ensurePackages)
  let url = isServed ? undefined : process.env.TEST_DATABASE_URL
  if (!url && wanted.some((part) => part !== 'engine')) {
    await step('A database to throw away', async () => {
      url = await startThrowAwayDatabase()
    })
  }
  const env = {
    ...process.env,
    ...(url ? { TEST_DATABASE_URL: url, DATABASE_URL: url } : {}),
    BENCH_PARTS: wanted.join(),
  }
  if (isServed) {
    await step('Build', () => ensureBuild(DIST, env))
    if (wanted.includes('browser')) await step('Browser', ensureChromium)
    await step('Server', async () => {
      env.BENCH_ORIGIN = await serve(env)
    })
  }
  // The condition lets a script read what only the server's own bundle may.
  const measuring = start(
    process.execPath,
    [tsx, '--conditions=react-server', 'scripts/bench.ts'],
    { env, stdio: 'inherit' },
  )
  measuring.once('exit', (code) => void finish(code ?? 1))
}

/** The test build with the demo gym, in one process. Gives its origin. */
async function serve(env) {
  const port = await freePort()
  const origin = `http://127.0.0.1:${port}`
  start(process.execPath, ['scripts/serve-test.mjs', String(port)], {
    env: { ...env, NODE_ENV: 'production', NEXT_DIST_DIR: DIST, APP_ORIGIN: origin },
    stdio: 'ignore',
  })
  for (const untilMs = Date.now() + 120_000; Date.now() < untilMs;) {
    const answer = await fetch(`${origin}/api/health`).catch(() => null)
    if (answer?.ok) return origin
    await new Promise((resolve) => setTimeout(resolve, 500))
  }
  throw new Problem('The product to measure did not start within two minutes.')
}

endOnSignals()
main().catch(failWith)
