import { runCheck } from './runCheck.ts'

/** Starts `npm run check` on the streams of this process. */

// A reader that stops early, as `head` does, is not an error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error
})

process.exitCode = await runCheck(process.argv.slice(2), {
  input: process.stdin,
  say: (text) => void process.stdout.write(`${text}\n`),
  complain: (text) => void process.stderr.write(`${text}\n`),
  width: process.stdout.columns ?? 100,
})
