import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { hashOf } from './hash.mjs'
import { withLock } from './lock.mjs'
import { root } from './paths.mjs'
import { Refusal } from './refusal.mjs'
import { run, tail } from './run.mjs'

/** Inside node_modules, so that it goes when the packages go. */
const stamp = join(root, 'node_modules', '.bayloom-installed')

const wanted = () =>
  `${hashOf(root, ['package-lock.json'])} ${process.versions.modules} ${process.platform}-${process.arch}\n`

/** Spares the comparison next time. Packages that somebody else installed for us may be read-only; then it is made again. */
const remember = () => {
  try {
    if (!existsSync(stamp) || readFileSync(stamp, 'utf8') !== wanted()) writeFileSync(stamp, wanted())
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && (error.code === 'EACCES' || error.code === 'EROFS'))) throw error
  }
}

/** @typedef {Record<string, { version?: string, integrity?: string, optional?: boolean, peer?: boolean }>} Locked */

/** Whether npm's own record of what it installed says the same as the lock file. @param {Locked} locked @param {Locked} installed */
export const sameAsLocked = (locked, installed) =>
  Object.entries(locked).every(([path, { version, optional }]) => {
    const there = installed[path]
    return path === '' || (there ? there.version === version : optional === true)
  })

const isInstalled = () => {
  const record = join(root, 'node_modules', '.package-lock.json')
  if (!existsSync(record)) return false
  if (existsSync(stamp)) return readFileSync(stamp, 'utf8') === wanted()
  /** @param {string} path */
  const packagesOf = (path) => JSON.parse(readFileSync(path, 'utf8')).packages
  return sameAsLocked(packagesOf(join(root, 'package-lock.json')), packagesOf(record))
}

const npm = () => {
  const fromNpm = process.env['npm_execpath']
  return fromNpm?.endsWith('.js') ? { program: process.execPath, first: [fromNpm] } : { program: 'npm', first: [] }
}

/** Installs exactly what package-lock.json says, where that is not there yet. @param {(text: string) => void} say */
export const installPackages = (say) =>
  withLock(
    'packages',
    async () => {
      if (isInstalled()) {
        remember()
        return { outcome: 'as locked' }
      }
      say('installing the locked packages, which takes a minute or so')
      const { program, first } = npm()
      const args = [...first, 'ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error']
      const { code, output } = await run(program, args)
      if (code !== 0)
        throw new Refusal(
          `The packages could not be installed: npm ci ended with ${code}. Is the network reachable?\n${tail(output)}`,
        )
      remember()
      return { outcome: 'installed' }
    },
    () => say('another start installs the packages; waiting for it'),
  )
