import { accessSync, constants, existsSync, readdirSync, realpathSync } from 'node:fs'
import { delimiter, dirname, join } from 'node:path'

/** Full path of a program on PATH, or null. @param {string} name */
export const onPath = (name) => {
  for (const folder of (process.env['PATH'] ?? '').split(delimiter)) {
    const path = join(folder, name)
    try {
      accessSync(path, constants.X_OK)
      return path
    } catch {
      continue
    }
  }
  return null
}

/** @param {string} folder */
const hasServer = (folder) => ['initdb', 'pg_ctl', 'postgres'].every((name) => existsSync(join(folder, name)))

/**
 * Folders that hold a whole PostgreSQL server, newest first: Debian keeps one a version, off PATH.
 * @returns {{ folder: string, major: string }[]}
 */
export const postgresServers = (debianFolder = '/usr/lib/postgresql') => {
  const versions = existsSync(debianFolder) ? readdirSync(debianFolder).filter((name) => /^\d+$/.test(name)) : []
  const debian = versions
    .sort((a, b) => Number(b) - Number(a))
    .map((major) => ({ folder: join(debianFolder, major, 'bin'), major }))
  const initdb = onPath('initdb')
  const own = initdb ? [{ folder: dirname(realpathSync(initdb)), major: '' }] : []
  const known = debian.filter(({ folder }) => hasServer(folder))
  return [...known, ...own.filter(({ folder }) => hasServer(folder) && !known.some((other) => other.folder === folder))]
}

/** Chromium or a browser built from it, for the browser tests. */
export const findChromium = () =>
  process.env['CHROMIUM_PATH'] ?? onPath('chromium') ?? onPath('chromium-browser') ?? onPath('google-chrome')
