import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult } from '#shared/check/result.ts'
import { readBuildText } from '#shared/build/read.ts'
import { loadCatalogFiles } from '../services/catalogFiles.ts'
import { readArguments, usage } from './arguments.ts'
import { printable } from './report/printable.ts'
import { report } from './report/report.ts'
import { readInput } from './readInput.ts'

/** What the exit code says. Scripts rely on these. */
const exitCodes = { sound: 0, faulty: 1, unreadable: 2 } as const
type ExitCode = (typeof exitCodes)[keyof typeof exitCodes]

/** Problems shown of one unreadable file. */
const mostProblems = 20

const say = (text: string): void => void process.stderr.write(`${printable(text)}\n`)

/** Reads and checks one file; says on the error output why it cannot be read. */
async function checkFile(file: string, catalog: CatalogIndex): Promise<CheckResult | null> {
  const name = file === '-' ? 'standard input' : file
  const input = await readInput(file)
  if (!input.ok) {
    say(`${name}: ${input.reason}`)
    return null
  }
  const read = readBuildText(input.text, catalog)
  if (read.ok) return check(read.document, catalog)
  for (const { path, message } of read.problems.slice(0, mostProblems))
    say(`${name}: ${path === '' ? '' : `${path}: `}${message}`)
  if (read.problems.length > mostProblems) say(`${name}: ${read.problems.length - mostProblems} more`)
  return null
}

function exitCodeOf(result: CheckResult | null): ExitCode {
  if (!result) return exitCodes.unreadable
  return result.worst === 'danger' || result.worst === 'fault' ? exitCodes.faulty : exitCodes.sound
}

async function main(): Promise<ExitCode> {
  const read = readArguments(process.argv.slice(2))
  if (!read.ok) {
    say(`${read.reason}\n\n${usage}`)
    return exitCodes.unreadable
  }
  const { files, json, all, help } = read
  if (help) {
    process.stdout.write(`${usage}\n`)
    return exitCodes.sound
  }
  const catalog = indexCatalog(loadCatalogFiles())
  const results: (CheckResult | null)[] = []
  for (const file of files) {
    const result = await checkFile(file, catalog)
    results.push(result)
    if (result && !json) {
      const heading = files.length > 1 ? `${printable(file)}\n` : ''
      process.stdout.write(`${heading}${report(result, { width: process.stdout.columns ?? 100, all })}\n`)
    }
  }
  if (json) {
    const answer = files.length === 1 ? results[0] : results
    if (answer) process.stdout.write(`${JSON.stringify(answer, null, 2)}\n`)
  }
  return Math.max(...results.map(exitCodeOf)) as ExitCode
}

// A reader that stops early, as `head` does, is not an error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error
})

try {
  process.exitCode = await main()
} catch (error) {
  say(`The check could not be carried out: ${error instanceof Error ? error.message : 'unknown reason'}`)
  process.exitCode = exitCodes.unreadable
}
