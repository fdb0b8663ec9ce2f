import { mkdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The checkout. */
export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))))

/** Everything that set-up writes and git ignores. */
export const dataFolder = join(root, '.data')

export const makeDataFolder = () => mkdirSync(dataFolder, { recursive: true, mode: 0o755 })
