import { formatPath, problemsOf } from '#shared/build/problems.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import { modelSchema, type Model } from '#shared/catalog/model.ts'
import { modelProblems } from '#shared/catalog/modelProblems.ts'
import { PlacedError } from '../base/explain.ts'

/** Where a model may be saved. */
export interface SaveTarget {
  id: 'own' | 'shared'
  words: string
}

/**
 * Reads anything as a model: its schema, then how it fits the connector types and the customs of its kind.
 * @throws PlacedError naming every bad place by its path.
 */
export function checkModel(input: unknown, index: CatalogIndex): Model {
  const parsed = modelSchema.safeParse(input)
  if (!parsed.success) throw new PlacedError('This is not a complete model', problemsOf(parsed.error))
  const errors: { path: string; message: string }[] = []
  modelProblems(parsed.data, index.connectorTypes, new Set(index.classes.keys()), (path, message) =>
    errors.push({ path: formatPath(path), message }),
  )
  if (errors.length > 0) throw new PlacedError('This model does not hold together', errors)
  return parsed.data
}
