import { expect, it } from 'vitest'
import { quantitySchema } from '#shared/quantity/quantity.ts'

const reads = (value: number): boolean => quantitySchema.safeParse({ value, origin: 'guess' }).success

it('a figure is zero, or at least a billionth: a share of less is no number', () => {
  expect([0, 1e-9, 1, 1e9].map(reads)).toEqual([true, true, true, true])
  expect([1e-10, 5e-324, -1, 2e9].map(reads)).toEqual([false, false, false, false])
  expect(quantitySchema.safeParse({ value: null, low: 1e-12, high: 1, origin: 'guess' }).success).toBe(false)
})
