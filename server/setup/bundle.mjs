import { randomUUID } from 'node:crypto'
import { mkdirSync, readFileSync, renameSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { root } from './paths.mjs'
import { Refusal } from './refusal.mjs'

/**
 * In one file, `import.meta.url` would be the address of that file: each source keeps its own, so that it finds what lies beside it.
 * @type {import('esbuild').Plugin}
 */
const ownAddresses = {
  name: 'own addresses',
  setup: (build) =>
    build.onLoad({ filter: /[\\/]server[\\/].*\.ts$/ }, ({ path }) => ({
      contents: readFileSync(path, 'utf8').replaceAll('import.meta.url', JSON.stringify(pathToFileURL(path).href)),
      loader: 'ts',
    })),
}

/**
 * Puts the server's own sources into one file of plain JavaScript, packages left outside. That takes a blink, and the server then starts
 * in a third of the time that it takes to translate some three hundred files while loading them. Answers the file.
 */
export const bundleServer = async () => {
  const { build } = await import('esbuild')
  const folder = join(root, 'dist', 'server')
  const file = join(folder, 'index.mjs')
  const fresh = join(folder, `${randomUUID()}.mjs`)
  mkdirSync(folder, { recursive: true })
  try {
    await build({
      absWorkingDir: root,
      entryPoints: ['server/index.ts'],
      outfile: fresh,
      bundle: true,
      packages: 'external',
      platform: 'node',
      format: 'esm',
      target: 'node20',
      sourcemap: 'inline',
      sourcesContent: false,
      logLevel: 'silent',
      plugins: [ownAddresses],
    })
  } catch (error) {
    throw new Refusal(`The server could not be built:\n${error instanceof Error ? error.message : error}`)
  }
  renameSync(fresh, file)
  return file
}
