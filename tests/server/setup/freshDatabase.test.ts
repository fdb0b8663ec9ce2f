import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { freshDatabase, type TestDatabase } from '../../helpers/database.ts'

const query = async (url: string, sql: string): Promise<unknown[]> => {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return (await client.query({ text: sql, rowMode: 'array' })).rows.flat()
  } finally {
    await client.end()
  }
}

describe('the databases of tests', () => {
  let databases: TestDatabase[]

  beforeAll(async () => {
    databases = await Promise.all([freshDatabase(), freshDatabase(), freshDatabase()])
  })
  afterAll(() => Promise.all(databases.map((database) => database.drop())))

  it('are migrated', async () => {
    for (const { url } of databases) expect(await query(url, "SELECT to_regclass('users')::text")).toEqual(['users'])
  })

  it('do not see each other', async () => {
    await query(databases[0]!.url, 'CREATE TABLE mine ()')
    expect(await query(databases[1]!.url, "SELECT to_regclass('mine')")).toEqual([null])
  })

  it('are gone when dropped, whoever is connected', async () => {
    const { url, drop } = databases[2]!
    const client = new pg.Client({ connectionString: url })
    client.on('error', () => {})
    await client.connect()
    await drop()
    await expect(query(url, 'SELECT 1')).rejects.toThrow(/does not exist/)
  })
})
