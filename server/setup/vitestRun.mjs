import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { root } from './paths.mjs'
import { run } from './run.mjs'

/**
 * @typedef {{ numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests: number,
 *   testResults: { name: string, status: string, assertionResults: { status: string }[] }[] }} Report
 */

/**
 * The true count: a file that could not even be loaded counts as one failure, and so does a run that failed for a reason that no test
 * carries (an error outside every test, no report at all).
 * @param {Report | null} report
 * @param {number} code
 */
export const countTests = (report, code) => {
  const unloaded = report?.testResults.filter(
    ({ status, assertionResults }) => status === 'failed' && !assertionResults.some((test) => test.status === 'failed'),
  )
  const failed = (report?.numFailedTests ?? 0) + (unloaded?.length ?? 0)
  return {
    passed: report?.numPassedTests ?? 0,
    failed: failed === 0 && code !== 0 ? 1 : failed,
    skipped: (report?.numPendingTests ?? 0) + (report?.numTodoTests ?? 0),
  }
}

/** Runs vitest with its usual output on this terminal and counts what it says in its report. @param {readonly string[]} args @param {string} databaseUrl */
export const runVitest = async (args, databaseUrl) => {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-test-'))
  const file = join(folder, 'report.json')
  const colour = process.stdout.isTTY ? {} : { NO_COLOR: '1' }
  const { code } = await run(
    join(root, 'node_modules', '.bin', 'vitest'),
    ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${file}`, ...args],
    { show: true, env: { ...process.env, ...colour, TEST_DATABASE_URL: databaseUrl } },
  )
  const report = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null
  rmSync(folder, { recursive: true })
  return countTests(report, code)
}
