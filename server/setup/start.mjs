import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { buildClient } from './client.mjs'
import { openDatabase } from './database.mjs'
import { loadEnvironment } from './environment.mjs'
import { lockHolder, tryLock } from './lock.mjs'
import { closeAtEnd, main } from './main.mjs'
import { checkNodeVersion } from './nodeVersion.mjs'
import { installPackages } from './packages.mjs'
import { dataFolder, makeDataFolder } from './paths.mjs'
import { isFree, nextFreePort } from './ports.mjs'
import { Refusal } from './refusal.mjs'
import { spawnServer, waitUntilReady } from './serve.mjs'
import { step, tell } from './steps.mjs'

const preferredPort = 4780

const chooseAddress = async () => {
  const host = process.env['HOST'] || '127.0.0.1'
  const fixed = process.env['PORT']
  const port = fixed ? Number(fixed) : await nextFreePort(preferredPort, host)
  if (!Number.isInteger(port) || port < 1 || port > 65_535)
    throw new Refusal(`PORT is "${fixed}". Write a number from 1 to 65535, or leave it away.`)
  if (!(await isFree(port, host)))
    throw new Refusal(
      `Port ${port} of ${host} is taken by another program. End that, set another PORT, or leave PORT away to take the next free one.`,
    )
  const reachable = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host
  return { host, port, url: `http://${reachable.includes(':') ? `[${reachable}]` : reachable}:${port}` }
}

/** What other starts of this checkout are told. */
const about = /** @type {{ pid: number, address?: string }} */ ({ pid: process.pid })

/** Where another start of this checkout serves already or is about to, waits for it and says where. */
const lockOrJoin = async () => {
  let told = false
  for (;;) {
    const lock = await tryLock('installation', about)
    if (lock) return null
    const holder = await lockHolder('installation')
    if (holder?.address) return holder
    if (!told && holder) tell('waiting', `another start (process ${holder.pid}) starts or stops here; waiting for it`)
    told = true
    await pause(300)
  }
}

/** @param {string} url */
const showAddress = async (url) => {
  const { demoAccounts } = await (await fetch(`${url}/api/session`)).json()
  console.log(`\n  Bayloom is ready: ${url}\n`)
  if (demoAccounts.length > 0) {
    const width = Math.max(...demoAccounts.map((/** @type {{ email: string }} */ { email }) => email.length))
    console.log(
      '  Demo accounts (everybody knows these passwords: set BAYLOOM_DEMO=0 where others can reach this address):',
    )
    for (const { email, password, what } of demoAccounts)
      console.log(`    ${email.padEnd(width)}  ${password}  ${what}`)
    console.log('')
  }
  console.log('  Ctrl-C stops it.\n')
}

await main(
  async () => {
    const from = performance.now()
    console.log('\nBayloom\n')
    makeDataFolder()
    loadEnvironment()
    await step('Node.js', checkNodeVersion)
    const holder = await lockOrJoin()
    if (holder) {
      console.log(`\n  Bayloom runs already from this folder: ${holder.address} (process ${holder.pid})\n`)
      return 0
    }
    await step('packages', installPackages)
    const database = await step('database', openDatabase)
    closeAtEnd(database.close)
    await step('pages', buildClient)
    const { host, port, url } = await chooseAddress()
    const log = join(dataFolder, 'server.log')
    const server = await step('server', async (say) => {
      say('migrating the database, loading catalog and demo where they are not there yet')
      const started = await spawnServer({
        env: { DATABASE_URL: database.url, HOST: host, PORT: String(port), BAYLOOM_PREPARE: '1' },
        log,
      })
      closeAtEnd(started.stop)
      await waitUntilReady(url, started, log)
      return { outcome: `listening on ${host}:${port}, log in .data/server.log`, value: started }
    })
    await showAddress(url)
    tell('', `ready in ${((performance.now() - from) / 1000).toFixed(1)} s`)
    about.address = url
    const code = await server.ended
    throw new Refusal(
      `The server ended by itself with ${code}. Its log is .data/server.log; start again with npm start.`,
    )
  },
  () => {
    console.log('\n  stopping the server and the database')
    const served = about.address !== undefined
    delete about.address
    return served ? 0 : 130
  },
)
