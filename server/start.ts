import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { pino } from 'pino'
import { createApp } from './app.ts'
import type { Config } from './config.ts'
import { migrateUp } from './db/migrate.ts'
import { seedDemo } from './db/seed.ts'
import { makeContext } from './makeContext.ts'

export interface RunningServer {
  address: string
  /** Lets requests under way finish, then closes everything. */
  stop(): Promise<void>
}

const shutdown_ms = 8_000

/** Prepares the database if asked to, and listens. */
export async function startServer(config: Config): Promise<RunningServer> {
  const log = pino({ level: config.logLevel })
  const context = makeContext(config, log)
  if (config.prepare) {
    await migrateUp(context.database)
    await context.loadSecrets()
    if (config.demo) await seedDemo(context)
  } else await context.loadSecrets()
  const server = createServer(createApp(context))
  server.requestTimeout = 60_000
  server.headersTimeout = 20_000
  server.keepAliveTimeout = 10_000
  await listen(server, config)
  const { port } = server.address() as AddressInfo
  const address = `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`
  context.publicUrl = config.publicUrl ?? address
  await context.live.start()
  context.jobs.start()
  return {
    address,
    async stop() {
      await Promise.all([close(server), context.live.stop()])
      await context.close()
    },
  }
}

function listen(server: Server, config: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(config.port, config.host, () => {
      server.off('error', reject)
      resolve()
    })
  })
}

function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve())
    server.closeIdleConnections()
    setTimeout(() => server.closeAllConnections(), shutdown_ms).unref()
  })
}
