import type { Logger } from 'pino'

/** Does one piece of waiting work. True: there may be more. */
export type Job = () => Promise<boolean>

/** Works off what lies waiting in the database, piece by piece: at once when woken, else every few seconds. */
export interface JobLoop {
  start(): void
  /** Says that work was queued: for the jobs named, else for any. */
  wake(...names: string[]): void
  /** Does everything that waits now, and what comes of it. */
  drain(): Promise<void>
  /** Finishes what is at hand and stops. */
  stop(): Promise<void>
}

const pause_ms = 5_000

/**
 * Makes the loop. Jobs run beside each other, so that a slow mail server holds up nothing but mail. A job that fails is
 * logged and tried again in the next round; the others go on. After a job that did something all look again: one may have
 * left work for another.
 */
export function makeJobLoop(jobs: Readonly<Record<string, Job>>, log: Logger): JobLoop {
  let timer: NodeJS.Timeout | undefined
  const runners = Object.entries(jobs).map(([name, job]) => makeRunner(name, job, wake, log))

  function wake(...names: string[]): void {
    if (!timer) return
    for (const runner of runners) if (names.length === 0 || names.includes(runner.name)) void runner.run()
  }

  const run = () => Promise.all(runners.map((runner) => runner.run()))

  return {
    start() {
      timer = setInterval(() => void run(), pause_ms)
      timer.unref()
      void run()
    },
    wake,
    async drain() {
      while ((await run()).some(Boolean));
    },
    async stop() {
      clearInterval(timer)
      timer = undefined
      await Promise.all(runners.map((runner) => runner.rest()))
    },
  }
}

function makeRunner(name: string, job: Job, onWorked: () => void, log: Logger) {
  let running: Promise<boolean> | undefined
  let again = false

  async function work(): Promise<boolean> {
    let worked = false
    do {
      again = false
      try {
        while (await job()) worked = true
      } catch (error) {
        log.error({ err: error, job: name }, 'job failed')
      }
    } while (again)
    return worked
  }

  async function workAndTell(): Promise<boolean> {
    const worked = await work()
    running = undefined
    if (again) void runner.run()
    if (worked) onWorked()
    return worked
  }

  const runner = {
    name,
    /** Does what waits; true where that was anything. Asked meanwhile, it looks once more. */
    run(): Promise<boolean> {
      again = true
      running ??= workAndTell()
      return running
    },
    rest: async () => void (await running),
  }
  return runner
}
