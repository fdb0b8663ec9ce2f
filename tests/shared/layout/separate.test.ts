import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { separate } from '#shared/layout/separate.ts'

const ten = () => 10

describe('separate', () => {
  it('leaves alone what does not clash', () =>
    expect(
      separate(
        [
          { wish: 0, height: 20, weight: 1 },
          { wish: 50, height: 20, weight: 1 },
        ],
        ten,
      ),
    ).toEqual([0, 50]))

  it('parts two equal wishes by equal ways', () =>
    expect(
      separate(
        [
          { wish: 0, height: 20, weight: 1 },
          { wish: 0, height: 20, weight: 1 },
        ],
        ten,
      ),
    ).toEqual([-15, 15]))

  it('moves the lighter one further', () =>
    expect(
      separate(
        [
          { wish: 0, height: 20, weight: 2 },
          { wish: 0, height: 20, weight: 1 },
        ],
        ten,
      ),
    ).toEqual([-10, 20]))

  it('gives nothing for nothing', () => expect(separate([], ten)).toEqual([]))

  const items = fc.array(
    fc.record({
      wish: fc.integer({ min: -500, max: 500 }),
      height: fc.integer({ min: 0, max: 100 }),
      weight: fc.integer({ min: 1, max: 9 }),
    }),
    { maxLength: 8 },
  )

  it('keeps every gap', () => {
    fc.assert(
      fc.property(items, (column) => {
        const tops = separate(column, ten)
        for (let i = 1; i < column.length; i++)
          expect(tops[i]! - tops[i - 1]! - column[i - 1]!.height).toBeGreaterThanOrEqual(10 - 1e-9)
      }),
    )
  })

  it('cannot be bettered by moving any stretch of the column up or down', () => {
    fc.assert(
      fc.property(items, fc.nat(7), fc.nat(7), fc.constantFrom(-0.5, 0.5), (column, a, b, way) => {
        const tops = separate(column, ten)
        const cost = (places: readonly number[]) =>
          places.reduce((sum, top, i) => sum + column[i]!.weight * (top - column[i]!.wish) ** 2, 0)
        const nudged = tops.map((top, i) => (i >= Math.min(a, b) && i <= Math.max(a, b) ? top + way : top))
        const stillParted = nudged.every(
          (top, i) => i === 0 || top - nudged[i - 1]! - column[i - 1]!.height >= 10 - 1e-9,
        )
        if (stillParted) expect(cost(nudged)).toBeGreaterThanOrEqual(cost(tops) - 1e-6)
      }),
    )
  })
})
