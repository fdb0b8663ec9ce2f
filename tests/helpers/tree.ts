import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { root } from '../../server/setup/paths.mjs'

const notOurs = new Set(['node_modules', 'dist', '.data', '.git', 'coverage'])

/** Every file of the project below a folder, as paths from the root with `/`. */
export function filesBelow(folder = ''): string[] {
  const start = join(root, folder)
  if (!existsSync(start)) return []
  return readdirSync(start, { withFileTypes: true })
    .filter((entry) => !notOurs.has(entry.name))
    .flatMap((entry) => {
      const path = relative(root, join(start, entry.name)).replaceAll('\\', '/')
      return entry.isDirectory() ? filesBelow(path) : [path]
    })
    .sort()
}

/** Names of the folders directly inside a folder. */
export const foldersIn = (folder: string): string[] =>
  readdirSync(join(root, folder), { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort()

export const readText = (path: string): string => readFileSync(join(root, path), 'utf8')

export const fileExists = (path: string): boolean => existsSync(join(root, path))
