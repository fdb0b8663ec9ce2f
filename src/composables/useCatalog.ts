import { useQuery } from '@tanstack/vue-query'
import { computed } from 'vue'
import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Model } from '#shared/catalog/model.ts'
import { readCatalog } from '../api/catalog.ts'

export const catalogKey = ['catalog'] as const

/** The shared catalog, fetched once and kept; `index` is undefined until it has come. */
export function useCatalog() {
  const query = useQuery({ queryKey: catalogKey, queryFn: ({ signal }) => readCatalog(signal), staleTime: 5 * 60_000 })
  const index = computed<CatalogIndex | undefined>(() => query.data.value && indexCatalog(query.data.value))
  const model = (id: string): Model | undefined => index.value?.models.get(id)
  const sourceTitle = (id: string | undefined): string | undefined => {
    const source = id === undefined ? undefined : index.value?.sources.get(id)
    return source && [source.title, source.clause].filter(Boolean).join(', ')
  }
  return { ...query, catalog: query.data, index, model, sourceTitle }
}
