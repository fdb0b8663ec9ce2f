import { randomUUID } from 'node:crypto'
import { readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer, type Server } from 'node:net'
import { join } from 'node:path'
import pg from 'pg'
import { afterEach, describe, expect, it } from 'vitest'
import { openCluster } from '../../../server/setup/cluster.mjs'
import { dataFolder } from '../../../server/setup/paths.mjs'
import { anyFreePort } from '../../../server/setup/ports.mjs'
import { readPostmaster } from '../../../server/setup/postmaster.mjs'
import { Refusal } from '../../../server/setup/refusal.mjs'

type Cluster = Awaited<ReturnType<typeof openCluster>>

let name = ''
let open: Cluster[] = []

const openNamed = async () => {
  name ||= `test/cluster-${randomUUID().slice(0, 8)}`
  const cluster = await openCluster(name, { settings: ['fsync=off'] })
  open.push(cluster)
  return cluster
}

const query = async (url: string, sql: string): Promise<unknown[]> => {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return (await client.query({ text: sql, rowMode: 'array' })).rows.flat()
  } finally {
    await client.end()
  }
}

const postmaster = (cluster: Cluster) => {
  const found = readPostmaster(join(cluster.place, 'data'))
  if (!found) throw new Error('no postmaster.pid')
  return found
}

/** Ends the whole server at once, as a power cut would; resolves when its port is free. */
const cutPower = async (cluster: Cluster) => {
  const { pid, port } = postmaster(cluster)
  process.kill(pid, 'SIGKILL')
  await expect.poll(() => query(cluster.url('postgres'), 'SELECT 1').catch(() => 'away')).toBe('away')
  return port
}

const occupy = (port: number) =>
  new Promise<Server>((resolve, reject) => {
    const server = createServer().once('error', reject)
    server.listen(port, '127.0.0.1', () => resolve(server))
  })

afterEach(async () => {
  for (const cluster of open) await cluster.stop()
  // Without a name the folders below would be those of every cluster.
  if (!name) return
  const place = open[0]?.place
  if (place) rmSync(place, { recursive: true })
  rmSync(join(dataFolder, name), { recursive: true, force: true })
  rmSync(join(dataFolder, `${name}.place`), { force: true })
  name = ''
  open = []
})

describe('the private cluster', () => {
  it('is made, started and answers on 127.0.0.1 alone, with a password', async () => {
    const cluster = await openNamed()
    expect(cluster.outcome).toMatch(/^made and started/)
    expect(await query(cluster.url('postgres'), 'SHOW listen_addresses')).toEqual(['127.0.0.1'])
    expect(await query(cluster.url('postgres'), 'SHOW unix_socket_directories')).toEqual([''])
    const wrong = new URL(cluster.url('postgres'))
    wrong.password = 'guess'
    await expect(query(wrong.href, 'SELECT 1')).rejects.toThrow(/password authentication failed/)
  })

  it('is used as it is where it runs already', async () => {
    const first = await openNamed()
    const second = await openNamed()
    expect(second.outcome).toMatch(/^runs already/)
    expect(second.port).toBe(first.port)
  })

  it('keeps what was committed when it is killed, and starts again', async () => {
    const first = await openNamed()
    await query(first.url('postgres'), 'CREATE TABLE kept (word text)')
    await query(first.url('postgres'), "INSERT INTO kept VALUES ('still here')")
    await cutPower(first)
    const second = await openNamed()
    expect(second.outcome).toMatch(/^started/)
    expect(await query(second.url('postgres'), 'SELECT word FROM kept')).toEqual(['still here'])
  })

  it('starts where postmaster.pid names a process that is another program by now', async () => {
    const first = await openNamed()
    await first.stop()
    const pidFile = join(first.place, 'data', 'postmaster.pid')
    writeFileSync(pidFile, `${process.pid}\n${join(first.place, 'data')}\n1700000000\n${first.port}\n\n127.0.0.1\n`)
    const second = await openNamed()
    expect(postmaster(second).pid).not.toBe(process.pid)
    expect(await query(second.url('postgres'), 'SELECT 1')).toEqual([1])
  })

  it('starts where postmaster.pid names nobody', async () => {
    const first = await openNamed()
    const { pid } = postmaster(first)
    const text = readFileSync(join(first.place, 'data', 'postmaster.pid'), 'utf8')
    await first.stop()
    writeFileSync(join(first.place, 'data', 'postmaster.pid'), text)
    const second = await openNamed()
    expect(postmaster(second).pid).not.toBe(pid)
  })

  it('takes another port where its own is taken meanwhile', async () => {
    const first = await openNamed()
    await first.stop()
    const thief = await occupy(first.port)
    try {
      const second = await openNamed()
      expect(second.port).not.toBe(first.port)
      expect(await query(second.url('postgres'), 'SELECT 1')).toEqual([1])
    } finally {
      thief.close()
    }
  })

  it('comes back on the port of last time', async () => {
    const first = await openNamed()
    await first.stop()
    expect((await openNamed()).port).toBe(first.port)
  })

  it('says which PostgreSQL is needed where the data are of another version', async () => {
    const first = await openNamed()
    await first.stop()
    const versionFile = join(first.place, 'data', 'PG_VERSION')
    const version = readFileSync(versionFile, 'utf8')
    writeFileSync(versionFile, '9\n')
    const refusal: unknown = await openNamed().catch((error: unknown) => error)
    writeFileSync(versionFile, version)
    expect(refusal).toBeInstanceOf(Refusal)
    expect(String(refusal)).toMatch(/PostgreSQL 9/)
  })

  it('finds a free port', async () => {
    const port = await anyFreePort()
    const server = await occupy(port)
    server.close()
    expect(port).toBeGreaterThan(1023)
  })
})
