import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { replaceDrive } from '#shared/build/edits/replaceDrive.ts'
import { invert } from '#shared/build/invert.ts'
import { resolve } from '#shared/build/resolve.ts'
import type { Model } from '#shared/catalog/model.ts'
import { compareLabels } from '#shared/paper/labels/label.ts'
import { labelsOf } from '#shared/paper/labels/spareLabels.ts'
import { replaceCard } from '#shared/paper/replace/replaceCard.ts'
import { replacePages } from '#shared/paper/replace/replacePages.ts'
import { tenDrives } from '../../layout/sampleBuilds.ts'
import { smallCatalog } from '../../layout/smallCatalog.ts'

const build = tenDrives()
const makeId = (prefix: string) => `${prefix}-new`
const replace = (id: string, incoming: { serial: string; model?: Model }) => replaceDrive(build, makeId, id, incoming)

describe('replacing a drive', () => {
  it('is one edit that changes the serial, keeps the wiring, and can be undone', () => {
    const made = replace('C3', { serial: ' NEW00042 ' })
    if (!made.ok) throw new Error(made.reason)
    const after = apply(build.document, made.edit.changes)
    expect(after.parts.find(({ id }) => id === 'C3')).toMatchObject({ ref: 'C3', serial: 'NEW00042', role: 'data' })
    expect(after.joints).toEqual(build.document.joints)
    expect(apply(after, invert(build.document, made.edit.changes))).toEqual(build.document)
  })

  it('offers the label of its tray, and only that', () => {
    const made = replace('C3', { serial: 'NEW00042' })
    if (!made.ok) throw new Error(made.reason)
    const after = resolve(apply(build.document, made.edit.changes), smallCatalog)
    expect(compareLabels(labelsOf(build), labelsOf(after)).changed.map(({ id }) => id)).toEqual(['tray:C3'])
  })

  it('takes off what the plug of another model does not take, and says so', () => {
    const drive = smallCatalog.models.get('drive')!
    const other: Model = {
      ...drive,
      id: 'other-drive',
      connectors: [{ id: 'host', label: 'host', type: 'host-plug' }],
    }
    const made = replace('C3', { serial: 'NEW00042', model: other })
    if (!made.ok) throw new Error(made.reason)
    const off = build.joints.filter(({ a, b }) => a.part.part.id === 'C3' || b.part.part.id === 'C3')
    expect(made.edit.changes.filter(({ op }) => op === 'removeJoint')).toHaveLength(off.length)
    expect(made.edit.label).toContain(`${off.length} joint`)
  })

  it.each([
    ['no serial', 'C3', ' ', /Write the serial/],
    ['the one that is in there', 'C3', build.partById.get('C3')!.part.serial!, /in there now/],
    ['one that sits elsewhere', 'C3', build.partById.get('C4')!.part.serial!, /is C4 already/],
    ['something that is no drive', 'W1', 'NEW00042', /no longer there/],
  ] as const)('refuses %s', (_, id, serial, reason) => {
    const made = replace(id, { serial })
    expect(made.ok ? '' : made.reason).toMatch(reason)
  })
})

describe('the card', () => {
  const card = replaceCard(build, null, 'C3')!

  it('names bay, serial tail, neighbours with theirs, and the way of power', () => {
    expect(card).toMatchObject({ ref: 'C3', bay: 'bay 3' })
    expect(card.serial.endsWith(card.tail.replace('…', ''))).toBe(true)
    expect(card.neighbours.length).toBeGreaterThan(0)
    for (const { ref, tail } of card.neighbours) {
      const there = build.parts.find(({ part }) => part.ref === ref)
      if (there) expect(there.part.serial?.endsWith(tail.replace('…', ''))).toBe(true)
    }
    expect(card.power).toContain('W1')
    expect(card.steps.join(' ')).toContain(`ends in ${card.tail.replace('…', '')}`)
  })

  it('fits one page, with the serial tail large and one bay black', () => {
    const { pages } = replacePages(card, 'RV-N-01', 'a4')
    expect(pages).toHaveLength(1)
    const marks = pages[0]!.marks
    expect(marks.filter((mark) => mark.kind === 'box' && mark.fill === '#000000')).toHaveLength(1)
    const tail = marks.find((mark) => mark.kind === 'text' && mark.text === card.tail)
    expect(tail?.kind === 'text' && tail.size_pt >= 20).toBe(true)
  })

  it('is not made for what is no drive', () => expect(replaceCard(build, null, 'W1')).toBeNull())
})
