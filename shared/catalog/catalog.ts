import { z } from 'zod'
import { connectorTypeSchema, type ConnectorType } from './connectorType.ts'
import { modelClassSchema, modelSchema, type Model, type ModelClass } from './model.ts'
import { sourceSchema, type Source } from './source.ts'

/** The whole catalog as data: what the API sends and the folder `catalog/` holds. */
export const catalogSchema = z.strictObject({
  connectorTypes: z.array(connectorTypeSchema),
  classes: z.array(modelClassSchema),
  models: z.array(modelSchema),
  sources: z.array(sourceSchema),
})
export type Catalog = z.infer<typeof catalogSchema>

/** The catalog by id, made once and read everywhere. */
export interface CatalogIndex {
  connectorTypes: ReadonlyMap<string, ConnectorType>
  classes: ReadonlyMap<string, ModelClass>
  models: ReadonlyMap<string, Model>
  sources: ReadonlyMap<string, Source>
}

const byId = <T extends { id: string }>(items: readonly T[]): ReadonlyMap<string, T> =>
  new Map(items.map((item) => [item.id, item]))

/** Indexes a parsed catalog. Consistency is checked by `catalogProblems`, not here. */
export function indexCatalog(catalog: Catalog): CatalogIndex {
  return {
    connectorTypes: byId(catalog.connectorTypes),
    classes: byId(catalog.classes),
    models: byId(catalog.models),
    sources: byId(catalog.sources),
  }
}
