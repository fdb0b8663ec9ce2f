import { describe, expect, it } from 'vitest'
import { tellChanges } from '#shared/build/compareTold.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { resolve } from '#shared/build/resolve.ts'
import { catalog, documentOf } from '../../helpers/fixtures/build.ts'
import { drive, figure } from '../../helpers/fixtures/models.ts'

const base = documentOf({ K1: 'hba-4i', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' }, [
  'K1.port-a W1.host',
  'W1.leg-1 C1.plug',
  'W1.leg-2 C2.plug',
])
const tell = (after: BuildDocument) => tellChanges(resolve(base, catalog), resolve(after, catalog))
const label = (part: string, connector: string) =>
  resolve(base, catalog).partById.get(part)?.connectorById.get(connector)?.connector.label

describe('changes as they are read and lit', () => {
  it('say of a drive that it moved from one plug to another, with the labels on the parts', () => {
    const [first, second, third] = base.joints
    const after = {
      ...base,
      joints: [first!, { ...second!, id: 'new', a: { part: 'W2', connector: 'leg-1' } }, third!],
    }
    expect(tell(after)).toEqual([
      {
        group: 'wiring',
        mark: 'moved',
        text: `C1 moved from W1 ${label('W1', 'leg-1')} to W2 ${label('W2', 'leg-1')}.`,
        parts: ['C1'],
        joint: { before: second!.id, after: 'new' },
      },
    ])
  })

  it('say of two drives that changed places that each of them moved', () => {
    const [first, second, third] = base.joints
    const swapped = [first!, { ...second!, id: 'x', a: third!.a }, { ...third!, id: 'y', a: second!.a }]
    const legs = [label('W1', 'leg-1'), label('W1', 'leg-2')]
    expect(tell({ ...base, joints: swapped }).map(({ text }) => text)).toEqual([
      `C1 moved from W1 ${legs[0]} to W1 ${legs[1]}.`,
      `C2 moved from W1 ${legs[1]} to W1 ${legs[0]}.`,
    ])
  })

  it('tell which figures of an own model changed', () => {
    const own = drive('own')
    const was = { ...base, models: [own] }
    const heavier = { ...own, mass_g: figure(700) }
    const is = { ...base, models: [heavier] }
    const [change] = tellChanges(resolve(was, catalog), resolve(is, catalog))
    expect(change).toMatchObject({ group: 'models', mark: 'changed' })
    expect(change?.text).toMatch(/^Own model changed: .+ \(mass_g set to 700 \(maker\)\)\.$/)
  })

  it('mark what was added and removed in the state that has it', () => {
    const after = { ...base, joints: base.joints.slice(0, 2), parts: base.parts.filter(({ id }) => id !== 'C2') }
    expect(tell(after).map(({ group, mark, parts, joint }) => ({ group, mark, parts, joint }))).toEqual([
      { group: 'parts', mark: 'removed', parts: ['C2'], joint: undefined },
      { group: 'wiring', mark: 'removed', parts: [], joint: { before: base.joints[2]!.id, after: null } },
    ])
  })
})
