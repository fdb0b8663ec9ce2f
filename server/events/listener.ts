import pg from 'pg'
import type { Logger } from 'pino'

/** Hears what is said on channels of the database, on one connection of its own for the whole process. */
export interface Listener {
  /** Resolves once it hears; tries again by itself for as long as it is not stopped. */
  start(): Promise<void>
  stop(): Promise<void>
}

const firstRetry_ms = 250
const longestRetry_ms = 10_000
/** How often the connection is tried when nothing is said: a dead one is noticed no later. */
const trial_ms = 30_000
const trialAnswer_ms = 10_000

/**
 * Makes the listener. `onHeard` gets what is said; `onGap` is called each time that it hears again after it did not:
 * whatever was said meanwhile has to be read from the tables.
 */
export function makeListener(options: {
  url: string
  channels: readonly string[]
  onHeard: (channel: string, payload: string) => void
  onGap: () => void
  log: Logger
}): Listener {
  let client: pg.Client | null = null
  let starting: Promise<void> | null = null
  let retry: NodeJS.Timeout | undefined
  let trial: NodeJS.Timeout | undefined
  let wait_ms = firstRetry_ms
  let stopped = false

  async function connect(): Promise<void> {
    const next = new pg.Client({
      connectionString: options.url,
      application_name: 'bayloom events',
      keepAlive: true,
      connectionTimeoutMillis: 4_000,
      query_timeout: trialAnswer_ms,
    })
    next.on('error', () => {})
    try {
      await next.connect()
      next.on('notification', ({ channel, payload = '' }) => options.onHeard(channel, payload))
      for (const channel of options.channels) await next.query(`LISTEN ${channel}`)
    } catch (error) {
      void next.end().catch(() => {})
      throw error
    }
    next.on('end', () => lost(next))
    next.on('error', () => lost(next))
    client = next
    wait_ms = firstRetry_ms
    trial = setInterval(() => void next.query('SELECT 1').catch(() => lost(next)), trial_ms)
    trial.unref()
  }

  function lost(which: pg.Client): void {
    if (client !== which || stopped) return
    client = null
    clearInterval(trial)
    void which.end().catch(() => {})
    options.log.warn('the connection that hears of events was lost')
    tryAgain()
  }

  function tryAgain(): void {
    retry = setTimeout(() => {
      connect().then(options.onGap, (error: unknown) => {
        options.log.warn({ err: error }, 'the connection that hears of events does not come about')
        if (!stopped) tryAgain()
      })
    }, wait_ms)
    wait_ms = Math.min(longestRetry_ms, wait_ms * 2)
  }

  return {
    start() {
      starting ??= connect().catch((error: unknown) => {
        options.log.warn({ err: error }, 'the connection that hears of events does not come about')
        tryAgain()
      })
      return starting
    },
    async stop() {
      stopped = true
      clearTimeout(retry)
      clearInterval(trial)
      await starting
      await client?.end().catch(() => {})
      client = null
    },
  }
}
