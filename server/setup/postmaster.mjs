import { existsSync, readFileSync, readlinkSync, realpathSync, rmSync } from 'node:fs'
import { join } from 'node:path'

/** What a running (or killed) server wrote about itself. @param {string} data */
export const readPostmaster = (data) => {
  const file = join(data, 'postmaster.pid')
  if (!existsSync(file)) return null
  const lines = readFileSync(file, 'utf8').split('\n')
  return { pid: Number(lines[0]), port: Number(lines[3]) }
}

/** The folder a process works in, or null where it is gone or the system does not tell. @param {number} pid */
const folderOf = (pid) => {
  try {
    return readlinkSync(`/proc/${pid}/cwd`)
  } catch {
    return null
  }
}

/**
 * After a power cut the number in `postmaster.pid` may belong to another program by now, and PostgreSQL then refuses to start. The
 * file is removed only where that is certain: the process lives and works in another folder (a server works in its data folder).
 * A number that belongs to nobody is left to PostgreSQL, which deals with it and with leftovers of the killed server.
 * @param {string} data
 */
export const clearForeignPid = (data) => {
  const postmaster = readPostmaster(data)
  if (!postmaster) return
  const folder = folderOf(postmaster.pid)
  if (folder !== null && folder !== realpathSync(data)) rmSync(join(data, 'postmaster.pid'))
}
