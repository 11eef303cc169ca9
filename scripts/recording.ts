import { recordingCommand } from './recording-command'

const { code, text } = recordingCommand(process.argv.slice(2))
if (code === 2) console.error(text)
else console.log(text)
process.exitCode = code
