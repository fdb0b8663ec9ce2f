import { QueryTypes, type Sequelize } from 'sequelize'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { openDatabase } from '../../server/db/connection.ts'
import { migrateUp, migrator } from '../../server/db/migrate.ts'
import { migrations } from '../../server/db/migrations/index.ts'
import { freshDatabase, type TestDatabase } from '../helpers/database.ts'

let place: TestDatabase
let database: Sequelize
beforeAll(async () => {
  place = await freshDatabase()
  database = openDatabase(place.url, 4)
})
afterAll(async () => {
  await database.close()
  await place.drop()
})

async function shape(): Promise<string[]> {
  const rows = await database.query<{ line: string }>(
    `SELECT table_name || '.' || column_name || ' ' || data_type AS line FROM information_schema.columns
     WHERE table_schema = 'public' AND table_name <> 'migrations'
     UNION ALL SELECT indexdef FROM pg_indexes WHERE schemaname = 'public' AND tablename <> 'migrations'
     UNION ALL SELECT proname FROM pg_proc WHERE pronamespace = 'public'::regnamespace
     ORDER BY 1`,
    { type: QueryTypes.SELECT },
  )
  return rows.map((row) => row.line)
}

test('all the way back leaves nothing, and forth again gives the same shape', async () => {
  const before = await shape()
  expect(before.length).toBeGreaterThan(50)
  await migrator(database).down({ to: 0 })
  expect(await shape()).toEqual([])
  expect(await migrateUp(database)).toEqual(migrations.map((migration) => migration.name))
  expect(await shape()).toEqual(before)
})

test('done twice does nothing the second time, and two at once take turns', async () => {
  await migrator(database).down({ to: 0 })
  const done = await Promise.all([migrateUp(database), migrateUp(database)])
  expect(done.flat()).toEqual(migrations.map((migration) => migration.name))
})

test('are numbered in rising order, each number once', () => {
  const numbers = migrations.map(({ name }) => Number(name.slice(0, 3)))
  expect(numbers).toEqual([...new Set(numbers)].sort((a, b) => a - b))
})
