import { Refusal } from './refusal.mjs'
import { endRunning } from './run.mjs'

/** @type {(() => Promise<unknown>)[]} */
const closers = []

/** Something that has to be closed before this process ends; the last one opened is closed first. @param {() => Promise<unknown>} close */
export const closeAtEnd = (close) => void closers.push(close)

/** Closes everything that was opened. */
export const closeAll = async () => {
  for (let close = closers.pop(); close; close = closers.pop()) await close()
}

/** Calls back when the npm that runs this command is gone, however it went: nobody could stop us through it any more. @param {() => void} onGone */
const watchNpm = (onGone) => {
  if (!process.env['npm_lifecycle_event']) return
  const npm = process.ppid
  const look = setInterval(() => {
    if (process.ppid === npm) return
    clearInterval(look)
    onGone()
  }, 100)
  look.unref()
}

/**
 * Runs a command of set-up: closes what it opened, however it ends, and shows a refusal without a stack. On Ctrl-C, SIGTERM or the end of
 * npm whatever runs is ended first; `onSignal` may give the exit code then.
 * @param {() => Promise<number>} command answers the exit code
 * @param {() => number} [onSignal]
 */
export const main = async (command, onSignal = () => 130) => {
  // A terminal or pipe that is gone must not keep us from closing what we opened.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {})
  let stopping = false
  const stop = async () => {
    if (stopping) return
    stopping = true
    endRunning()
    const code = onSignal()
    await closeAll()
    process.exit(code)
  }
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void stop())
  watchNpm(() => void stop())
  let code = 1
  try {
    code = await command()
  } catch (error) {
    if (!stopping) console.error(error instanceof Refusal ? `\n${error.message}\n` : error)
  }
  if (stopping) return
  stopping = true
  await closeAll()
  process.exit(code)
}
