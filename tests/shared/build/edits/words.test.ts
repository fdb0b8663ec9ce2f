import { describe, expect, it } from 'vitest'
import { bayRange, connectorName, listOf, numberRanges, refList } from '#shared/build/edits/words.ts'
import { buildOf, looseParts } from './smallShop.ts'

describe('words of labels', () => {
  it.each([
    [[], ''],
    [[4], '4'],
    [[4, 5], '4 and 5'],
    [[7, 5, 6], '5 to 7'],
    [[1, 2, 3, 7, 9], '1 to 3, 7 and 9'],
    [[2, 2, 2], '2'],
  ])('says %j as "%s"', (numbers, words) => {
    expect(numberRanges(numbers)).toBe(words)
  })

  it('says bays in the singular and plural', () => {
    expect(bayRange([4])).toBe('bay 4')
    expect(bayRange([5, 6, 7, 8])).toBe('bays 5 to 8')
  })

  it('shortens long lists and keeps short ones', () => {
    expect(listOf(['W1', 'W2', 'W3'])).toBe('W1, W2 and W3')
    expect(refList(['C1', 'C2', 'C3', 'C4', 'C5', 'C6'])).toBe('C1, C2, C3 and 3 more')
  })

  it('names connectors as they are written on tape', () => {
    const build = buildOf(looseParts)
    const name = (part: string, connector: string) => {
      const found = build.partById.get(part)?.connectorById.get(connector)
      return found && connectorName(found)
    }
    expect(name('w', 'out-3')).toBe('W1.3')
    expect(name('b', 'leg-2')).toBe('W2 leg 2')
    expect(name('c1', 'plug')).toBe('C1')
  })
})
