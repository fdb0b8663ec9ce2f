import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { compareBuilds } from '#shared/build/compare.ts'
import { differenceWords } from '#shared/build/compareWords.ts'
import type { BuildDocument, Part } from '#shared/build/document.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { drive, figure } from '../../helpers/fixtures/models.ts'
import { shippedCatalog } from '../../fuzz/properties.ts'
import { wildDocument } from '../../fuzz/wildDocument.ts'

const base = documentOf(
  {
    A1: 'case',
    K1: 'hba-4i',
    W1: 'breakout-sas',
    C1: { model: 'sas-4tb', bay: { case: 'A1', slot: 1 }, serial: 'RV1' },
    C2: 'sas-4tb',
  },
  ['K1.port-a W1.host', 'W1.leg-1 C1.plug'],
)
const told = (after: BuildDocument, before: BuildDocument = base) =>
  compareBuilds(before, after).map((one) => differenceWords(one))
const withPart = (id: string, patch: Partial<Part>): BuildDocument => ({
  ...base,
  parts: base.parts.map((part) => (part.id === id ? { ...part, ...patch } : part)),
})

describe('what changed between two states of a build', () => {
  it.each<[string, BuildDocument, string[]]>([
    ['nothing', base, []],
    ['where things are drawn', withPart('C1', { position: { x: 4, y: 5 } }), []],
    [
      'a part added',
      { ...base, parts: [...base.parts, { id: 'x', ref: 'C3', model: 'sas-8tb' }] },
      ['C3 added: sas-8tb.'],
    ],
    ['a part removed', { ...base, parts: base.parts.filter((part) => part.id !== 'C2') }, ['C2 removed: sas-4tb.']],
    ['a drive moved', withPart('C1', { bay: { case: 'A1', slot: 3 } }), ['C1 moved from bay 1 of A1 to bay 3 of A1.']],
    [
      'a drive put into a bay',
      withPart('C2', { bay: { case: 'A1', slot: 2 } }),
      ['C2 moved from no bay to bay 2 of A1.'],
    ],
    ['another model', withPart('C2', { model: 'sas-8tb' }), ['C2: model changed from sas-4tb to sas-8tb.']],
    ['a serial', withPart('C2', { serial: 'RV2' }), ['C2: serial set to RV2.']],
    [
      'a figure',
      withPart('W1', { overrides: { 'cable.length_mm': figure(800) } }),
      ['W1: own figure cable.length_mm set to 800 (maker).'],
    ],
    [
      'a setting',
      { ...base, settings: { ...base.settings, spinUp: { ...base.settings.spinUp, groupSize: 4 } } },
      ['Drives in a start group changed from 2 to 4.'],
    ],
    ['the name', { ...base, name: 'North room' }, ['Name of the build changed from test to North room.']],
    ['an own model', { ...base, models: [drive('own')] }, ['Own model added: own.']],
    [
      'a pin test',
      withPart('W1', { pinTest: { supply: 'T1', supplyModel: 'supply', by: 'Ines', on: '2026-11-30' } }),
      ['W1: pin test on record, by Ines on 2026-11-30.'],
    ],
    [
      'an acceptance',
      {
        ...base,
        accepted: [{ key: 'identity|build', reason: 'labels follow', by: 'Ines', on: '2026-11-30', severity: 'note' }],
      },
      ['Finding accepted (identity|build): labels follow'],
    ],
  ])('tells %s', (_, after, expected) => expect(told(after)).toEqual(expected))

  it('tells joints by what they join, not by their ids or direction', () => {
    const [first, second] = base.joints
    expect(told({ ...base, joints: [{ id: 'other', a: first!.b, b: first!.a }, second!] })).toEqual([])
    expect(told({ ...base, joints: [first!] })).toEqual(['W1 leg-1 taken off C1 plug.'])
    const more = { id: 'j3', a: { part: 'W1', connector: 'leg-2' }, b: { part: 'C2', connector: 'plug' } }
    expect(told({ ...base, joints: [...base.joints, more] })).toEqual(['W1 leg-2 joined to C2 plug.'])
  })

  it('tells a leg that goes to another drive as one rewiring', () => {
    const [first, second] = base.joints
    const rewired = { ...second!, b: { part: 'C2', connector: 'plug' } }
    expect(told({ ...base, joints: [first!, rewired] })).toEqual(['W1 leg-1 rewired from C1 plug to C2 plug.'])
  })

  it('tells a removed part and its joint apart', () => {
    const after = apply(base, [
      { op: 'removeJoint', id: base.joints[1]!.id },
      { op: 'removePart', id: 'C1' },
    ])
    expect(told(after)).toEqual(['C1 removed: sas-4tb.', 'W1 leg-1 taken off C1 plug.'])
  })
})

describe('comparing any two builds', () => {
  const wild = wildDocument(shippedCatalog(), { maxParts: 8, maxJoints: 10 })

  it('finds nothing between a build and itself in another order', () => {
    fc.assert(
      fc.property(wild, (document) => {
        const turned = { ...document, parts: [...document.parts].reverse(), joints: [...document.joints].reverse() }
        expect(compareBuilds(document, turned)).toEqual([])
      }),
    )
  })

  it('finds as much on the way back as on the way there, each in words', () => {
    fc.assert(
      fc.property(wild, wild, (before, after) => {
        const there = compareBuilds(before, after)
        expect(compareBuilds(after, before)).toHaveLength(there.length)
        for (const difference of there) expect(differenceWords(difference)).toMatch(/\S\.$/)
      }),
    )
  })
})
