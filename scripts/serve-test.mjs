/**
 * Serves the test build for the browser tests: `node scripts/serve-test.mjs PORT`, started by Playwright.
 * The database that DATABASE_URL names is brought up to date and gets the demo gym first.
 */
import { endOnSignals, failWith, finish, must, Problem, start } from './lib/steps.mjs'
import { next, tsx } from './lib/project.mjs'

async function main() {
  const port = process.argv[2]
  if (!port) throw new Problem('Say the port: node scripts/serve-test.mjs PORT')
  for (const command of ['migrate', 'seed']) {
    await must(process.execPath, [tsx, 'scripts/db.ts', command])
  }
  const server = start(process.execPath, [next, 'start', '-H', '127.0.0.1', '-p', port], {
    stdio: ['ignore', 'inherit', 'inherit'],
  })
  server.once('exit', (code) => void finish(code ?? 1))
}

endOnSignals()
main().catch(failWith)
