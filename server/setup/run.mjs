import { spawn } from 'node:child_process'
import { root } from './paths.mjs'

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set()

/**
 * Runs a program to its end and collects what it prints. Ends with the exit code, never throws for it.
 * @param {string} program
 * @param {readonly string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, uid?: number, gid?: number, show?: boolean, input?: string }} [options]
 * @returns {Promise<{ code: number, output: string }>}
 */
export const run = (program, args, { show = false, input, env = process.env, ...options } = {}) =>
  new Promise((resolve) => {
    const child = spawn(program, args, {
      cwd: root,
      ...options,
      env: show ? env : { ...env, NO_COLOR: '1' },
      stdio: show ? 'inherit' : [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
    })
    let output = ''
    running.add(child)
    child.stdout?.on('data', (chunk) => (output += chunk))
    child.stderr?.on('data', (chunk) => (output += chunk))
    child.stdin?.end(input)
    child.on('error', (error) => {
      running.delete(child)
      resolve({ code: 127, output: `${program}: ${error.message}` })
    })
    child.on('close', (code, signal) => {
      running.delete(child)
      resolve({ code: code ?? (signal ? 130 : 1), output })
    })
  })

/** Ends whatever `run` still waits for: a person pressed Ctrl-C. */
export const endRunning = () => {
  for (const child of running) child.kill('SIGTERM')
}

/** The last lines of a program's output, for a message. @param {string} output */
export const tail = (output, lines = 15) =>
  output
    .trimEnd()
    .split('\n')
    .slice(-lines)
    .map((line) => `    ${line}`)
    .join('\n')
