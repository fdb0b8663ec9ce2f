import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult } from '#shared/check/result.ts'
import { readBuildText } from '#shared/build/read.ts'
import { loadCatalogFiles } from '../services/catalogFiles.ts'
import { readArguments, usage } from './arguments.ts'
import { readInput } from './readInput.ts'
import { printable } from './report/printable.ts'
import { report } from './report/report.ts'

/** What the exit code says. Scripts rely on these. */
export const exitCodes = { sound: 0, faulty: 1, unreadable: 2 } as const
export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes]

/** Where the command reads and writes: the process's own streams, or a test's. */
export interface Streams {
  input: AsyncIterable<Buffer>
  /** The answer. */
  say(text: string): void
  /** What went wrong. */
  complain(text: string): void
  width: number
}

/** Problems shown of one unreadable file. */
const mostProblems = 20

/** `npm run check`: reads the words of the command line, checks each file, answers with the exit code. Never throws. */
export async function runCheck(words: readonly string[], streams: Streams): Promise<ExitCode> {
  try {
    return await checkAll(words, streams)
  } catch (error) {
    const reason = error instanceof Error ? error.message : 'unknown reason'
    streams.complain(printable(`The check could not be carried out: ${reason}`))
    return exitCodes.unreadable
  }
}

async function checkAll(words: readonly string[], streams: Streams): Promise<ExitCode> {
  const read = readArguments(words)
  if (!read.ok) {
    streams.complain(`${read.reason}\n\n${usage}`)
    return exitCodes.unreadable
  }
  const { files, json, all, help } = read
  if (help) {
    streams.say(usage)
    return exitCodes.sound
  }
  const catalog = indexCatalog(loadCatalogFiles())
  const results: (CheckResult | null)[] = []
  for (const file of files) {
    const result = await checkFile(file, catalog, streams)
    results.push(result)
    if (!result || json) continue
    const text = report(result, { width: streams.width, all })
    streams.say(files.length > 1 ? `${printable(file)}\n${text}` : text)
  }
  const answer = files.length === 1 ? results[0] : results
  if (json && answer) streams.say(JSON.stringify(answer, null, 2))
  return Math.max(...results.map(exitCodeOf)) as ExitCode
}

/** Reads and checks one file; complains, with the place in the document, where it cannot be read. */
async function checkFile(file: string, catalog: CatalogIndex, streams: Streams): Promise<CheckResult | null> {
  const name = file === '-' ? 'standard input' : file
  const complain = (text: string): void => streams.complain(printable(`${name}: ${text}`))
  const input = await readInput(file, streams.input)
  if (!input.ok) {
    complain(input.reason)
    return null
  }
  const read = readBuildText(input.text, catalog)
  if (read.ok) return check(read.document, catalog)
  const { problems } = read
  for (const { path, message } of problems.slice(0, mostProblems))
    complain(path === '' ? message : `${path}: ${message}`)
  if (problems.length > mostProblems) complain(`${problems.length - mostProblems} more`)
  return null
}

function exitCodeOf(result: CheckResult | null): ExitCode {
  if (!result) return exitCodes.unreadable
  return result.worst === 'danger' || result.worst === 'fault' ? exitCodes.faulty : exitCodes.sound
}
