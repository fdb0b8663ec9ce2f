import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs'
import { join } from 'node:path'

/** @param {string} path @returns {string[]} the file itself, or every file below the folder, in a fixed order */
const filesOf = (path) => {
  if (!existsSync(path)) return []
  if (statSync(path).isFile()) return [path]
  return readdirSync(path, { withFileTypes: true })
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((entry) => filesOf(join(path, entry.name)))
}

/** One hash over the names and contents of files and folders. @param {string} base @param {readonly string[]} paths */
export const hashOf = (base, paths) => {
  const hash = createHash('sha256')
  for (const path of paths)
    for (const file of filesOf(join(base, path)))
      hash
        .update(`${file.slice(base.length)}\0`)
        .update(readFileSync(file))
        .update('\0')
  return hash.digest('hex')
}
