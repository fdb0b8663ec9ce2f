import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { anyFreePort } from '../../server/setup/ports.mjs'
import { spawnServer, waitUntilReady } from '../../server/setup/serve.mjs'
import { freshDatabase } from './database.ts'

export interface Product {
  /** As `http://127.0.0.1:51234`. */
  url: string
  databaseUrl: string
  pid: number
  /** What the server logged so far. */
  log(): string
  /** Kills the server as a power cut would. The database stays. */
  kill(): Promise<void>
  /** Starts the server again on the same address and database. */
  start(): Promise<void>
  /** Stops the server and removes its database. */
  stop(): Promise<void>
}

/** Another server's database stays when this one goes. */
const besideOf = ({ databaseUrl }: Product) => ({ url: databaseUrl, drop: () => Promise.resolve() })

/**
 * The built product on a free port with a database of its own: catalog, demo accounts and examples loaded unless `demo` is false.
 * With `beside`, a further server on the database of another.
 * Rate limits are widened, for a journey makes more requests a minute than a person; pass `RATE_LIMIT_FACTOR` to have them.
 */
export async function startProduct(
  options: { demo?: boolean; settings?: Record<string, string>; beside?: Product } = {},
): Promise<Product> {
  const database = options.beside ? besideOf(options.beside) : await freshDatabase()
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-product-'))
  const log = join(folder, 'server.log')
  const port = await anyFreePort()
  const url = `http://127.0.0.1:${port}`
  const env = {
    DATABASE_URL: database.url,
    HOST: '127.0.0.1',
    PORT: String(port),
    BAYLOOM_PREPARE: '1',
    BAYLOOM_DEMO: options.demo === false ? '0' : '1',
    RATE_LIMIT_FACTOR: '1000',
    ...options.settings,
  }
  const launch = async () => {
    const started = await spawnServer({ env, log })
    await waitUntilReady(url, started, log)
    return started
  }
  let server = await launch()
  return {
    url,
    databaseUrl: database.url,
    get pid() {
      return server.pid ?? 0
    },
    log: () => readFileSync(log, 'utf8'),
    kill: () => server.kill(),
    start: async () => {
      server = await launch()
    },
    stop: async () => {
      await server.stop()
      await database.drop()
      rmSync(folder, { recursive: true })
    },
  }
}
