import { createHash } from 'node:crypto'
import { unlinkSync } from 'node:fs'
import { connect, createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { root } from './paths.mjs'

/**
 * A lock that belongs to this checkout and one purpose. It is a listening local socket, so the system itself gives it up when the
 * holder dies, however it dies; on Linux it has no file that could stay behind. The holder answers with what it is about.
 * @param {string} name
 */
const address = (name) => {
  const key = `bayloom-${createHash('sha256').update(root).digest('hex').slice(0, 16)}-${name}`
  return process.platform === 'linux' ? `\0${key}` : join(tmpdir(), `${key}.sock`)
}

/** What the holder of a lock says of itself, or null where nobody holds it. @param {string} name */
export const lockHolder = (name) =>
  /** @type {Promise<{ pid: number, address?: string } | null>} */ (
    new Promise((resolve) => {
      let answer = ''
      const socket = connect(address(name))
      socket.on('data', (chunk) => (answer += chunk))
      socket.on('error', () => resolve(null))
      socket.on('end', () => resolve(answer ? JSON.parse(answer) : null))
    })
  )

/** @param {string} name @param {object} about */
const listen = (name, about) =>
  /** @type {Promise<import('node:net').Server | null>} */ (
    new Promise((resolve, reject) => {
      const server = createServer((socket) => {
        socket.on('error', () => socket.destroy())
        socket.end(JSON.stringify(about))
      })
      server.once('error', (/** @type {NodeJS.ErrnoException} */ error) =>
        error.code === 'EADDRINUSE' ? resolve(null) : reject(error),
      )
      server.listen(address(name), () => {
        server.unref()
        resolve(server)
      })
    })
  )

/**
 * Takes the lock, or answers null where another process holds it. `about` is told to others and may change later.
 * @param {string} name
 * @param {{ pid: number, address?: string }} [about]
 */
export const tryLock = async (name, about = { pid: process.pid }) => {
  let server = await listen(name, about)
  if (!server && process.platform !== 'linux' && (await lockHolder(name)) === null) {
    unlinkSync(address(name))
    server = await listen(name, about)
  }
  if (!server) return null
  const held = server
  return { about, release: () => new Promise((done) => held.close(done)) }
}

/**
 * Does the work while holding the lock; waits for another holder first.
 * @template T
 * @param {string} name
 * @param {() => Promise<T>} work
 * @param {() => void} [onWait] called once, where there is somebody to wait for
 */
export const withLock = async (name, work, onWait) => {
  let lock = await tryLock(name)
  if (!lock) onWait?.()
  while (!lock) {
    await pause(200)
    lock = await tryLock(name)
  }
  try {
    return await work()
  } finally {
    await lock.release()
  }
}
