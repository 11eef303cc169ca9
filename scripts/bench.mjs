/**
 * `npm run bench`: what the product's figures come to on this computer, against the bars it holds itself
 * to, on a database that is thrown away (or on the server that TEST_DATABASE_URL names). Ends with 1
 * where a bar is missed. Not part of `npm test`: a busy computer fails it for no fault.
 */
import { endOnSignals, failWith, finish, start, step } from './lib/steps.mjs'
import { startThrowAwayDatabase } from './lib/postgres.mjs'
import { ensurePackages, tsx } from './lib/project.mjs'

async function main() {
  await step('Packages', ensurePackages)
  let url = process.env.TEST_DATABASE_URL
  if (!url) {
    await step('A database to throw away', async () => {
      url = await startThrowAwayDatabase()
    })
  }
  // The condition lets a script read what only the server's own bundle may.
  const measuring = start(
    process.execPath,
    [tsx, '--conditions=react-server', 'scripts/bench.ts'],
    { env: { ...process.env, TEST_DATABASE_URL: url }, stdio: 'inherit' },
  )
  measuring.once('exit', (code) => void finish(code ?? 1))
}

endOnSignals()
main().catch(failWith)
