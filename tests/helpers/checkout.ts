import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { cpSync, existsSync, mkdtempSync, readFileSync, readdirSync, rmSync, symlinkSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { root } from '../../server/setup/paths.mjs'

const notCopied = new Set(['node_modules', '.data', '.git', '.env', 'coverage'])

/** Settings of the person who runs the tests, which must not reach the checkout under test. */
const unset = ['DATABASE_URL', 'HOST', 'PORT', 'PUBLIC_URL', 'BAYLOOM_DEMO'].flatMap((name) => ['-u', name])

export interface Command {
  pid: number
  /** Everything printed so far. */
  output(): string
  /** Resolves once the pattern has been printed; fails where the command ends before. */
  printed(pattern: RegExp): Promise<string[]>
  ended: Promise<number | null>
  send(signal: 'SIGTERM' | 'SIGINT' | 'SIGKILL'): void
}

/** A copy of the project in a folder of its own, with the packages and the built pages that are there. */
export function makeCheckout() {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-checkout-'))
  for (const entry of readdirSync(root))
    if (!notCopied.has(entry)) cpSync(join(root, entry), join(folder, entry), { recursive: true })
  symlinkSync(join(root, 'node_modules'), join(folder, 'node_modules'))

  const run = (script: string, settings: Record<string, string> = {}): Command => {
    const given = Object.entries(settings).map(([name, value]) => `${name}=${value}`)
    const child = spawn('env', [...unset, ...given, process.execPath, join('server', 'setup', script)], {
      cwd: folder,
      stdio: ['ignore', 'pipe', 'pipe'],
    })
    let output = ''
    const collect = (chunk: Buffer) => (output += chunk.toString())
    child.stdout.on('data', collect)
    child.stderr.on('data', collect)
    const ended = once(child, 'close').then(([code]) => code as number | null)
    return {
      pid: child.pid ?? 0,
      output: () => output,
      ended,
      send: (signal) => void child.kill(signal),
      printed: (pattern) =>
        new Promise((resolve, reject) => {
          const look = () => {
            const match = pattern.exec(output)
            if (match) resolve([...match])
          }
          child.stdout.on('data', look)
          child.stderr.on('data', look)
          void ended.then((code) => reject(new Error(`ended with ${code} before it printed ${pattern}:\n${output}`)))
          look()
        }),
    }
  }

  /** Where the private database lies, if one was made. */
  const databasePlace = () => {
    const record = join(folder, '.data', 'postgres.place')
    const place = existsSync(record) ? readFileSync(record, 'utf8').trim() : join(folder, '.data', 'postgres')
    return existsSync(join(place, 'data')) ? place : null
  }

  return {
    folder,
    run,
    databasePlace,
    remove: () => {
      const place = databasePlace()
      if (place) rmSync(place, { recursive: true })
      rmSync(folder, { recursive: true })
    },
  }
}
