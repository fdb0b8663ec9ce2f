import { createHash } from 'node:crypto'
import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import { indexCatalog, type Catalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Model } from '#shared/catalog/model.ts'
import { catalogProblems } from '#shared/catalog/problems.ts'
import { takeLock } from '../db/lock.ts'
import { CatalogRevision } from '../models/index.ts'
import { Refusal } from './refusal.ts'

/** The shared catalog as it stands: shipped files with the editors' models over them. */
export interface CurrentCatalog {
  data: Catalog
  index: CatalogIndex
  /** The same text for the same content, for the ETag. */
  version: string
  /** The data as JSON, made once. */
  json: string
}

export interface CatalogService {
  /** The catalog now. Edits made through another process are seen too. */
  current(): Promise<CurrentCatalog>
  putModel(model: Model, authorId: string, note: string | null): Promise<Model>
}

/** Keeps the catalog in memory, and makes it anew when the database holds an edit that it has not seen. */
export function makeCatalogService(database: Sequelize, shipped: Catalog): CatalogService {
  let made: { newest: string; catalog: CurrentCatalog } | undefined

  async function current(): Promise<CurrentCatalog> {
    const newest = await newestEdit(database)
    if (made?.newest !== newest) made = { newest, catalog: assemble(shipped, await editedModels(database)) }
    return made.catalog
  }

  return {
    current,
    async putModel(model, authorId, note) {
      await database.transaction(async (transaction) => {
        await takeLock(database, 'catalog', transaction)
        refuseUnfit(model, await current())
        await CatalogRevision.create({ modelId: model.id, model, note, authorId }, { transaction })
        await askForNewVerdicts(database, model.id, transaction)
      })
      return model
    },
  }
}

/** Builds that name the model are checked anew, by the job that checks builds: their verdict may rest on its figures. */
async function askForNewVerdicts(database: Sequelize, modelId: string, transaction: Transaction): Promise<void> {
  await database.query(
    `UPDATE builds b SET checked_revision = 0, check_failed_revision = 0 FROM build_revisions r
     WHERE r.build_id = b.id AND r.revision = b.revision AND position($1 in r.document::text) > 0`,
    { bind: [JSON.stringify(modelId)], transaction },
  )
}

/** A model must fit the catalog that it joins, and keep the connectors that builds may be joined to. */
function refuseUnfit(model: Model, { data, index }: CurrentCatalog): void {
  const models = [...data.models.filter((other) => other.id !== model.id), model]
  const own = `models.${model.id}`
  const unfit = catalogProblems({ ...data, models })
    .filter(({ path }) => path === own || path.startsWith(`${own}.`) || path.startsWith(`${own}[`))
    .map(({ path, message }) => ({ path: `model${path.slice(own.length)}`, message }))
  const errors = [...unfit, ...lostConnectors(model, index.models.get(model.id))]
  if (errors.length > 0) throw new Refusal('bad-input', { errors: errors.slice(0, 100) })
}

function lostConnectors(model: Model, before: Model | undefined): { path: string; message: string }[] {
  if (!before) return []
  const kept = new Set(model.connectors.map((connector) => connector.id))
  return before.connectors
    .filter((connector) => !kept.has(connector.id))
    .map(({ id }) => ({
      path: 'model.connectors',
      message: `connector "${id}" has to stay: builds may be joined to it`,
    }))
}

async function newestEdit(database: Sequelize): Promise<string> {
  const rows = await database.query<{ newest: string }>(
    'SELECT coalesce(max(id), 0)::text AS newest FROM catalog_revisions',
    { type: QueryTypes.SELECT },
  )
  return rows[0]?.newest ?? '0'
}

async function editedModels(database: Sequelize): Promise<Model[]> {
  const rows = await database.query<{ model: Model }>(
    'SELECT DISTINCT ON (model_id) model FROM catalog_revisions ORDER BY model_id, id DESC',
    { type: QueryTypes.SELECT },
  )
  return rows.map((row) => row.model)
}

function assemble(shipped: Catalog, edited: readonly Model[]): CurrentCatalog {
  const models = new Map(shipped.models.map((model) => [model.id, model]))
  for (const model of edited) models.set(model.id, model)
  const data: Catalog = { ...shipped, models: [...models.values()] }
  const json = JSON.stringify(data)
  const version = createHash('sha256').update(json).digest('base64url').slice(0, 24)
  return { data, index: indexCatalog(data), version, json }
}
