import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { openCluster } from './cluster.mjs'
import { tryLock } from './lock.mjs'
import { dataFolder } from './paths.mjs'

/** Nothing here has to outlive a power cut, only a killed process: what is committed is still written, just not forced to disk. */
const settings = ['fsync=off', 'full_page_writes=off', 'shared_buffers=64MB', 'max_connections=200', 'autovacuum=off']

/** The first cluster that no other test run is using: two runs at once each have their own. */
const takeSlot = async () => {
  for (let slot = 1; ; slot++) {
    const lock = await tryLock(`test-${slot}`)
    if (lock) return { slot, lock }
  }
}

/** Removes what killed runs left behind: nobody else uses this cluster now. @param {string} url */
const sweep = async (url) => {
  const { default: pg } = await import('pg')
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  const { rows } = await client.query("SELECT datname FROM pg_database WHERE datname LIKE 'bayloom%' ORDER BY oid DESC")
  const templates = rows.filter(({ datname }) => datname.startsWith('bayloom_template')).slice(0, 3)
  for (const row of rows)
    if (!templates.includes(row)) await client.query(`DROP DATABASE "${row.datname}" WITH (FORCE)`)
  await client.end()
}

/**
 * A server for tests: that of TEST_DATABASE_URL (its account must be allowed to create databases), or a throw-away cluster of our own.
 * Test files make their own databases in it.
 * @param {(text: string) => void} [say]
 */
export const openTestDatabase = async (say) => {
  const given = process.env['TEST_DATABASE_URL']
  if (given) return { outcome: 'from TEST_DATABASE_URL', url: given, close: async () => {} }
  mkdirSync(join(dataFolder, 'test'), { recursive: true })
  const { slot, lock } = await takeSlot()
  const cluster = await openCluster(`test/${slot}`, { settings, say })
  await sweep(cluster.url('postgres'))
  return {
    outcome: cluster.outcome,
    url: cluster.url('postgres'),
    close: async () => {
      await cluster.stop()
      await lock.release()
    },
  }
}
