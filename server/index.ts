import { ConfigError, processConfig } from './config.ts'
import { startServer } from './start.ts'

try {
  const server = await startServer(processConfig())
  process.stdout.write(`Bayloom serves ${server.address}\n`)
  let stopping = false
  const stop = () => {
    if (stopping) return
    stopping = true
    void server.stop().then(() => process.exit(0))
  }
  process.on('SIGINT', stop)
  process.on('SIGTERM', stop)
} catch (error) {
  process.stderr.write(`${reasonOf(error)}\n`)
  process.exit(1)
}

/** Settings and taken ports are explained in a line; anything else is shown in full to whoever runs the server. */
function reasonOf(error: unknown): string {
  if (error instanceof ConfigError) return error.message
  if (!(error instanceof Error)) return String(error)
  if ('code' in error && error.code === 'EADDRINUSE')
    return `Bayloom cannot start: ${error.message}. Choose another PORT.`
  return `Bayloom cannot start: ${error.stack ?? error.message}`
}
