import { makeDataFolder } from './paths.mjs'
import { openTestDatabase } from './testDatabase.mjs'

/** Vitest's global set-up of the projects that need a database. @param {{ provide: (key: 'testDatabaseUrl', value: string) => void }} project */
export const setup = async (project) => {
  makeDataFolder()
  const database = await openTestDatabase()
  project.provide('testDatabaseUrl', database.url)
  return database.close
}
