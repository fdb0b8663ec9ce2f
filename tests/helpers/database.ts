import { randomUUID } from 'node:crypto'
import pg from 'pg'
import { inject } from 'vitest'
import { openDatabase } from '../../server/db/connection.ts'
import { migrateUp } from '../../server/db/migrate.ts'
import { hashOf } from '../../server/setup/hash.mjs'
import { root } from '../../server/setup/paths.mjs'

declare module 'vitest' {
  interface ProvidedContext {
    /** Address of a PostgreSQL server in which tests may create databases; names its maintenance database. */
    testDatabaseUrl: string
  }
}

export interface TestDatabase {
  url: string
  /** Removes it, whoever is connected. Call it in `afterAll`. */
  drop(): Promise<void>
}

const urlOf = (database: string): string => {
  const url = new URL(inject('testDatabaseUrl'))
  url.pathname = `/${database}`
  return url.href
}

async function asAdministrator<T>(work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: inject('testDatabaseUrl') })
  await client.connect()
  try {
    return await work(client)
  } finally {
    await client.end()
  }
}

const exists = async (client: pg.Client, database: string) =>
  (await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [database])).rowCount === 1

/** Migrates under a working name and takes the final one when whole. */
async function makeTemplate(client: pg.Client, template: string): Promise<void> {
  const working = `${template}_new`
  await client.query(`DROP DATABASE IF EXISTS "${working}" WITH (FORCE)`)
  await client.query(`CREATE DATABASE "${working}"`)
  const database = openDatabase(urlOf(working), 2)
  await migrateUp(database)
  await database.close()
  await client.query(`ALTER DATABASE "${working}" RENAME TO "${template}"`)
}

/**
 * The name of a migrated database to copy from. The first test file that asks makes it, the others wait; a change of the
 * migrations gives another name.
 */
async function migratedTemplate(client: pg.Client): Promise<string> {
  const template = `bayloom_template_${hashOf(root, ['server/db/migrations', 'server/jobs/queues.ts']).slice(0, 16)}`
  await client.query("SELECT pg_advisory_lock(hashtext('bayloom_template'))")
  try {
    if (!(await exists(client, template))) await makeTemplate(client, template)
  } finally {
    await client.query("SELECT pg_advisory_unlock(hashtext('bayloom_template'))")
  }
  return template
}

/** A database of its own for one test file, migrated and empty. */
export function freshDatabase(): Promise<TestDatabase> {
  return asAdministrator(async (client) => {
    const template = await migratedTemplate(client)
    const name = `bayloom_test_${randomUUID().replaceAll('-', '')}`
    await client.query(`CREATE DATABASE "${name}" TEMPLATE "${template}"`)
    return {
      url: urlOf(name),
      drop: () =>
        asAdministrator(async (administrator) => {
          await administrator.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`)
        }),
    }
  })
}
