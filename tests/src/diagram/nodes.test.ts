import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { PartPatch } from '#shared/build/changes.ts'
import { resolve } from '#shared/build/resolve.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { looksAlike } from '../../../src/diagram/looksAlike.ts'
import { toCanvasNodes } from '../../../src/diagram/nodes.ts'
import { buildOf, looseParts, smallCatalog } from '../../shared/build/edits/smallShop.ts'

const build = buildOf(looseParts)

describe('the canvas as a projection', () => {
  it('has a node for everything drawn, rows inside the frame of their case', () => {
    const drawing = arrange(build)
    const nodes = toCanvasNodes(drawing, build, true)
    expect(nodes.map((node) => node.id).sort()).toEqual(drawing.nodes.map((node) => node.id).sort())
    const row = nodes.find((node) => node.id === 'c1')
    expect(row?.parentNode).toBe('a')
    const drawn = drawing.nodes.find((node) => node.id === 'c1')
    const frame = drawing.nodes.find((node) => node.id === 'a')
    expect(row?.position.y).toBe((drawn?.y ?? 0) - (frame?.y ?? 0))
  })

  it('keeps the object of what did not change', () => {
    const before = new Map(toCanvasNodes(arrange(build), build, true).map((node) => [node.id, node]))
    const document = apply(build.document, [{ op: 'updatePart', id: 'c1', patch: { serial: 'NEW' } }])
    const next = resolve(document, smallCatalog)
    const after = toCanvasNodes(arrange(next), next, true, before)
    const changed = after.filter((node) => before.get(node.id) !== node).map((node) => node.id)
    expect(changed).toEqual(['c1'])
  })

  it('lets nothing be dragged where nothing may be changed', () => {
    expect(toCanvasNodes(arrange(build), build, false).some((node) => node.draggable)).toBe(false)
    const movable = toCanvasNodes(arrange(build), build, true).filter((node) => node.draggable)
    expect(new Set(movable.map((node) => node.type))).toEqual(new Set(['part', 'drive-row', 'case']))
  })
})

describe('looksAlike', () => {
  const { document } = build
  const change = (patch: PartPatch) => apply(document, [{ op: 'updatePart', id: 'c1', patch }])

  it('passes over what the picture does not depend on', () => {
    expect(looksAlike(document, change({ serial: 'NEW', role: 'spare', note: 'x' }))).toBe(true)
  })

  it.each<PartPatch>([
    { position: { x: 4, y: 8 } },
    { bay: { case: 'a', slot: 6 } },
    { bay: null },
    { model: 'disk-25' },
  ])('sees %j', (patch) => {
    expect(looksAlike(document, change(patch))).toBe(false)
  })

  it('gives the same drawing where it says so', () => {
    const next = resolve(change({ serial: 'NEW' }), smallCatalog)
    expect(arrange(next)).toEqual(arrange(build))
  })
})
