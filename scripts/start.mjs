/** `npm start`: from a clone to a served product, and from then on quickly. */
import { endOnSignals, failWith, finish, must, Problem, start, step } from './lib/steps.mjs'
import { isPortUsed, startLastingDatabase } from './lib/postgres.mjs'
import { ensureBuild, ensurePackages, next, tsx } from './lib/project.mjs'
import { startLastingStore } from './lib/storage.mjs'

const host = process.env.HOST ?? '127.0.0.1'
const port = Number(process.env.PORT ?? 3000)

async function answers(url, child) {
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null)
      throw new Problem('The server ended before it answered; what it said is above.')
    const ok = await fetch(url).then(
      (answer) => answer.ok,
      () => false,
    )
    if (ok) return
    await new Promise((done) => setTimeout(done, 200))
  }
  throw new Problem(`The server did not answer at ${url} within a minute.`)
}

async function main() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 9)) {
    throw new Problem(`Node ${process.versions.node} is too old: 20.9 or newer is needed.`)
  }
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Problem(`PORT=${process.env.PORT} is no port. Give a number from 1 to 65535.`)
  }
  const used = await isPortUsed(port, host)
  if (used === 'EADDRINUSE') {
    throw new Problem(
      `Port ${port} is used by another program (perhaps Floorside itself). End that one, or choose another: PORT=${port + 1} npm start`,
    )
  }
  if (used === 'EACCES')
    throw new Problem(
      `Port ${port} needs rights that you have not. Choose one above 1024: PORT=3000 npm start`,
    )
  if (used)
    throw new Problem(
      `The address ${host}:${port} cannot be used (${used}). Set HOST to an address of this computer.`,
    )

  await step('Packages', ensurePackages)
  let url = process.env.DATABASE_URL
  if (url) console.log('Database … the one that DATABASE_URL names')
  else {
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
  const env = {
    ...process.env,
    ...storage,
    DATABASE_URL: url,
    APP_ORIGIN: process.env.APP_ORIGIN ?? `http://${host}:${port}`,
  }
  const db = async (command) =>
    (
      await must(process.execPath, [tsx, 'scripts/db.ts', command], {
        env,
        problem: `The database could not be brought up to date (${command}):`,
      })
    )
      .trim()
      .split('\n')
      .at(-1)
  await step('Schema', () => db('migrate'))
  await step('Demo gym', () => db('seed'))
  await step('Build', () => ensureBuild('.next', env))

  const server = start(
    process.execPath,
    [next, 'start', '-H', host, '-p', String(port), '--keepAliveTimeout', '75000'],
    {
      env: { ...env, NODE_ENV: 'production', NEXT_DIST_DIR: '.next', NEXT_TELEMETRY_DISABLED: '1' },
      stdio: ['ignore', 'pipe', 'inherit'],
    },
  )
  server.stdout.resume()
  const shown = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host
  await step('Server', () => answers(`http://${shown}:${port}/api/health`, server))
  server.once('exit', (code) => void finish(code ?? 1))

  const list = await must(process.execPath, [tsx, 'scripts/sign-ins.ts'], { env })
  console.log(`\nFloorside is at http://${shown}:${port}\n\n${list}\nCtrl-C ends it.`)
}

endOnSignals()
main().catch(failWith)
