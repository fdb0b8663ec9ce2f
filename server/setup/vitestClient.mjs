import { buildClient } from './client.mjs'

/** Vitest's global set-up of the browser tests: they use the built pages. */
export const setup = async () => {
  await buildClient(() => {})
}
