import type { DocumentProblem } from '../build/problems.ts'
import { formatPath } from '../build/problems.ts'
import type { Catalog } from './catalog.ts'
import { figuresIn } from './figures.ts'
import { modelProblems } from './modelProblems.ts'

type Report = (path: readonly PropertyKey[], message: string) => void

/**
 * What is inconsistent in a catalog whose single files all parse: ids, mating, figures without an origin that can be
 * followed, and models that their connector types do not bear out. Empty: none. Paths lead into the catalog object;
 * models and connector types stand in them by id.
 */
export function catalogProblems(catalog: Catalog): DocumentProblem[] {
  const problems: DocumentProblem[] = []
  const report: Report = (path, message) => problems.push({ path: formatPath(path), message })
  for (const list of ['connectorTypes', 'classes', 'models', 'sources'] as const)
    checkUnique(catalog[list], list, report)
  checkMating(catalog, report)
  checkFigures(catalog, report)
  checkSourceLists(catalog, report)
  const types = new Map(catalog.connectorTypes.map((type) => [type.id, type]))
  const classes = new Set(catalog.classes.map((modelClass) => modelClass.id))
  for (const model of catalog.models)
    modelProblems(model, types, classes, (path, message) => report(['models', model.id, ...path], message))
  return problems
}

function checkUnique(items: readonly { id: string }[], list: string, report: Report): void {
  const seen = new Set<string>()
  items.forEach((item, i) => {
    if (seen.has(item.id)) report([list, i, 'id'], `"${item.id}" appears twice`)
    seen.add(item.id)
  })
}

/** Mating goes both ways, and every type finds a mate on some model, or says in its note why it has none. */
function checkMating(catalog: Catalog, report: Report): void {
  const types = new Map(catalog.connectorTypes.map((type) => [type.id, type]))
  const carried = new Set(catalog.models.flatMap((model) => model.connectors.map((connector) => connector.type)))
  for (const type of catalog.connectorTypes) {
    const path = ['connectorTypes', type.id, 'matesWith']
    if (type.matesWith.length === 0) report(path, 'mates with nothing')
    for (const id of type.matesWith) {
      const other = types.get(id)
      if (!other) report(path, `no connector type "${id}"`)
      else if (!other.matesWith.includes(type.id)) report(path, `"${id}" does not name "${type.id}" in return`)
    }
    if (type.note === undefined && !type.matesWith.some((id) => carried.has(id)))
      report(path, 'no model carries a connector that it mates with; add one or say why in its note')
  }
}

/** A figure read in a document names the document; a measured one says who and when. */
function checkFigures(catalog: Catalog, report: Report): void {
  const sources = new Set(catalog.sources.map((source) => source.id))
  for (const list of ['connectorTypes', 'classes', 'models'] as const)
    for (const item of catalog[list])
      for (const { path, quantity } of figuresIn(item)) {
        const at = [list, item.id, ...path]
        const { value, low, high, origin, source } = quantity
        if (source !== undefined && !sources.has(source)) report(at, `no source "${source}"`)
        if ((origin === 'standard' || origin === 'maker') && source === undefined && quantity.fromMemory !== true)
          report(at, `origin "${origin}" needs a source`)
        if (origin === 'measured' && (quantity.by === undefined || quantity.on === undefined))
          report(at, 'a measured figure needs "by" and "on"')
        if (value === null && (low === undefined || high === undefined))
          report(at, 'an unknown figure needs the low and high of its class')
      }
}

function checkSourceLists(catalog: Catalog, report: Report): void {
  const known = new Set(catalog.sources.map((source) => source.id))
  for (const list of ['connectorTypes', 'models'] as const)
    for (const item of catalog[list])
      item.sources.forEach((id, i) => {
        if (!known.has(id)) report([list, item.id, 'sources', i], `no source "${id}"`)
      })
}
