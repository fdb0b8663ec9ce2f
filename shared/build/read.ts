import type { CatalogIndex } from '../catalog/catalog.ts'
import { buildDocumentSchema, documentFormat, documentVersion, type BuildDocument } from './document.ts'
import { migrate } from './migrations.ts'
import { problemsOf, type DocumentProblem } from './problems.ts'
import { resolve } from './resolve.ts'

export type ReadResult = { ok: true; document: BuildDocument } | { ok: false; problems: DocumentProblem[] }

/** Nesting that no document of ours reaches; deeper input is refused before the schema walks it. */
const maxDepth = 24

/**
 * Reads anything that claims to be a build document: format, version (older ones are migrated), schema, references.
 * Takes parsed JSON; `readBuildText` takes text. Never throws.
 */
export function readBuild(input: unknown, catalog: CatalogIndex): ReadResult {
  const refuse = (path: string, message: string): ReadResult => ({ ok: false, problems: [{ path, message }] })
  if (typeof input !== 'object' || input === null || Array.isArray(input))
    return refuse('', 'a build document is a JSON object')
  if (deeperThan(input, maxDepth)) return refuse('', `nested deeper than ${maxDepth} levels`)
  const head = input as { format?: unknown; version?: unknown }
  if (head.format !== documentFormat) return refuse('format', `expected "${documentFormat}"`)
  if (typeof head.version !== 'number' || !Number.isInteger(head.version) || head.version < 1)
    return refuse('version', 'expected a whole number from 1')
  if (head.version > documentVersion)
    return refuse('version', `version ${head.version} is newer than this Bayloom reads (${documentVersion})`)

  const parsed = buildDocumentSchema.safeParse(migrate(input as Record<string, unknown>, head.version))
  if (!parsed.success) return { ok: false, problems: problemsOf(parsed.error) }
  const { problems } = resolve(parsed.data, catalog)
  return problems.length > 0 ? { ok: false, problems: problems.slice(0, 100) } : { ok: true, document: parsed.data }
}

/** As `readBuild`, from text. */
export function readBuildText(text: string, catalog: CatalogIndex): ReadResult {
  let input: unknown
  try {
    input = JSON.parse(text)
  } catch (error) {
    const reason = error instanceof Error ? error.message : 'unreadable'
    return { ok: false, problems: [{ path: '', message: `not JSON: ${reason.slice(0, 200)}` }] }
  }
  return readBuild(input, catalog)
}

/** Walks level by level, without recursion, so that wild nesting cannot exhaust the stack. */
function deeperThan(input: object, limit: number): boolean {
  let level: object[] = [input]
  for (let depth = 1; level.length > 0; depth++) {
    if (depth > limit) return true
    const next: object[] = []
    for (const node of level)
      for (const value of Object.values(node)) if (typeof value === 'object' && value !== null) next.push(value)
    level = next
  }
  return false
}
