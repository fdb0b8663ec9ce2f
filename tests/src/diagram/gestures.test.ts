import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { bayAt, endOfDrag } from '../../../src/diagram/gestures.ts'
import { neighbourOf } from '../../../src/diagram/neighbours.ts'
import { buildOf, countingIds, looseParts } from '../../shared/build/edits/smallShop.ts'

const build = buildOf(looseParts)
const drawing = arrange(build)
const node = (id: string) => {
  const found = drawing.nodes.find((one) => one.id === id)
  if (!found) throw new Error(`no node ${id}`)
  return found
}
const drop = (id: string, by: { x: number; y: number }) =>
  endOfDrag(build, drawing, countingIds(), new Map([[id, { x: node(id).x + by.x, y: node(id).y + by.y }]]))

describe('the end of a drag', () => {
  it('moves a tag to the grid', () => {
    const made = drop('w', { x: 33, y: 9 })
    if (!made.ok) throw new Error(made.reason)
    const { position } = apply(build.document, made.edit.changes).parts.find((part) => part.id === 'w') ?? {}
    expect([(position?.x ?? 1) % 4, (position?.y ?? 1) % 4].map(Math.abs)).toEqual([0, 0])
  })

  it('puts a drive into the bay beneath it', () => {
    const made = drop('c1', { x: 6, y: node('a#5').y - node('c1').y })
    expect(made.ok && made.edit.label).toBe('Move C1 to bay 5')
  })

  it('swaps with the drive beneath', () => {
    const made = drop('c1', { x: 0, y: node('c3').y - node('c1').y + 3 })
    expect(made.ok && made.edit.label).toBe('Swap C1 and C3')
  })

  it('snaps back when dropped beside the strip, and takes it out when dropped far away', () => {
    expect(drop('c1', { x: 120, y: -400 }).ok).toBe(false)
    const made = drop('c1', { x: 900, y: 0 })
    expect(made.ok && made.edit.label).toBe('Take C1 out of bay 1')
  })

  it('finds the bay under a point of the sheet', () => {
    const bay = node('a#6')
    expect(bayAt(drawing, build, { x: bay.x + 5, y: bay.y + 5 })).toEqual({ case: 'a', slot: 6 })
    expect(bayAt(drawing, build, { x: -5000, y: 0 })).toBeUndefined()
  })
})

describe('arrow keys', () => {
  it('walk down the rows and out to both looms', () => {
    expect(neighbourOf(drawing.nodes, node('c1'), 'down')?.id).toBe('c2')
    expect(neighbourOf(drawing.nodes, node('c2'), 'up')?.id).toBe('c1')
    const left = neighbourOf(drawing.nodes, node('c1'), 'left')
    expect(left && left.x < node('c1').x).toBe(true)
  })

  it('begin at the first row', () => {
    expect(neighbourOf(drawing.nodes, undefined, 'right')?.id).toBe('c1')
  })
})
