import { describe, expect, it } from 'vitest'
import { advances, marks } from '#shared/paper/text/notoSans.ts'
import { fitText, textWidth, wrapText } from '#shared/paper/text/textWidth.ts'

describe('textWidth', () => {
  it('has one width for each of 191 characters and the marks', () => {
    for (const table of Object.values(advances)) expect(table).toHaveLength(95 + 96 + marks.length)
  })

  it('gives every digit the same width', () =>
    expect(new Set([...'0123456789'].map((digit) => textWidth(digit, 10))).size).toBe(1))

  it('adds characters up', () => expect(textWidth('11', 1000)).toBe(1144))

  it('finds Latin letters beyond ASCII, marks and unknown ones', () => {
    expect(textWidth('ä', 1000)).toBe(textWidth('a', 1000))
    expect(textWidth('…', 1000)).toBeGreaterThan(0)
    expect(textWidth('漢', 1000)).toBe(1000)
  })
})

describe('fitText', () => {
  it('leaves what fits', () => expect(fitText('W6', 100, 12)).toBe('W6'))

  it('cuts what does not, and stays within the width', () => {
    const cut = fitText('Breakout, SFF-8087 to 4 x SFF-8482', 100, 12)
    expect(cut).toMatch(/^Breakout.*…$/)
    expect(textWidth(cut, 12)).toBeLessThanOrEqual(100)
  })
})

describe('wrapText', () => {
  it('breaks at spaces', () =>
    expect(wrapText('one two three', textWidth('one two', 10), 10)).toEqual(['one two', 'three']))

  it('ends in an ellipsis where lines run out', () => {
    const lines = wrapText('one two three four five', textWidth('one two', 10), 10, 400, 2)
    expect(lines).toHaveLength(2)
    expect(lines[1]).toMatch(/…$/)
  })

  it('makes no line of nothing', () => expect(wrapText('  ', 100, 10)).toEqual([]))
})
