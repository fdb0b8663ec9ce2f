import { readdirSync, readFileSync } from 'node:fs'
import { readBuild } from '#shared/build/read.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { catalogSchema, indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { modelKinds } from '#shared/catalog/model.ts'

const parse = (path: string): unknown => JSON.parse(readFileSync(path, 'utf8'))
const parseFolder = (folder: string): unknown[] => readdirSync(folder).map((name) => parse(`${folder}/${name}`))

/** The shipped catalog; the server's own reader finds its folder by a file address, which a page does not have. */
export const shippedCatalog = (): CatalogIndex =>
  indexCatalog(
    catalogSchema.parse({
      connectorTypes: parseFolder('catalog/connectors'),
      classes: parse('catalog/classes.json'),
      models: modelKinds.flatMap((kind) => parseFolder(`catalog/models/${kind}`)),
      sources: parse('catalog/sources.json'),
    }),
  )

export function exampleBuild(id: string, catalog: CatalogIndex): BuildDocument {
  const read = readBuild(parse(`examples/${id}/build.json`), catalog)
  if (!read.ok) throw new Error(`example ${id} cannot be read`)
  return read.document
}
