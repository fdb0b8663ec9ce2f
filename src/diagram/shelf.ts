import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Model, ModelKind } from '#shared/catalog/model.ts'
import { keyFigures } from '../components/catalog/keyFigures.ts'
import { kindsName } from '../components/catalog/kinds.ts'

/** A model as it lies on the shelf. */
export interface ShelfItem {
  model: Model
  figures: string
  /** Where it comes from, where not the shared catalog. */
  own: 'build' | 'library' | null
}

export interface ShelfGroup {
  kind: ModelKind
  title: string
  items: ShelfItem[]
}

/** Kinds in the order in which a machine is put together. */
const kinds: readonly ModelKind[] = [
  'case',
  'supply',
  'drive',
  'lead',
  'splitter',
  'adapter',
  'backplane',
  'breakout',
  'cable',
  'controller',
  'expander',
  'board',
  'fan',
  'load',
]

/** Everything on the shelf by kind: the build's own models, the person's library, the shared catalog. */
export function shelfGroups(
  catalog: CatalogIndex,
  ofBuild: readonly Model[],
  ofLibrary: readonly Model[],
): ShelfGroup[] {
  const items = new Map<string, ShelfItem>()
  const add = (model: Model, own: ShelfItem['own']) => {
    if (!items.has(model.id)) items.set(model.id, { model, own, figures: keyFigures(model) })
  }
  for (const model of ofBuild) add(model, 'build')
  for (const model of ofLibrary) add(model, 'library')
  for (const model of catalog.models.values()) add(model, null)
  return kinds.map((kind) => ({
    kind,
    title: kindsName(kind),
    items: [...items.values()]
      .filter((item) => item.model.kind === kind)
      .sort((a, b) => Number(a.own === null) - Number(b.own === null) || naturally.compare(a.model.name, b.model.name)),
  }))
}

const naturally = new Intl.Collator('en', { numeric: true })

/** Groups with the items that hold every word searched for, in name, kind, figures or connectors. */
export function searchShelf(groups: readonly ShelfGroup[], search: string): ShelfGroup[] {
  const words = search.toLowerCase().split(/\s+/).filter(Boolean)
  if (words.length === 0) return groups.filter((group) => group.items.length > 0)
  return groups.flatMap((group) => {
    const items = group.items.filter((item) => {
      const text = textOf(group, item)
      return words.every((word) => text.includes(word))
    })
    return items.length > 0 ? [{ ...group, items }] : []
  })
}

const textOf = (group: ShelfGroup, { model, figures }: ShelfItem): string =>
  [model.name, model.summary ?? '', group.title, figures, ...new Set(model.connectors.map((one) => one.type))]
    .join(' ')
    .toLowerCase()
