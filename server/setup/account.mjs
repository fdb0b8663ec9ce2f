import { spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'

/**
 * PostgreSQL refuses to run as root. As root, the cluster belongs to Debian's `postgres` account, or to `nobody` where that is missing.
 * @returns {{ uid?: number, gid?: number }}
 */
export const clusterAccount = () => {
  if (process.getuid?.() !== 0) return {}
  const accounts = readFileSync('/etc/passwd', 'utf8').split('\n')
  for (const name of ['postgres', 'nobody']) {
    const [, , uid, gid] = accounts.find((line) => line.startsWith(`${name}:`))?.split(':') ?? []
    if (uid && gid) return { uid: Number(uid), gid: Number(gid) }
  }
  return {}
}

/** Whether the account can reach a folder: every folder above it must let it through. @param {string} folder @param {{ uid?: number, gid?: number }} account */
export const canReach = (folder, account) =>
  spawnSync('/bin/sh', ['-c', 'cd "$1"', 'sh', folder], { cwd: '/', stdio: 'ignore', ...account }).status === 0
