import { computed } from 'vue'
import type { Model } from '#shared/catalog/model.ts'
import { useCatalog } from './useCatalog.ts'
import { useOwnModels } from './useOwnModels.ts'

export interface ListedModel {
  model: Model
  own: boolean
}

/** All models that this person can use: their own first, which win over catalog models of the same id. */
export function useModels() {
  const catalog = useCatalog()
  const own = useOwnModels()
  const all = computed<ListedModel[]>(() => {
    const mine = own.models.value.map(({ model }) => ({ model, own: true }))
    const ids = new Set(mine.map(({ model }) => model.id))
    const shared = (catalog.catalog.value?.models ?? []).filter((model) => !ids.has(model.id))
    return [...mine, ...shared.map((model) => ({ model, own: false }))]
  })
  const find = (id: string): ListedModel | undefined => all.value.find(({ model }) => model.id === id)
  return { all, find, catalog, own }
}
