/** Programs from Debian's packages, installed when they are missing. */
import { existsSync, readdirSync } from 'node:fs'
import { mkdir, writeFile } from 'node:fs/promises'
import { must, Problem, run } from './steps.mjs'

export const isRoot = process.getuid?.() === 0

async function asRoot(command, args, options = {}) {
  if (isRoot) return must(command, args, options)
  const { code } = await run('sudo', ['-n', 'true']).catch(() => ({ code: 1 }))
  if (code !== 0) {
    throw new Problem(
      `${options.what} is missing. Install it with 'sudo apt-get install ${options.packages}', or run this once as root or as a user who may use sudo without a password, then try again.`,
    )
  }
  return must('sudo', ['-n', 'env', 'DEBIAN_FRONTEND=noninteractive', command, ...args], options)
}

async function install(what, packages) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  const options = { what, packages, env }
  const problem = `${what} could not be installed from Debian's packages. Is there a network? Try again, or install ${packages} yourself.`
  if (!existsSync('/usr/bin/apt-get')) {
    throw new Problem(
      `${what} is missing, and this is no Debian. Install ${packages} yourself, then try again.`,
    )
  }
  await asRoot('apt-get', ['update', '-qq'], { ...options, problem })
  await asRoot(
    'apt-get',
    [
      'install',
      '-y',
      '-qq',
      '--no-install-recommends',
      '-o',
      'DPkg::Lock::Timeout=120',
      ...packages.split(' '),
    ],
    { ...options, problem },
  )
}

/** The folder with PostgreSQL's programs, newest first; null where there is none. */
function postgresBin() {
  if (!existsSync('/usr/lib/postgresql')) return null
  const versions = readdirSync('/usr/lib/postgresql')
    .filter((name) => /^\d+$/.test(name) && existsSync(`/usr/lib/postgresql/${name}/bin/initdb`))
    .sort((a, b) => Number(b) - Number(a))
  return versions[0] ? `/usr/lib/postgresql/${versions[0]}/bin` : null
}

/** PostgreSQL's programs; installed when missing, without the cluster that Debian would start by itself. */
export async function ensurePostgres() {
  const found = postgresBin()
  if (found) return found
  const conf = '/etc/postgresql-common/createcluster.d/floorside.conf'
  if (isRoot) {
    await mkdir('/etc/postgresql-common/createcluster.d', { recursive: true })
    if (!existsSync(conf)) await writeFile(conf, 'create_main_cluster = false\n')
  } else {
    // Where sudo is refused or missing, the installation below says so.
    const ignore = () => undefined
    await run('sudo', ['-n', 'mkdir', '-p', '/etc/postgresql-common/createcluster.d']).catch(ignore)
    await run('sudo', ['-n', 'tee', conf], { input: 'create_main_cluster = false\n' }).catch(ignore)
  }
  await install('PostgreSQL', 'postgresql')
  const installed = postgresBin()
  if (!installed)
    throw new Problem(
      'PostgreSQL was installed but its programs were not found under /usr/lib/postgresql.',
    )
  return installed
}

/** Debian's Chromium, for the tests that drive a browser. */
export async function ensureChromium() {
  if (existsSync('/usr/bin/chromium')) return '/usr/bin/chromium'
  await install('Chromium', 'chromium')
  return '/usr/bin/chromium'
}
