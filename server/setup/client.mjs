import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { hashOf } from './hash.mjs'
import { withLock } from './lock.mjs'
import { root } from './paths.mjs'
import { Refusal } from './refusal.mjs'
import { run, tail } from './run.mjs'

const built = join(root, 'dist', 'client')
const stamp = join(root, 'dist', 'client.hash')
const inputs = [
  'src',
  'shared',
  'catalog',
  'public',
  'index.html',
  'vite.config.ts',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
]

/** Builds the pages for the browser where anything that they are made from has changed. @param {(text: string) => void} say */
export const buildClient = (say) =>
  withLock(
    'client',
    async () => {
      const wanted = hashOf(root, inputs)
      if (existsSync(join(built, 'index.html')) && existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted)
        return { outcome: 'up to date' }
      say('building the pages for the browser')
      const fresh = `${built}.new`
      rmSync(fresh, { recursive: true, force: true })
      const vite = join(root, 'node_modules', 'vite', 'bin', 'vite.js')
      const args = [vite, 'build', '--outDir', fresh, '--emptyOutDir', '--logLevel', 'warn']
      const { code, output } = await run(process.execPath, args)
      if (code !== 0) throw new Refusal(`The pages for the browser could not be built:\n${tail(output, 40)}`)
      mkdirSync(join(root, 'dist'), { recursive: true })
      rmSync(stamp, { force: true })
      rmSync(built, { recursive: true, force: true })
      renameSync(fresh, built)
      writeFileSync(stamp, wanted)
      return { outcome: 'built' }
    },
    () => say('another start builds the pages; waiting for it'),
  )
