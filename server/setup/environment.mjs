import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { root } from './paths.mjs'

/** Reads `.env` of the checkout. What the environment says already goes before it. */
export const loadEnvironment = () => {
  const file = join(root, '.env')
  if (existsSync(file)) process.loadEnvFile(file)
}
