/** `npm run check`: format, lint, types and unit tests, two at a time; under 90 s on two cores. */
import { endOnSignals, failWith, finish, HOME, run, seconds } from './lib/steps.mjs'
import { bin, ensurePackages, removeRouteTypes, UNIT } from './lib/project.mjs'

/** What was found good stays good until it changes. */
const cache = (tool) => [
  '--cache',
  '--cache-strategy',
  'content',
  '--cache-location',
  `${HOME}/${tool}`,
]

const CHECKS = [
  // The longest first.
  ['lint', bin('eslint'), ['.', '--max-warnings', '0', ...cache('eslint')]],
  ['unit', bin('vitest'), ['run', ...UNIT.flatMap((project) => ['--project', project])]],
  ['types', bin('tsc'), ['--noEmit']],
  ['format', bin('prettier'), ['--check', '--log-level', 'warn', '.', ...cache('prettier')]],
]

async function main() {
  await ensurePackages()
  removeRouteTypes()
  let failed = 0
  const queue = [...CHECKS]
  const work = async () => {
    for (let next = queue.shift(); next; next = queue.shift()) {
      const [name, command, args] = next
      const from = Date.now()
      const { code, output } = await run(command, args)
      console.log(`${name}: ${code === 0 ? 'good' : 'failed'}, ${seconds(Date.now() - from)}`)
      if (code !== 0) {
        failed += 1
        console.log(output)
      }
    }
  }
  await Promise.all([work(), work()])
  await finish(failed === 0 ? 0 : 1)
}

endOnSignals()
main().catch(failWith)
