import { describe, expect, it } from 'vitest'
import { applyOverrides, findFigurePath } from '#shared/build/overrides.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { listFigures } from '#shared/catalog/figureList.ts'
import { figuresIn } from '#shared/catalog/figures.ts'
import { modelSchema, type Model } from '#shared/catalog/model.ts'
import { modelProblems } from '#shared/catalog/modelProblems.ts'
import { idOfName, startFrom } from '#shared/catalog/ownModel.ts'
import { bayGrid, countableOf, withBayGrid, withCount } from '#shared/catalog/resize.ts'
import { wireSegments, withGauge } from '#shared/catalog/segments.ts'
import { loadCatalogFiles } from '../../../server/services/catalogFiles.ts'

const catalog = loadCatalogFiles()
const index = indexCatalog(catalog)
const shipped = catalog.models
const model = (id: string): Model => index.models.get(id)!

/** Everything that keeps a model from being used. */
function faults(candidate: Model): string[] {
  const parsed = modelSchema.safeParse(candidate)
  if (!parsed.success) return parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`)
  const found: string[] = []
  modelProblems(parsed.data, index.connectorTypes, new Set(index.classes.keys()), (path, message) =>
    found.push(`${path.map(String).join('.')}: ${message}`),
  )
  return found
}

describe('the figures of a model', () => {
  it('are all listed, but for those of the wiring, which stand with the wires', () => {
    for (const one of shipped) {
      const listed = listFigures(one).flatMap((group) => group.figures.map((figure) => figure.path))
      const all = figuresIn(one).filter(({ path }) => path[0] !== 'wiring')
      expect([one.id, listed.length, new Set(listed).size]).toEqual([one.id, all.length, listed.length])
    }
  })

  it('have paths that lead back to them, as overrides need', () => {
    for (const one of shipped)
      for (const figure of listFigures(one).flatMap((group) => group.figures)) {
        const keys = findFigurePath(one, figure.path)
        const found = keys?.reduce<unknown>((node, key) => (node as Record<string | number, unknown>)[key], one)
        expect(found, `${one.id} ${figure.path}`).toEqual(figure.quantity)
      }
  })

  it('ask first for what a drive label says', () => {
    const onLabel = listFigures(model('hdd-35-7200-sas-4tb'))
      .flatMap((group) => group.figures)
      .filter((figure) => figure.onLabel)
    expect(onLabel.map((figure) => figure.path)).toEqual([
      'drive.capacity_TB',
      'drive.rate_Gbps',
      'load.12V.scan_A',
      'load.12V.start.peak_A',
      'load.5V.scan_A',
      'load.5V.write_A',
      'load.5V.start.peak_A',
    ])
  })
})

describe('an own model that starts from a shipped one', () => {
  it('is sound for every shipped model', () => {
    for (const one of shipped) expect(faults(startFrom(one, { id: 'own-x', name: 'X' })), one.id).toEqual([])
  })

  it('claims nobody else’s reading or measurement as its own', () => {
    for (const one of shipped) {
      const origins = figuresIn(startFrom(one, { id: 'own-x', name: 'X' })).map(({ quantity }) => quantity.origin)
      expect(origins.filter((origin) => origin === 'maker' || origin === 'measured')).toEqual([])
    }
  })

  it('keeps values and documents, and leaves its start untouched', () => {
    const start = model('hdd-35-7200-sas-4tb')
    const before = JSON.stringify(start)
    const own = startFrom(start, { id: 'own-x', name: 'X' })
    expect(own.load?.['12V']?.scan_A).toEqual({ ...start.load?.['12V']?.scan_A, origin: 'class default' })
    expect(JSON.stringify(start)).toBe(before)
  })

  it('shows a typed figure in its place', () => {
    const typed = { value: 1.9, origin: 'maker', by: 'Irma', on: '2026-12-01' } as const
    const own = applyOverrides(model('hdd-35-7200-sas-4tb'), { 'load.12V.start.peak_A': typed }, () => undefined)
    expect(own.load?.['12V']?.start?.peak_A).toEqual(typed)
  })
})

describe('the id of an own model', () => {
  it('is made of its name and never one that is taken', () => {
    expect(idOfName('Müller & Co. 5 x SATA (18 AWG)', new Set())).toBe('own-muller-co-5-x-sata-18-awg')
    expect(idOfName('Lead', new Set(['own-lead', 'own-lead-2']))).toBe('own-lead-3')
    expect(idOfName('Lead', new Set(), '')).toBe('lead')
  })
  it('fits the schema whatever the name', () => {
    for (const name of ['...', '日本語', '1.92 TB', 'a..b', '-x-', 'x'.repeat(200), 'A.', '.5 in'])
      expect(modelSchema.shape.id.safeParse(idOfName(name, new Set())).error, name).toBeUndefined()
  })
})

describe('another count', () => {
  it('gives a sound model for every shipped part that can be counted, smaller and larger', () => {
    const counted = shipped.filter((one) => countableOf(one))
    expect(counted.length).toBeGreaterThan(30)
    for (const one of counted) {
      for (const count of [countableOf(one)!.least, 2, 5, 8]) {
        const changed = withCount(one, count)
        expect(countableOf(changed)?.count, `${one.id} ${count}`).toBe(count)
        expect(faults(changed), `${one.id} ${count}`).toEqual([])
      }
    }
  })

  it('continues the chain of a lead and starts a splitter’s new leg at its inlet', () => {
    const lead = withCount(model('lead-sata-4-a'), 5)
    expect(lead.wiring.filter((one) => one.to === 'out-5').map((one) => one.from)).toEqual(
      Array(lead.wiring.filter((one) => one.to === 'out-4').length).fill('out-4'),
    )
    const splitter = withCount(model('splitter-sata-2'), 3)
    expect(new Set(splitter.wiring.filter((one) => one.to === 'out-3').map((one) => one.from))).toEqual(new Set(['in']))
  })

  it('comes back to the start when it is undone', () => {
    const lead = model('lead-sata-4-a')
    expect(withCount(withCount(lead, 6), 4)).toEqual(lead)
  })

  it('leaves what cannot be counted alone', () => {
    expect(countableOf(model('hdd-35-7200-sas-4tb'))).toBeUndefined()
    expect(withCount(model('lead-sata-4-a'), 0)).toBe(model('lead-sata-4-a'))
    expect(withCount(model('splitter-sata-2'), 1)).toBe(model('splitter-sata-2'))
  })
})

describe('the front of a case', () => {
  it('can be any grid, numbered by rows', () => {
    const front = withBayGrid(model('case-rack-12-2u'), 4, 6)
    expect(bayGrid(front)).toEqual({ rows: 4, columns: 6 })
    expect(front.bays.map((bay) => bay.slot)).toEqual(Array.from({ length: 24 }, (_, i) => i + 1))
    expect(front.bays[7]).toMatchObject({ slot: 8, row: 1, column: 1 })
    expect(faults(front)).toEqual([])
  })
})

describe('pieces of cable', () => {
  it('hold all wires between two plugs', () => {
    const pieces = wireSegments(model('lead-sata-4-a'))
    expect(pieces.map(({ from, to }) => `${from} ${to}`)).toEqual([
      'supply out-1',
      'out-1 out-2',
      'out-2 out-3',
      'out-3 out-4',
    ])
    expect(pieces[0]).toMatchObject({ awg: 18, indexes: [0, 1, 2, 3] })
  })
  it('take another gauge one by one', () => {
    const thin = withGauge(model('lead-sata-4-a'), { from: 'supply', to: 'out-1' }, 20)
    expect(wireSegments(thin).map((piece) => piece.awg)).toEqual([20, 18, 18, 18])
    expect(faults(thin)).toEqual([])
  })
})
