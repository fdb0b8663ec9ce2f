import PgBoss from 'pg-boss'
import type { Sequelize, Transaction } from 'sequelize'
import type { Logger } from 'pino'
import type { Job } from './jobLoop.ts'
import { queueSettings, type QueueData, type QueueName } from './queues.ts'

/** pg-boss on one of our connections, so that a job is queued, taken and done in our own transactions. */
const on = (database: Sequelize, transaction?: Transaction): PgBoss.Db => ({
  async executeSql(text: string, values: unknown[] = []) {
    const bind = values.map((value) => value ?? null)
    const [rows] = await database.query(text, {
      ...(bind.length === 0 ? {} : { bind }),
      ...(transaction ? { transaction } : {}),
    })
    return { rows: rows as unknown[] }
  },
})

/** Words the statements; it is given a connection with every call and never starts anything of its own. */
const boss = new PgBoss({ db: { executeSql: () => Promise.reject(new Error('a queue is used within a transaction')) } })

/** Makes the tables of the queues, or brings them up to date; part of migrating. */
export async function prepareQueues(database: Sequelize): Promise<void> {
  const installer = new PgBoss({ db: on(database), supervise: false, schedule: false })
  await installer.start()
  for (const [name, settings] of Object.entries(queueSettings)) await installer.createQueue(name, { name, ...settings })
  await installer.stop({ graceful: false })
}

/** Queues a job in the transaction of its cause: it is done once that is committed, and never without it. */
export async function enqueue<Name extends QueueName>(
  database: Sequelize,
  name: Name,
  data: QueueData[Name],
  transaction: Transaction,
): Promise<void> {
  const id = await boss.send(name, data, { db: on(database, transaction) })
  if (id === null) throw new Error(`the queue "${name}" did not take a job`)
}

/** How the jobs of a queue are done. */
export interface Worker<Data> {
  /** Errors may hold addresses of people: they are logged by their code alone. */
  isDiscreet?: boolean
  /** Does the job; answers why it must be tried again, or nothing once it is done. */
  work(data: Data, transaction: Transaction): Promise<Error | null>
  /** Notes that it was not done, and when it is tried next; null: it is given up. */
  failed?(data: Data, error: Error, nextTryAt: Date | null, transaction: Transaction): Promise<void>
}

/**
 * Works a queue off. A job is taken, done and taken away in one transaction: whatever it writes is there exactly when it
 * is gone from the queue. Where the process dies in the middle, the database undoes all of it and the job lies there as
 * before, for any process to take at once.
 */
export function workOff<Name extends QueueName>(
  database: Sequelize,
  name: Name,
  worker: Worker<QueueData[Name]>,
  log: Logger,
): Job {
  return () =>
    database.transaction(async (transaction) => {
      const db = on(database, transaction)
      const [job] = await boss.fetch<QueueData[Name]>(name, { db, includeMetadata: true })
      if (!job) return false
      const error = await attempt(database, worker, job.data, transaction)
      if (error === null) {
        await boss.deleteJob(name, job.id, { db })
        return true
      }
      const told = worker.isDiscreet ? { code: codeOf(error) } : { err: error }
      log.warn({ ...told, queue: name, job: job.id, tries: job.retryCount + 1 }, 'a job was not done')
      await boss.fail(name, job.id, { message: error.message }, { db })
      const later = await boss.getJobById(name, job.id, { db } as PgBoss.ConnectionOptions & {
        includeArchive: boolean
      })
      const isOver = later?.state !== 'retry'
      await worker.failed?.(job.data, error, isOver ? null : later.startAfter, transaction)
      if (isOver) await boss.deleteJob(name, job.id, { db })
      return true
    })
}

const codeOf = (error: Error): unknown => ('code' in error ? error.code : error.name)

/** What a job that broke off has written is undone; the job itself is not. */
async function attempt<Data>(
  database: Sequelize,
  worker: Worker<Data>,
  data: Data,
  transaction: Transaction,
): Promise<Error | null> {
  try {
    return await database.transaction({ transaction }, (inner) => worker.work(data, inner))
  } catch (error) {
    return error instanceof Error ? error : new Error(String(error))
  }
}
