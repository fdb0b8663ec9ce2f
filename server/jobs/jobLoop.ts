import type { Logger } from 'pino'

/** Does one piece of waiting work. True: there may be more. */
export type Job = () => Promise<boolean>

/** Works off what lies waiting in the database, piece by piece: at once when woken, else every few seconds. */
export interface JobLoop {
  start(): void
  /** Says that work was queued. */
  wake(): void
  /** Does everything that waits now. */
  drain(): Promise<void>
  /** Finishes the piece at hand and stops. */
  stop(): Promise<void>
}

const pause_ms = 5_000
/** A job that finds more work without end yields to the others after this many pieces. */
const piecesInARow = 50

/** Makes the loop. A job that fails is logged and tried again in the next round; the others go on. */
export function makeJobLoop(jobs: Readonly<Record<string, Job>>, log: Logger): JobLoop {
  let timer: NodeJS.Timeout | undefined
  let running: Promise<void> | undefined
  let again = false
  let started = false

  async function round(): Promise<void> {
    for (const [name, job] of Object.entries(jobs)) {
      try {
        for (let pieces = 0; await job(); pieces++) {
          if (pieces < piecesInARow) continue
          again = true
          break
        }
      } catch (error) {
        log.error({ err: error, job: name }, 'job failed')
      }
    }
  }

  async function rounds(): Promise<void> {
    do {
      again = false
      await round()
    } while (again)
  }

  function run(): Promise<void> {
    again = true
    running ??= rounds().finally(() => {
      running = undefined
      if (started) schedule()
    })
    return running
  }

  function schedule(): void {
    clearTimeout(timer)
    timer = setTimeout(() => void run(), pause_ms)
    timer.unref()
  }

  return {
    start() {
      started = true
      void run()
    },
    wake() {
      if (started) void run()
    },
    drain: run,
    async stop() {
      started = false
      clearTimeout(timer)
      await running
    },
  }
}
