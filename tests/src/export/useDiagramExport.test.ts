import { describe, expect, it } from 'vitest'
import { isoDay, pictureName, reviewOf } from '../../../src/composables/useDiagramExport.ts'
import { pixelRatio, sizeOf } from '../../../src/diagram/picture/rasterise.ts'

describe('the name of a picture', () => {
  it('holds the build and its revision', () =>
    expect(pictureName('Reel vault, north room', '14', 'png')).toBe('reel-vault-north-room-revision-14.png'))

  it('says when edits are not saved yet', () =>
    expect(pictureName('Reel vault', '14 + edits', 'svg')).toBe('reel-vault-revision-14-edits.svg'))

  it('does without a revision before the first save', () =>
    expect(pictureName('Reel vault', '', 'svg')).toBe('reel-vault-wiring.svg'))
})

describe('what a picture says of the review', () => {
  const approval = {
    round: 2,
    revision: 12,
    by: [{ name: 'Noor Castellan', guest: false }],
    at: '2026-12-01T10:00:00.000Z',
    lapsedRevision: 15,
  }

  it('is nothing but that before anybody was asked', () =>
    expect(reviewOf(null, 3)).toEqual({ checked: 'not reviewed' }))

  it('is the approval of its revision, and that it lapsed once the plan moved on', () => {
    expect(reviewOf({ approval, open: null }, 16)).toEqual({
      checked: 'approval of revision 12 lapsed',
      approval: 'Approval lapsed at revision 15: approved at revision 12 by Noor Castellan',
    })
    expect(reviewOf({ approval, open: null }, 11)).toEqual({ checked: 'not reviewed' })
  })

  it('has no approval while edits wait to be saved', () =>
    expect(reviewOf({ approval, open: null }, NaN)).toEqual({ checked: 'not reviewed' }))
})

describe('the date on a picture', () => {
  it('is the day of the clock on the wall', () => expect(isoDay(new Date(2026, 11, 1, 0, 5))).toBe('2026-12-01'))
})

describe('the fineness of a picture', () => {
  it('is twice the sheet for an ordinary machine', () => expect(pixelRatio(2300, 1500)).toBe(2))

  it('falls so that a large machine stays within 24 million pixels', () => {
    const ratio = pixelRatio(2640, 5060)
    expect(2640 * 5060 * ratio ** 2).toBeCloseTo(24e6, 0)
  })

  it('never makes a side that browsers refuse', () =>
    expect(60_000 * pixelRatio(60_000, 100)).toBeLessThanOrEqual(16_000))
})

describe('the size of a drawing', () => {
  it('is read from the drawing itself', () =>
    expect(sizeOf('<svg xmlns="x" width="640" height="480" viewBox="0 0 640 480"></svg>')).toEqual({
      width: 640,
      height: 480,
    }))
})
