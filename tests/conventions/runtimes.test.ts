import { join } from 'node:path'
import ts from 'typescript'
import { describe, expect, it } from 'vitest'
import { root } from '../../server/setup/paths.mjs'

/** What the compiler says of one more file in a runtime, judged by that runtime's own tsconfig. */
function errorsOf(config: string, file: string, text: string): string[] {
  const path = join(root, config)
  const parsed = ts.getParsedCommandLineOfConfigFile(
    path,
    {},
    { ...ts.sys, onUnRecoverableConfigFileDiagnostic: () => {} },
  )
  if (!parsed) throw new Error(`cannot read ${config}`)
  const probe = join(root, file)
  const host = ts.createCompilerHost(parsed.options)
  const { fileExists, readFile } = host
  host.fileExists = (name) => name === probe || fileExists(name)
  host.readFile = (name) => (name === probe ? text : readFile(name))
  const getSourceFile = host.getSourceFile.bind(host)
  host.getSourceFile = (name, target, ...rest) =>
    name === probe ? ts.createSourceFile(name, text, target) : getSourceFile(name, target, ...rest)
  const program = ts.createProgram({ rootNames: [probe], options: parsed.options, host })
  return ts
    .getPreEmitDiagnostics(program)
    .map((diagnostic) => ts.flattenDiagnosticMessageText(diagnostic.messageText, '\n'))
}

const refused: [config: string, file: string, text: string, error: RegExp][] = [
  ['tsconfig.shared.json', 'shared/check/probe.ts', 'export const width = window.innerWidth\n', /'window'/],
  ['tsconfig.shared.json', 'shared/check/probe.ts', 'export const id = process.pid\n', /'process'/],
  ['tsconfig.client.json', 'src/api/probe.ts', 'export const id = process.pid\n', /'process'/],
  ['tsconfig.client.json', 'src/api/probe.ts', "export * from '../../server/config.ts'\n", /node:path|'process'/],
  ['tsconfig.server.json', 'server/services/probe.ts', 'export const width = window.innerWidth\n', /'window'/],
  ['tsconfig.shared.json', 'shared/check/probe.ts', 'export enum Side { left }\n', /erasableSyntaxOnly/],
  [
    'tsconfig.shared.json',
    'shared/check/probe.ts',
    'export const first = (all: number[]): number => all[0]\n',
    /undefined/,
  ],
]

const accepted: [config: string, file: string, text: string][] = [
  ['tsconfig.shared.json', 'shared/check/probe.ts', "export * from '../quantity/rails.ts'\n"],
  ['tsconfig.client.json', 'src/api/probe.ts', 'export const width = window.innerWidth\n'],
  [
    'tsconfig.server.json',
    'server/services/probe.ts',
    "export * from '#shared/quantity/rails.ts'\nexport const id = process.pid\n",
  ],
]

describe('runtimes', () => {
  it.each(refused)('%s refuses in %s: %s', (config, file, text, error) => {
    expect(errorsOf(config, file, text)).toContainEqual(expect.stringMatching(error))
  })

  it.each(accepted)('%s accepts in %s: %s', (config, file, text) => {
    expect(errorsOf(config, file, text)).toEqual([])
  })
})
