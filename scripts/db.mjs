/** `npm run db:migrate`, `db:seed`, `db:reset`: on the project's own database, or the one DATABASE_URL names. */
import { endOnSignals, failWith, finish, start } from './lib/steps.mjs'
import { startLastingDatabase } from './lib/postgres.mjs'
import { ensurePackages, tsx } from './lib/project.mjs'

async function main() {
  await ensurePackages()
  let url = process.env.DATABASE_URL
  if (!url) {
    const database = await startLastingDatabase()
    url = database.url
  }
  const child = start(process.execPath, [tsx, 'scripts/db.ts', ...process.argv.slice(2)], {
    env: { ...process.env, DATABASE_URL: url },
    // In our own group, so that a question can be answered at the terminal.
    detached: false,
    stdio: 'inherit',
  })
  child.once('exit', (code) => void finish(code ?? 1))
}

endOnSignals()
main().catch(failWith)
