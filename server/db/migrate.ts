import { pathToFileURL } from 'node:url'
import { QueryTypes, type Sequelize } from 'sequelize'
import { Umzug, type UmzugStorage } from 'umzug'
import { processConfig } from '../config.ts'
import { prepareQueues } from '../jobs/queue.ts'
import { openDatabase } from './connection.ts'
import { withLock } from './lock.ts'
import { migrations } from './migrations/index.ts'

/** The list of done migrations. A migration writes its own name in its own transaction, so a crash leaves no half. */
function doneMigrations(database: Sequelize): UmzugStorage {
  return {
    async executed() {
      await database.query(
        'CREATE TABLE IF NOT EXISTS migrations (name text PRIMARY KEY, done_at timestamptz NOT NULL)',
      )
      const rows = await database.query<{ name: string }>('SELECT name FROM migrations ORDER BY name', {
        type: QueryTypes.SELECT,
      })
      return rows.map((row) => row.name)
    },
    logMigration: () => Promise.resolve(),
    unlogMigration: () => Promise.resolve(),
  }
}

/** The migrations bound to a database. */
export function migrator(database: Sequelize) {
  const run = (sql: string, record: string, name: string) =>
    database.transaction(async (transaction) => {
      await database.query(sql, { transaction })
      await database.query(record, { bind: [name], transaction })
    })
  return new Umzug({
    migrations: migrations.map(({ name, up, down }) => ({
      name,
      up: () => run(up, 'INSERT INTO migrations (name, done_at) VALUES ($1, now())', name),
      down: () => run(down, 'DELETE FROM migrations WHERE name = $1', name),
    })),
    storage: doneMigrations(database),
    logger: undefined,
  })
}

/** Brings the database to the newest shape; does nothing when it is there. Two servers starting at once take turns. */
export async function migrateUp(database: Sequelize): Promise<string[]> {
  return withLock(database, 'migrate', async () => {
    const done = await migrator(database).up()
    await prepareQueues(database)
    return done.map((step) => step.name)
  })
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const config = processConfig()
  const database = openDatabase(config.databaseUrl, 2)
  const back = process.argv[2] === 'down'
  const done = back ? (await migrator(database).down()).map((step) => step.name) : await migrateUp(database)
  process.stdout.write(`${back ? 'Undone' : 'Done'}: ${done.join(', ') || 'nothing to do'}\n`)
  await database.close()
}
