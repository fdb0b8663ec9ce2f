import { describe, expect, it } from 'vitest'
import { catalogSchema, indexCatalog } from '#shared/catalog/catalog.ts'
import { modelSchema } from '#shared/catalog/model.ts'
import { checkModel } from '../../../../src/components/catalog/checkModel.ts'
import { readNumber } from '../../../../src/components/catalog/readNumber.ts'
import { searchModels, type ModelFilter } from '../../../../src/components/catalog/searchModels.ts'

const nothing: ModelFilter = { search: '', kind: '', class: '', own: false }
const fan = { id: 'fan-120', kind: 'fan', name: 'Fan, 120 mm', class: 'fan' }
const models = [
  { model: modelSchema.parse(fan), own: false },
  {
    model: modelSchema.parse({
      id: 'lead-sata-4-a',
      kind: 'lead',
      name: 'Modular lead, 4 x SATA',
      connectors: [{ id: 'supply', label: 'supply end', type: 'modular-6-plug' }],
    }),
    own: true,
  },
]
const found = (filter: Partial<ModelFilter>) =>
  searchModels(models, { ...nothing, ...filter }).map(({ model }) => model.id)

describe('the search of the catalog', () => {
  it('finds by name, id and connector, in any order and case', () => {
    expect(found({ search: 'sata lead' })).toEqual(['lead-sata-4-a'])
    expect(found({ search: 'LEAD-SATA' })).toEqual(['lead-sata-4-a'])
    expect(found({ search: 'modular 6 plug' })).toEqual(['lead-sata-4-a'])
    expect(found({ search: '120 sata' })).toEqual([])
  })
  it('filters by kind, class and owner', () => {
    expect(found({})).toEqual(['fan-120', 'lead-sata-4-a'])
    expect(found({ kind: 'fan' })).toEqual(['fan-120'])
    expect(found({ class: 'fan' })).toEqual(['fan-120'])
    expect(found({ own: true })).toEqual(['lead-sata-4-a'])
  })
})

describe('a typed number', () => {
  it.each([
    ['1.8', 1.8],
    [' 1,8 ', 1.8],
    ['.5', 0.5],
    ['12.', 12],
    ['0', 0],
    ['', null],
    ['1.8 A', undefined],
    ['-1', undefined],
    ['1e3', undefined],
    ['1.2.3', undefined],
  ])('%j reads as %j', (text, value) => expect(readNumber(text)).toBe(value))
})

describe('a model from a file', () => {
  const index = indexCatalog(catalogSchema.parse({ connectorTypes: [], classes: [], models: [], sources: [] }))
  const errors = (input: unknown) => {
    try {
      checkModel(input, index)
    } catch (error) {
      return (error as { errors: { path: string; message: string }[] }).errors
    }
    return []
  }
  it('is refused with every bad place by its path', () => {
    expect(
      errors({ id: 'x', kind: 'fan', name: '', odd: 1 })
        .map(({ path }) => path)
        .sort(),
    ).toEqual(['name', 'odd'])
  })
  it('is held against the connector types and customs too', () => {
    const told = errors({ ...fan, connectors: [{ id: 'power', label: 'power', type: 'no-such' }] })
    expect(told).toContainEqual({ path: 'connectors[0].type', message: 'no connector type "no-such"' })
    expect(told).toContainEqual({ path: 'class', message: 'no class "fan"' })
  })
})
