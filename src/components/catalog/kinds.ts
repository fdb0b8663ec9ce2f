import { modelKinds, type ModelKind } from '#shared/catalog/model.ts'

const words: Readonly<Record<ModelKind, { one: string; many: string }>> = {
  supply: { one: 'Supply', many: 'Supplies' },
  lead: { one: 'Lead', many: 'Leads' },
  splitter: { one: 'Splitter', many: 'Splitters' },
  adapter: { one: 'Adapter', many: 'Adapters' },
  breakout: { one: 'Breakout', many: 'Breakouts' },
  cable: { one: 'Data cable', many: 'Data cables' },
  controller: { one: 'Controller', many: 'Controllers' },
  expander: { one: 'Expander', many: 'Expanders' },
  backplane: { one: 'Backplane', many: 'Backplanes' },
  board: { one: 'Board', many: 'Boards' },
  case: { one: 'Case', many: 'Cases' },
  drive: { one: 'Drive', many: 'Drives' },
  fan: { one: 'Fan', many: 'Fans' },
  load: { one: 'Other load', many: 'Other loads' },
}

export const kindName = (kind: ModelKind): string => words[kind].one
export const kindsName = (kind: ModelKind): string => words[kind].many

export const kindOptions = modelKinds.map((value) => ({ value, words: kindName(value) }))
