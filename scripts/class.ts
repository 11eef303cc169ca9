/** `npm run --silent class -- check|compile|forecast|score|captions FILE …`; see class-command.ts. */
import { classCommand } from './class-command'

const { code, stdout, stderr } = classCommand(process.argv.slice(2))
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  // Whoever reads has closed the pipe: that is their business.
  if (error.code !== 'EPIPE') throw error
})
process.exitCode = code
if (stdout) process.stdout.write(stdout)
if (stderr) process.stderr.write(stderr)
