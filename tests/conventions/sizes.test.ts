import { describe, expect, it } from 'vitest'
import { filesBelow, readText } from '../helpers/tree.ts'

const ceiling = 400
const linesOf = (file: string) => readText(file).split('\n').length
const code = ['shared', 'server', 'src', 'tests'].flatMap(filesBelow).filter((file) => /\.(ts|mjs|vue|css)$/.test(file))

describe('one idea a file', () => {
  it('finds the code', () => expect(code.length).toBeGreaterThan(50))

  it(`no file has more than ${ceiling} lines`, () => {
    const long = code.filter((file) => linesOf(file) > ceiling).map((file) => `${file}: ${linesOf(file)}`)
    expect(long).toEqual([])
  })

  it('the usual file is short', () => {
    const lines = code.map(linesOf).sort((a, b) => a - b)
    expect(lines[Math.floor(lines.length / 2)]).toBeLessThan(120)
  })
})
