import { cpSync, mkdirSync, mkdtempSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { modelKinds } from '#shared/catalog/model.ts'
import { catalogFolder, CatalogFilesError, loadCatalogFiles } from '../../server/services/catalogFiles.ts'

let folder: string

/** A catalog of one fan: small, so that each test reads its own. */
const files = [
  'classes.json',
  'sources.json',
  'connectors/fan-4-header.json',
  'connectors/fan-4-receptacle.json',
  'models/fan/fan-120.json',
]

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'catalog-'))
  for (const kind of modelKinds) mkdirSync(join(folder, 'models', kind), { recursive: true })
  for (const file of files) cpSync(join(catalogFolder, file), join(folder, file))
})

afterEach(() => rmSync(folder, { recursive: true, force: true }))

function refusal(): readonly string[] {
  try {
    loadCatalogFiles(folder)
  } catch (error) {
    if (error instanceof CatalogFilesError) return error.problems
    throw error
  }
  return []
}

function edit(file: string, change: (item: Record<string, unknown>) => void): void {
  const item = JSON.parse(readFileSync(join(folder, file), 'utf8')) as Record<string, unknown>
  change(item)
  writeFileSync(join(folder, file), JSON.stringify(item))
}

describe('loadCatalogFiles', () => {
  it('reads a sound folder, once', () => {
    const catalog = loadCatalogFiles(folder)
    expect(catalog.models.map(({ id }) => id)).toEqual(['fan-120'])
    expect(catalog.connectorTypes).toHaveLength(2)
    expect(loadCatalogFiles(folder)).toBe(catalog)
  })

  it('names the file that is not JSON', () => {
    writeFileSync(join(folder, 'models/fan/fan-120.json'), '{')
    expect(refusal()).toEqual([expect.stringMatching(/^models\/fan\/fan-120\.json: .*JSON/)])
  })

  it('names file and path of a field that nobody knows', () => {
    edit('models/fan/fan-120.json', (item) => (item['colour'] = 'brown'))
    expect(refusal()).toEqual(['models/fan/fan-120.json: colour: unknown field'])
  })

  it('names file and path of a figure that is out of its range', () => {
    edit('models/fan/fan-120.json', (item) => {
      item['load'] = {
        '12V': { rest_A: { value: 2, high: 1, origin: 'guess' }, scan_A: { value: 1, origin: 'guess' } },
      }
    })
    expect(refusal()).toEqual(['models/fan/fan-120.json: load.12V.rest_A.value: value is above high'])
  })

  it('wants a file named after its id', () => {
    renameSync(join(folder, 'connectors/fan-4-header.json'), join(folder, 'connectors/header.json'))
    expect(refusal()).toEqual(['connectors/header.json: id: the file should be fan-4-header.json'])
  })

  it('wants a model in the folder of its kind', () => {
    renameSync(join(folder, 'models/fan/fan-120.json'), join(folder, 'models/load/fan-120.json'))
    expect(refusal()).toEqual(['models/load/fan-120.json: kind: a fan belongs in models/fan'])
  })

  it('says which folder is missing', () => {
    rmSync(join(folder, 'connectors'), { recursive: true })
    expect(refusal()).toEqual(['connectors: this folder is missing'])
  })

  it('refuses a folder whose files parse but do not agree', () => {
    edit('connectors/fan-4-header.json', (item) => (item['matesWith'] = ['fan-4-header']))
    expect(refusal()).toContain(
      'connectorTypes.fan-4-receptacle.matesWith: "fan-4-header" does not name "fan-4-receptacle" in return',
    )
  })

  it('says so where a folder of models is missing', () => {
    rmSync(join(folder, 'models/supply'), { recursive: true })
    expect(refusal()).toEqual(['models/supply: this folder is missing'])
  })
})
