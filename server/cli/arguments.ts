import { parseArgs } from 'node:util'

export const usage = `npm run check -- FILE... [--json] [--all]

Checks build documents and prints findings, power ledger and moments.
FILE is a build document in JSON; "-" reads the standard input.

  --json   print the answer of the checker as one JSON object and nothing else
           (several files: a list in their order, null for one that cannot be read)
  --all    print every row of the ledger, not just the most loaded ones
  --help   print this

Exit code 0: nothing at fault or danger that nobody accepted; 1: something;
2: a file could not be read, with its place and reason on the error output.`

export type Arguments =
  { ok: true; files: string[]; json: boolean; all: boolean; help: boolean } | { ok: false; reason: string }

/** Reads the words of the command line. */
export function readArguments(words: readonly string[]): Arguments {
  try {
    const { values, positionals } = parseArgs({
      args: [...words],
      allowPositionals: true,
      options: {
        json: { type: 'boolean', default: false },
        all: { type: 'boolean', default: false },
        help: { type: 'boolean', short: 'h', default: false },
      },
    })
    const { json, all, help } = values
    if (positionals.length === 0 && !help) return { ok: false, reason: 'Name a file to check.' }
    return { ok: true, files: positionals, json, all, help }
  } catch (error) {
    return { ok: false, reason: error instanceof Error ? error.message : 'These arguments cannot be read.' }
  }
}
