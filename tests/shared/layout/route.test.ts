import { describe, expect, it } from 'vitest'
import { labelPoint, runPath, runStroke, runWidth, type RunCourse } from '#shared/layout/route.ts'

const course: RunCourse = { from: { x: 0, y: 0, side: 'right' }, to: { x: 100, y: 40, side: 'left' } }

describe('runPath', () => {
  it('leaves and arrives level', () => expect(runPath(course)).toBe('M0 0C50 0 50 40 100 40'))

  it('is straight where both ends are level', () =>
    expect(runPath({ ...course, to: { x: 100, y: 0, side: 'left' } })).toBe('M0 0H100'))

  it('passes a column in its lane', () =>
    expect(
      runPath({
        ...course,
        to: { x: 400, y: 40, side: 'left' },
        via: [
          { x: 100, y: 40 },
          { x: 300, y: 40 },
        ],
      }),
    ).toBe('M0 0C50 0 50 40 100 40H300H400'))

  it('turns where it is told to', () => expect(runPath({ ...course, bends: [70] })).toBe('M0 0C70 0 70 40 100 40'))

  it('goes round when its end lies behind it', () => {
    const [, x1, x2] = /C(\S+) 0 (\S+) 40/.exec(runPath({ ...course, to: { x: -100, y: 40, side: 'left' } })) ?? []
    expect(Number(x1)).toBeGreaterThan(0)
    expect(Number(x2)).toBeLessThan(-100)
  })
})

describe('labelPoint', () => {
  it('is the middle of a simple run', () => expect(labelPoint(course)).toEqual({ x: 50, y: 20 }))

  it('is on the last gap wide enough for a number', () => {
    const long: RunCourse = {
      from: { x: 0, y: 0, side: 'right' },
      to: { x: 440, y: 40, side: 'left' },
      via: [
        { x: 100, y: 40 },
        { x: 400, y: 40 },
      ],
    }
    expect(labelPoint(long)).toEqual({ x: 50, y: 20 })
    expect(labelPoint({ ...long, to: { x: 500, y: 40, side: 'left' } })).toEqual({ x: 450, y: 40 })
  })
})

describe('runWidth', () => {
  it('grows with current and stays within bounds', () => {
    expect([0, 2, 6, 100].map(runWidth)).toEqual([1.5, 2.5, 4.5, 9])
    expect(runWidth(-6)).toBe(4.5)
    expect([null, undefined, Number.NaN].map(runWidth)).toEqual([1.5, 1.5, 1.5])
  })
})

describe('runStroke', () => {
  it('thickens a caution and breaks a fault or danger, so that colour never speaks alone', () => {
    expect(runStroke(2, null)).toEqual({ width: 2 })
    expect(runStroke(2, 'note')).toEqual({ width: 2 })
    expect(runStroke(2, 'caution')).toEqual({ width: 4.5 })
    expect(runStroke(2, 'fault').dash).toBeDefined()
    expect(runStroke(2, 'danger').dash).toBeDefined()
  })
})
