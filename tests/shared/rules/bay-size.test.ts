import { describe, expect, it } from 'vitest'
import { baySize } from '#shared/rules/bay-size/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>
const at = (model: string, slot: number) => ({ model, bay: { case: 'A1', slot } })

describe('bay-size', () => {
  const check = (...input: Input) => gist(findingsOf(baySize, documentOf(...input)))

  it.each([
    ['a 3.5 in drive in its bay', 'sas-4tb', 1, []],
    ['a 2.5 in drive in a bay with a tray for it', 'ssd-25', 1, []],
    ['a 2.5 in drive in a bay without one', 'ssd-25', 5, ['caution C1']],
    ['a 2.5 in drive in its bay', 'ssd-25', 6, []],
    ['a 3.5 in drive in a 2.5 in bay', 'sas-4tb', 6, ['fault C1']],
  ])('%s', (_, model, slot, expected) => {
    expect(check({ A1: 'case', C1: at(model, slot) })).toEqual(expected)
  })

  it('judges every drive', () => {
    expect(check({ A1: 'case', C1: at('ssd-25', 5), C2: at('sas-4tb', 6) })).toEqual(['caution C1', 'fault C2'])
  })
})
