import type { ModelKind } from '#shared/catalog/model.ts'
import type { ListedModel } from '../../composables/useModels.ts'

export interface ModelFilter {
  search: string
  kind: ModelKind | ''
  class: string
  own: boolean
}

const normal = (text: string): string => text.toLowerCase().replace(/[\s,._-]+/g, ' ')

/** Everything of a model that somebody may search it by. */
const textOf = ({ model }: ListedModel): string =>
  normal([model.name, model.id, model.summary, model.class, ...new Set(model.connectors.map((c) => c.type))].join(' '))

/** Models that pass the filter; every word of the search must appear somewhere. */
export function searchModels(models: readonly ListedModel[], filter: ModelFilter): ListedModel[] {
  const words = normal(filter.search).split(' ').filter(Boolean)
  return models.filter((listed) => {
    if (filter.own && !listed.own) return false
    if (filter.kind && listed.model.kind !== filter.kind) return false
    if (filter.class && listed.model.class !== filter.class) return false
    if (words.length === 0) return true
    const text = textOf(listed)
    return words.every((word) => text.includes(word))
  })
}
