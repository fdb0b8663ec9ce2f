import { watch } from 'node:fs'
import { join } from 'node:path'
import { bundleServer } from './bundle.mjs'
import { openDatabase } from './database.mjs'
import { loadEnvironment } from './environment.mjs'
import { lockHolder, tryLock } from './lock.mjs'
import { closeAtEnd, main } from './main.mjs'
import { checkNodeVersion } from './nodeVersion.mjs'
import { installPackages } from './packages.mjs'
import { makeDataFolder, root } from './paths.mjs'
import { anyFreePort, nextFreePort } from './ports.mjs'
import { Refusal } from './refusal.mjs'
import { spawnServer, waitUntilReady } from './serve.mjs'
import { step, tell } from './steps.mjs'

const watched = ['server', 'shared', 'catalog', 'examples']

/** Calls back once things have been quiet for a moment after a change. @param {() => void} onChange */
const watchSources = (onChange) => {
  /** @type {NodeJS.Timeout | undefined} */
  let quiet
  for (const folder of watched)
    watch(join(root, folder), { recursive: true }, () => {
      clearTimeout(quiet)
      quiet = setTimeout(onChange, 150)
    })
}

/**
 * The server, started anew on every change of its sources. Where they cannot be built just then, the one that runs stays.
 * @param {Record<string, string>} env
 */
const restartingServer = async (env) => {
  let server = await spawnServer({ env })
  let last = Promise.resolve()
  const restart = async () => {
    await bundleServer()
    await server.stop()
    server = await spawnServer({ env })
    tell('server', 'started anew')
  }
  watchSources(() => {
    last = last.then(restart).catch((error) => console.error(error instanceof Refusal ? error.message : error))
  })
  return { first: server, stop: () => server.stop() }
}

await main(
  async () => {
    console.log('\nBayloom, for those who change it\n')
    makeDataFolder()
    loadEnvironment()
    await step('Node.js', checkNodeVersion)
    const about = /** @type {{ pid: number, address?: string }} */ ({ pid: process.pid })
    if (!(await tryLock('installation', about))) {
      const holder = await lockHolder('installation')
      throw new Refusal(
        `Bayloom runs already from this folder (process ${holder?.pid}, ${holder?.address ?? 'still starting'}). Stop that first.`,
      )
    }
    await step('packages', installPackages)
    const database = await step('database', openDatabase)
    closeAtEnd(database.close)
    const port = process.env['PORT'] ? Number(process.env['PORT']) : await nextFreePort(4780)
    const url = `http://127.0.0.1:${port}`
    const apiPort = await anyFreePort()
    const api = `http://127.0.0.1:${apiPort}`
    const server = await restartingServer({
      DATABASE_URL: database.url,
      HOST: '127.0.0.1',
      PORT: String(apiPort),
      PUBLIC_URL: process.env['PUBLIC_URL'] || url,
      BAYLOOM_PREPARE: '1',
    })
    closeAtEnd(server.stop)
    await waitUntilReady(api, server.first)
    const { createServer } = await import('vite')
    const pages = await createServer({
      root,
      server: { host: '127.0.0.1', port, strictPort: true, proxy: { '/api': api } },
    })
    await pages.listen()
    closeAtEnd(() => pages.close())
    about.address = url
    console.log(`\n  Pages with hot reload: ${about.address}\n  Server: ${api}\n  Ctrl-C stops both.\n`)
    return new Promise(() => {})
  },
  () => 0,
)
