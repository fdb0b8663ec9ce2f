import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { changesBetween } from '#shared/build/changesBetween.ts'
import { changeSchema } from '#shared/build/changes.ts'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { invert } from '#shared/build/invert.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { shippedCatalog } from '../../fuzz/properties.ts'
import { wildDocument } from '../../fuzz/wildDocument.ts'

/** The same content whatever the order of its lists. */
const inOrder = (document: BuildDocument): BuildDocument => {
  const byId = <T extends { id: string }>(items: readonly T[]) => [...items].sort((a, b) => (a.id < b.id ? -1 : 1))
  return {
    ...document,
    parts: byId(document.parts),
    joints: byId(document.joints),
    models: byId(document.models),
    accepted: [...document.accepted].sort((a, b) => (a.key < b.key ? -1 : 1)),
  }
}

const before = documentOf({ K1: 'hba-4i', W1: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' }, [
  'K1.port-a W1.host',
  'W1.leg-1 C1.plug',
])

describe('the way from one state of a build to another', () => {
  it('is nothing between a build and itself', () => expect(changesBetween(before, before)).toEqual([]))

  it('takes joints off before their parts, and joins after the parts are there', () => {
    const after = documentOf({ K1: 'hba-4i', W1: 'breakout-sas', C3: 'sas-8tb' }, ['W1.leg-1 C3.plug'])
    expect(inOrder(apply(before, changesBetween(before, after)))).toEqual(inOrder(after))
    expect(changesBetween(before, after).map((change) => change.op)).toEqual([
      'removeJoint',
      'removeJoint',
      'removePart',
      'removePart',
      'addPart',
      'addJoint',
    ])
  })

  it('writes only the fields that differ, and clears what was not there', () => {
    const noted = {
      ...before,
      parts: before.parts.map((part) => (part.id === 'C1' ? { ...part, note: 'loud' } : part)),
    }
    expect(changesBetween(noted, before)).toEqual([{ op: 'updatePart', id: 'C1', patch: { note: null } }])
  })

  it('carries notes on buying', () => {
    const bought = { ...before, purchases: [{ line: 'sas-4tb', owned: 2 }] }
    const more = { ...before, purchases: [{ line: 'sas-4tb', owned: 1, note: 'one came broken' }] }
    for (const [from, to] of [
      [before, bought],
      [bought, more],
      [more, before],
    ] as const)
      expect(apply(from, changesBetween(from, to))).toEqual(to)
  })

  it('knows every field of a document', () => {
    const known = [
      'accepted',
      'format',
      'joints',
      'machine',
      'models',
      'name',
      'parts',
      'purchases',
      'settings',
      'version',
    ]
    expect(Object.keys(buildDocumentSchema.shape).sort()).toEqual(known)
  })

  it('leads anywhere, in changes that the schema takes, and back', () => {
    const wild = wildDocument(shippedCatalog(), { maxParts: 8, maxJoints: 10 })
    fc.assert(
      fc.property(wild, wild, (from, to) => {
        const changes = changesBetween(from, to)
        for (const change of changes) changeSchema.parse(change)
        const there = apply(from, changes)
        expect(inOrder(there)).toEqual(inOrder(to))
        expect(inOrder(apply(there, invert(from, changes)))).toEqual(inOrder(from))
      }),
    )
  })
})
