import { spawn } from 'node:child_process'
import { loadEnvironment } from './environment.mjs'
import { checkNodeVersion } from './nodeVersion.mjs'
import { installPackages } from './packages.mjs'
import { makeDataFolder, root } from './paths.mjs'
import { Refusal } from './refusal.mjs'
import { ensureTools } from './tools.mjs'

/**
 * Runs a TypeScript file with the arguments of this command and ends with its exit code. Whatever has to be prepared is told on the error
 * output: the standard output belongs to the script.
 * @param {string} file
 * @param {{ tools?: readonly import('./tools.mjs').Tool[], failed?: number }} [options] `failed`: the exit code where it cannot be prepared
 */
export const runScript = async (file, { tools = [], failed = 1 } = {}) => {
  /** @param {string} text */
  const say = (text) => console.error(text)
  try {
    makeDataFolder()
    loadEnvironment()
    await checkNodeVersion()
    await installPackages(say)
    await ensureTools(tools, say)
  } catch (error) {
    console.error(error instanceof Refusal ? error.message : error)
    process.exit(failed)
  }
  const tsx = import.meta.resolve('tsx')
  const child = spawn(process.execPath, ['--import', tsx, `${root}/${file}`, ...process.argv.slice(2)], {
    stdio: 'inherit',
  })
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']))
    process.on(signal, () => child.kill(signal))
  child.on('exit', (code, signal) => process.exit(code ?? (signal ? 130 : failed)))
}
