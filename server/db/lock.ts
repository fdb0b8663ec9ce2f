import { createHash } from 'node:crypto'
import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'

/** Number of an advisory lock, made from its name. */
export const lockNumber = (name: string): string =>
  createHash('sha256').update(`bayloom:${name}`).digest().readBigInt64BE().toString()

/** Holds an advisory lock for the rest of the transaction: whoever asks for the same name meanwhile waits. */
export async function takeLock(database: Sequelize, name: string, transaction: Transaction): Promise<void> {
  await database.query('SELECT pg_advisory_xact_lock($1)', {
    bind: [lockNumber(name)],
    transaction,
    type: QueryTypes.SELECT,
  })
}

/** Runs work that only one process may do at a time. The lock lives in a transaction of its own. */
export async function withLock<T>(database: Sequelize, name: string, work: () => Promise<T>): Promise<T> {
  return database.transaction(async (transaction) => {
    await takeLock(database, name, transaction)
    return work()
  })
}
