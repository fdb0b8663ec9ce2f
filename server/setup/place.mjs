import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { canReach } from './account.mjs'
import { dataFolder, root } from './paths.mjs'

/** @param {string} folder */
const make = (folder) => {
  try {
    mkdirSync(folder, { recursive: true, mode: 0o755 })
    return true
  } catch {
    return false
  }
}

/**
 * The folder of a cluster: `.data/<name>` of the checkout. Where the account that runs PostgreSQL cannot get there (a checkout under
 * /root, say) it is a folder of its own elsewhere, remembered in `.data/<name>.place` so that it goes with this checkout alone.
 * @param {string} name
 * @param {{ uid?: number, gid?: number }} account
 */
export const clusterPlace = (name, account) => {
  const own = join(dataFolder, name)
  const record = `${own}.place`
  if (existsSync(record)) {
    const elsewhere = readFileSync(record, 'utf8').trim()
    if (existsSync(elsewhere)) return elsewhere
  }
  make(own)
  if (canReach(own, account)) return own
  const key = `${name.replaceAll('/', '-')}-${randomBytes(6).toString('hex')}`
  const passing = join(tmpdir(), `bayloom-${key}`)
  for (const elsewhere of name.startsWith('test/') ? [passing] : [join('/var/lib/bayloom', key), passing]) {
    if (!make(elsewhere) || !canReach(elsewhere, account)) continue
    writeFileSync(join(elsewhere, 'belongs-to.txt'), `${root}\n`)
    writeFileSync(record, `${elsewhere}\n`)
    return elsewhere
  }
  return own
}
