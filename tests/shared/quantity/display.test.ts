import { describe, expect, it } from 'vitest'
import {
  formatFigure,
  formatNumber,
  formatRange,
  formatWire,
  isAbout,
  millimetresPerInch,
  scaleQuantity,
} from '#shared/quantity/display.ts'

const plain = (text: string | undefined): string | undefined => text?.replace(/\u00a0/g, ' ')

describe('a number', () => {
  it('shows no more digits than a datasheet holds', () => {
    expect(formatNumber(1.85, 'en')).toBe('1.85')
    expect(formatNumber(0.123456, 'en')).toBe('0.1235')
    expect(formatNumber(17.7165, 'en')).toBe('17.72')
    expect(formatNumber(0, 'en')).toBe('0')
    expect(formatNumber(1234.56, 'en')).toBe('1,235')
  })

  it('is written as the reader writes it', () => expect(formatNumber(1.85, 'de')).toBe('1,85'))

  it('keeps its unit on the line', () => {
    expect(formatFigure(2, 'A', 'en')).toBe('2\u00a0A')
    expect(formatFigure(0.9, '', 'en')).toBe('0.9')
  })
})

describe('a range', () => {
  const range = (low?: number, high?: number) => plain(formatRange({ value: 2, low, high, origin: 'maker' }, 'A', 'en'))
  it('tells both ends, or the one that is stated', () => {
    expect(range(1.7, 2.2)).toBe('1.7 to 2.2 A')
    expect(range(undefined, 2.2)).toBe('up to 2.2 A')
    expect(range(1.7)).toBe('from 1.7 A')
  })
  it('is nothing where none is stated, or where it is one value', () => {
    expect(range()).toBeUndefined()
    expect(range(2, 2)).toBeUndefined()
  })
})

describe('"about"', () => {
  it('stands before guesses, class defaults and figures from memory only', () => {
    expect(isAbout({ value: 1, origin: 'guess' })).toBe(true)
    expect(isAbout({ value: 1, origin: 'class default' })).toBe(true)
    expect(isAbout({ value: 1, origin: 'maker', fromMemory: true })).toBe(true)
    for (const origin of ['standard', 'maker', 'measured', 'common practice'] as const)
      expect(isAbout({ value: 1, origin })).toBe(false)
  })
})

describe('another unit', () => {
  it('turns value and range and keeps the origin', () => {
    const length = { value: 457.2, low: 254, high: 508, origin: 'measured', by: 'Irma' } as const
    expect(scaleQuantity(length, 1 / millimetresPerInch)).toEqual({ ...length, value: 18, low: 10, high: 20 })
  })
  it('keeps unknown unknown', () =>
    expect(scaleQuantity({ value: null, origin: 'guess' }, 2)).toEqual({ value: null, origin: 'guess' }))
})

describe('a wire', () => {
  // American wire gauge 18 is 0.823 mm2 (ASTM B258).
  it('is told both ways, the preferred one first', () => {
    expect(plain(formatWire({ awg: 18 }, 'awg', 'en'))).toBe('18 AWG (0.823 mm²)')
    expect(plain(formatWire({ awg: 18 }, 'mm2', 'en'))).toBe('0.823 mm² (18 AWG)')
  })
  it('given by area has no exact gauge', () =>
    expect(plain(formatWire({ area_mm2: 1 }, 'mm2', 'en'))).toBe('1 mm² (about 18 AWG)'))
  it('of unknown size is no wire to show', () => {
    expect(formatWire({ area_mm2: null }, 'awg')).toBeUndefined()
    expect(formatWire({}, 'awg')).toBeUndefined()
  })
})
