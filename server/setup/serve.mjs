import { spawn } from 'node:child_process'
import { closeSync, existsSync, openSync, readFileSync, renameSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { setTimeout as pause } from 'node:timers/promises'
import { bundleServer } from './bundle.mjs'
import { root } from './paths.mjs'
import { Refusal } from './refusal.mjs'
import { tail } from './run.mjs'

const guard = pathToFileURL(join(root, 'server', 'setup', 'endWithParent.mjs')).href

/** A log that is put aside once it has grown. @param {string} file */
const openLog = (file) => {
  if (existsSync(file) && statSync(file).size > 10_000_000) renameSync(file, `${file}.1`)
  return openSync(file, 'a')
}

/**
 * Starts the server as a process of its own that ends with this one. What it says goes to the log, else to this terminal.
 * @param {{ env: Record<string, string>, log?: string }} options
 */
export const spawnServer = async ({ env, log }) => {
  const server = await bundleServer()
  const output = log === undefined ? 'inherit' : openLog(log)
  const child = spawn(process.execPath, ['--enable-source-maps', '--import', guard, server], {
    cwd: root,
    env: { ...process.env, ...env },
    stdio: ['ignore', output, output, 'ipc'],
    detached: true,
  })
  if (typeof output === 'number') closeSync(output)
  const ended = /** @type {Promise<number>} */ (
    new Promise((resolve) => child.once('exit', (code, signal) => resolve(code ?? (signal ? 130 : 1))))
  )
  return {
    pid: child.pid,
    ended,
    /** Asks the server to finish what it is doing and end; insists after ten seconds. */
    stop: async () => {
      child.kill('SIGTERM')
      const insist = setTimeout(() => child.kill('SIGKILL'), 10_000)
      await ended
      clearTimeout(insist)
    },
    /** Ends the server as a power cut would. */
    kill: async () => {
      child.kill('SIGKILL')
      await ended
    },
  }
}

/** @param {string} url */
const answers = async (url) => {
  try {
    return (await fetch(`${url}/api/health`)).ok
  } catch {
    return false
  }
}

/**
 * Waits until the server answers; refuses with the end of its log where it ends instead.
 * @param {string} url
 * @param {{ ended: Promise<number> }} server
 * @param {string} [log]
 */
export const waitUntilReady = async (url, server, log) => {
  let code = /** @type {number | null} */ (null)
  void server.ended.then((ended) => (code = ended))
  while (!(await answers(url))) {
    if (code !== null)
      throw new Refusal(
        `The server ended with ${code} before it was ready. ` +
          (log ? `${log} ends with:\n${tail(readFileSync(log, 'utf8'))}` : 'It says why above.'),
      )
    await pause(50)
  }
}
