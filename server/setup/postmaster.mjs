import { existsSync, readFileSync, readdirSync, readlinkSync, realpathSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'

/** What a running (or killed) server wrote about itself. @param {string} data */
export const readPostmaster = (data) => {
  const file = join(data, 'postmaster.pid')
  if (!existsSync(file)) return null
  const lines = readFileSync(file, 'utf8').split('\n')
  return { pid: Number(lines[0]), port: Number(lines[3]) }
}

/** The folder a process works in, or null where it has ended or the system does not tell. @param {number | string} pid */
const folderOf = (pid) => {
  try {
    return readlinkSync(`/proc/${pid}/cwd`)
  } catch {
    return null
  }
}

/** Whether the system has a process of this number at all: one that has ended, but was not yet fetched by its parent, counts. @param {number} pid */
const isListed = (pid) => existsSync(`/proc/${pid}`)

/** Processes of PostgreSQL work in their data folder. @param {string} data */
const workIn = (data) => {
  const folder = realpathSync(data)
  return readdirSync('/proc').some((entry) => /^\d+$/.test(entry) && folderOf(entry) === folder)
}

/** Whether the server of this data folder runs, where the system lists its processes as files; null elsewhere. @param {string} data */
export const runsIn = (data) => {
  if (!existsSync('/proc/self/cwd')) return null
  const postmaster = readPostmaster(data)
  return postmaster !== null && folderOf(postmaster.pid) === realpathSync(data)
}

/**
 * After a crash the number in `postmaster.pid` may belong to another program by now, or to a server that has ended but that nobody
 * fetched (a container without an init process); PostgreSQL then refuses to start. The file is removed only where it is certain that
 * no process of this data folder is left. A number that belongs to nobody is left to PostgreSQL.
 * @param {string} data
 */
export const clearStalePid = async (data) => {
  const postmaster = readPostmaster(data)
  if (!postmaster || runsIn(data) !== false || !isListed(postmaster.pid)) return
  for (let attempt = 0; attempt < 50 && workIn(data); attempt++) await pause(200)
  if (!workIn(data)) rmSync(join(data, 'postmaster.pid'), { force: true })
}
