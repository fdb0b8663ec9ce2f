import { cpSync, mkdtempSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { catalogFolder, CatalogFilesError, loadCatalogFiles } from '../../server/services/catalogFiles.ts'

let folder: string

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'catalog-'))
  cpSync(catalogFolder, folder, { recursive: true })
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
    expect(catalog.models.length).toBeGreaterThan(200)
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
    renameSync(join(folder, 'connectors/esata-plug.json'), join(folder, 'connectors/esata.json'))
    expect(refusal()).toEqual(['connectors/esata.json: id: the file should be esata-plug.json'])
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
    edit('connectors/esata-plug.json', (item) => (item['matesWith'] = ['sata-host-plug']))
    const problems = refusal()
    expect(problems).toContain(
      'connectorTypes.esata-plug.matesWith: "sata-host-plug" does not name "esata-plug" in return',
    )
    expect(problems).toContain(
      'connectorTypes.esata-receptacle.matesWith: "esata-plug" does not name "esata-receptacle" in return',
    )
  })
})
