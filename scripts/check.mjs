/** `npm run check`: format, lint, types and unit tests, two at a time; under 90 s on two cores. */
import { endOnSignals, failWith, finish, run, seconds } from './lib/steps.mjs'
import { ensurePackages } from './lib/project.mjs'

const bin = (name) => `node_modules/.bin/${name}`
export const CHECKS = [
  ['format', bin('prettier'), ['--check', '--log-level', 'warn', '.']],
  ['lint', bin('eslint'), ['.', '--max-warnings', '0']],
  ['types', bin('tsc'), ['--noEmit']],
  [
    'unit',
    bin('vitest'),
    [
      'run',
      '--project',
      'engine',
      '--project',
      'contract',
      '--project',
      'components',
      '--project',
      'hooks',
    ],
  ],
]

async function main() {
  await ensurePackages()
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
