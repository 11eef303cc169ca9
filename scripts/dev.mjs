/** `npm run dev`: the product with reloading, on the project's own database. */
import { endOnSignals, failWith, finish, must, start, step } from './lib/steps.mjs'
import { startLastingDatabase } from './lib/postgres.mjs'
import { ensurePackages, next, tsx } from './lib/project.mjs'
import { startLastingStore } from './lib/storage.mjs'

async function main() {
  await step('Packages', ensurePackages)
  let url = process.env.DATABASE_URL
  if (!url) {
    await step('Database', async () => {
      const database = await startLastingDatabase()
      url = database.url
      return database.remark
    })
  }
  let storage = {}
  await step('Clips and pictures', async () => {
    const store = await startLastingStore()
    storage = store.env
    return store.remark
  })
  const env = { ...process.env, ...storage, DATABASE_URL: url }
  for (const command of ['migrate', 'seed']) {
    await step(command === 'migrate' ? 'Schema' : 'Demo gym', () =>
      must(process.execPath, [tsx, 'scripts/db.ts', command], { env }).then((output) =>
        output.trim(),
      ),
    )
  }
  console.log(await must(process.execPath, [tsx, 'scripts/sign-ins.ts'], { env }))
  const server = start(
    process.execPath,
    [next, 'dev', '-H', process.env.HOST ?? '127.0.0.1', '-p', process.env.PORT ?? '3000'],
    { env: { ...env, NEXT_DIST_DIR: '.next-dev', NEXT_TELEMETRY_DISABLED: '1' }, stdio: 'inherit' },
  )
  server.once('exit', (code) => void finish(code ?? 1))
}

endOnSignals()
main().catch(failWith)
