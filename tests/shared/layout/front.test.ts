import { describe, expect, it } from 'vitest'
import { frontMap } from '#shared/layout/front.ts'
import { tidy } from '#shared/layout/tidy.ts'
import { tenDrives } from './sampleBuilds.ts'
import { buildOf } from './smallCatalog.ts'

describe('frontMap', () => {
  const build = tenDrives()
  const map = frontMap(build, build.partById.get('case')!, 20, 4)

  it('places bays as the hand meets them', () => {
    expect(map.cells.slice(0, 5).map(({ slot, x, y }) => ({ slot, x, y }))).toEqual([
      { slot: 1, x: 0, y: 0 },
      { slot: 2, x: 54, y: 0 },
      { slot: 3, x: 108, y: 0 },
      { slot: 4, x: 162, y: 0 },
      { slot: 5, x: 0, y: 24 },
    ])
    expect({ width: map.width, height: map.height }).toEqual({ width: 212, height: 68 })
  })

  it('names the drive in each', () =>
    expect(map.cells.map(({ drive }) => drive)).toEqual([
      ...Array.from({ length: 10 }, (_, i) => `C${i + 1}`),
      undefined,
      undefined,
    ]))
})

describe('tidy', () => {
  const { document } = buildOf([
    { id: 'a', model: 'lead-3', position: { x: 1, y: 2 } },
    { id: 'b', model: 'lead-3', position: { x: 3, y: 4 } },
    { id: 'c', model: 'lead-3' },
  ])

  it('clears every position', () =>
    expect(tidy(document)?.changes).toEqual([
      { op: 'updatePart', id: 'a', patch: { position: null } },
      { op: 'updatePart', id: 'b', patch: { position: null } },
    ]))

  it('clears those that are named', () =>
    expect(tidy(document, new Set(['b', 'c']))).toMatchObject({ label: 'Tidy W2', changes: [{ id: 'b' }] }))

  it('has nothing to do where nobody moved anything', () => expect(tidy(document, new Set(['c']))).toBeNull())
})
