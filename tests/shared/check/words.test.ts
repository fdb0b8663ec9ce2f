import { describe, expect, it } from 'vitest'
import { compareRefs, rankRefs } from '#shared/build/refOrder.ts'
import { amount, counted, length, listed, refsOf } from '#shared/check/words.ts'
import { buildOf } from '../../helpers/fixtures/build.ts'

describe('numbers in words', () => {
  it.each([
    [8, 'A', '8.0 A'],
    [4.749, 'V', '4.75 V'],
    [2.2, 'TB', '2.2 TB'],
    [12, 'TB', '12 TB'],
    [1200, 'MB/s', '1,200 MB/s'],
    [1234567, 'MB/s', '1,234,567 MB/s'],
    [6, 'Gb/s', '6 Gb/s'],
    [22.5, 'Gb/s', '22.5 Gb/s'],
    [178.4, '%', '178 %'],
    [0, 'A', '0.0 A'],
  ] as const)('%s %s is "%s"', (value, unit, expected) => expect(amount(value, unit)).toBe(expected))

  it('lengths change to metres', () => {
    expect([450, 999, 1000, 1250, 10_000].map(length)).toEqual(['450 mm', '999 mm', '1 m', '1.25 m', '10 m'])
  })

  it('counts', () => expect([counted(1, 'drive'), counted(4, 'drive')]).toEqual(['1 drive', '4 drives']))
})

describe('lists in words', () => {
  it('joins with "and" and cuts long ones', () => {
    expect(listed([])).toBe('')
    expect(listed(['a'])).toBe('a')
    expect(listed(['a', 'b', 'c'])).toBe('a, b and c')
    expect(listed(['a', 'b', 'c', 'd'], 2)).toBe('a, b and 2 more')
  })

  it('draws runs of designations together', () => {
    const parts = (refs: string[]) => buildOf(Object.fromEntries(refs.map((ref) => [ref, 'sas-4tb']))).parts
    expect(refsOf(parts(['C10', 'C2', 'C1', 'C3']))).toBe('C1 to C3 and C10')
    expect(refsOf(parts(['C1', 'C2']))).toBe('C1 and C2')
    expect(refsOf(parts(['W9', 'W10', 'W11', 'C1']))).toBe('C1 and W9 to W11')
  })

  it('orders designations as people count', () => {
    expect(['W10', 'W2', 'C3', 'CA1'].sort(compareRefs)).toEqual(['C3', 'CA1', 'W2', 'W10'])
    expect([...rankRefs(['W10', 'W2', 'C3'])]).toEqual([2, 1, 0])
  })
})
