import { readFileSync } from 'node:fs'
import { readBuildText } from '#shared/build/read.ts'
import { resolve } from '#shared/build/resolve.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { lidContent } from '#shared/paper/lid/make.ts'
import { lidPages, type LidOptions } from '#shared/paper/lid/pages.ts'
import type { ViewName } from '#shared/paper/lid/content.ts'
import { loadCatalogFiles } from '../../../../server/services/catalogFiles.ts'

export const catalog = indexCatalog(loadCatalogFiles())

const examples = new Map<string, BuildDocument>()

export function example(id: string): BuildDocument {
  const known = examples.get(id)
  if (known) return known
  const read = readBuildText(readFileSync(`examples/${id}/build.json`, 'utf8'), catalog)
  if (!read.ok) throw new Error(JSON.stringify(read.problems))
  examples.set(id, read.document)
  return read.document
}

/** What is reckoned once for a document, however often it is printed. */
const reckoned = new WeakMap<BuildDocument, ReturnType<typeof reckon>>()

function reckon(document: BuildDocument) {
  const build = resolve(document, catalog)
  return { build, result: check(document, catalog), drawing: arrange(build) }
}

/** A code of noughts and ones that nothing has to read here. */
export const code = Array.from({ length: 33 }, (_, row) =>
  Array.from({ length: 33 }, (_unused, column) => (row * column) % 3 === 0),
)

export const address = 'https://plans.reelvault.example/builds/4b1f3a52-77aa-4c2e-9a3e-0e6f5b1c2d3e'

/** The lid sheet of a document: what it says, and its pages. */
export function lidOf(document: BuildDocument, options: Partial<LidOptions> & { seenFrom?: ViewName } = {}) {
  const { seenFrom, ...rest } = options
  const made = reckoned.get(document) ?? reckon(document)
  reckoned.set(document, made)
  const { build, result, drawing } = made
  const content = lidContent({
    build,
    result,
    revision: 14,
    date: '2026-12-01',
    review: null,
    seenFrom,
    contact: 'Vault desk, extension 214',
    address,
  })
  const diagram = { build, drawing, result, moment: 'cold-start' as const }
  const paper = lidPages({ content, code, diagram }, { paper: 'a4', colour: false, diagram: 'pages', ...rest })
  return { build, result, content, paper }
}
