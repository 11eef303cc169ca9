/**
 * Serves the test build for the browser tests: `node scripts/serve-test.mjs PORT`, started by Playwright.
 * The database that DATABASE_URL names is brought up to date and gets the demo gym first; clips and pictures
 * lie in a store that is thrown away.
 */
import { mkdirSync, openSync, rmSync } from 'node:fs'
import { endOnSignals, failWith, finish, HOME, must, Problem, start } from './lib/steps.mjs'
import { next, tsx } from './lib/project.mjs'
import { startThrowAwayStore } from './lib/storage.mjs'

async function main() {
  mkdirSync(HOME, { recursive: true })
  rmSync(`${HOME}/e2e-requests.log`, { force: true })
  const log = openSync(`${HOME}/e2e-server.log`, 'w')
  const port = process.argv[2]
  if (!port) throw new Problem('Say the port: node scripts/serve-test.mjs PORT')
  for (const command of ['migrate', 'seed']) {
    await must(process.execPath, [tsx, 'scripts/db.ts', command])
  }
  const storage = await startThrowAwayStore()
  const server = start(process.execPath, [next, 'start', '-H', '127.0.0.1', '-p', port], {
    env: { ...process.env, ...storage },
    // The last browser test reads what the server said.
    stdio: ['ignore', log, log],
  })
  server.once('exit', (code) => void finish(code ?? 1))
}

endOnSignals()
main().catch(failWith)
