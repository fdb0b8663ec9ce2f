import { spawn } from 'node:child_process'
import { randomUUID } from 'node:crypto'
import { once } from 'node:events'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { describe, expect, it } from 'vitest'
import { lockHolder, tryLock, withLock } from '../../../server/setup/lock.mjs'
import { root } from '../../../server/setup/paths.mjs'

const lockModule = pathToFileURL(join(root, 'server/setup/lock.mjs')).href

/** Another process that holds the lock until it is killed. */
async function holderOf(name: string) {
  const script = `import { tryLock } from '${lockModule}'
    const lock = await tryLock('${name}', { pid: process.pid, address: 'http://127.0.0.1:1' })
    console.log(lock ? 'held' : 'refused')
    setInterval(() => {}, 1000)`
  const child = spawn(process.execPath, ['--input-type=module', '-e', script], { stdio: ['ignore', 'pipe', 'inherit'] })
  const [said] = (await once(child.stdout, 'data')) as [Buffer]
  expect(said.toString()).toBe('held\n')
  return child
}

describe('the lock of a checkout', () => {
  it('belongs to one at a time', async () => {
    const name = randomUUID()
    const first = await tryLock(name)
    expect(await tryLock(name)).toBeNull()
    await first?.release()
    const again = await tryLock(name)
    expect(again).not.toBeNull()
    await again?.release()
  })

  it('tells who holds it', async () => {
    const name = randomUUID()
    expect(await lockHolder(name)).toBeNull()
    const lock = await tryLock(name, { pid: 42 })
    expect(await lockHolder(name)).toEqual({ pid: 42 })
    await lock?.release()
  })

  it('is free again when its holder is killed', async () => {
    const name = randomUUID()
    const holder = await holderOf(name)
    expect(await tryLock(name)).toBeNull()
    expect(await lockHolder(name)).toEqual({ pid: holder.pid, address: 'http://127.0.0.1:1' })
    const gone = once(holder, 'exit')
    holder.kill('SIGKILL')
    await gone
    const lock = await tryLock(name)
    expect(lock).not.toBeNull()
    await lock?.release()
  })

  it('lets work of the same name take turns', async () => {
    const name = randomUUID()
    const order: string[] = []
    const work = (mark: string) =>
      withLock(name, async () => {
        order.push(`${mark} begins`)
        await new Promise((done) => setImmediate(done))
        order.push(`${mark} ends`)
      })
    await Promise.all([work('a'), work('b')])
    expect([order[0]?.slice(1), order[1]?.slice(1)]).toEqual([' begins', ' ends'])
    expect(order[0]?.[0]).toBe(order[1]?.[0])
    expect(order).toHaveLength(4)
  })
})
