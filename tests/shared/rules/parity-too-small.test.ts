import { describe, expect, it } from 'vitest'
import { parityTooSmall } from '#shared/rules/parity-too-small/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

describe('parity-too-small', () => {
  const as = (model: string, role: 'data' | 'parity' | 'cache') => ({ model, role })
  const check = (...input: Input) => findingsOf(parityTooSmall, documentOf(...input))

  it('takes one as large as the largest', () => {
    expect(check({ C1: as('sas-4tb', 'parity'), C2: as('sas-4tb', 'data'), C3: as('sas-2tb', 'data') })).toEqual([])
    expect(check({ C1: as('sas-2tb', 'parity') })).toEqual([])
    expect(check({ C1: as('sas-2tb', 'parity'), C2: as('sas-4tb', 'cache') })).toEqual([])
  })

  it('finds each that is smaller', () => {
    const findings = check({ C1: as('sas-2tb', 'parity'), C2: as('sas-4tb', 'parity'), C3: as('sas-8tb', 'data') })
    expect(gist(findings)).toEqual(['fault C1', 'fault C2'])
    expect(findings[0]).toMatchObject({ load: 8, limit: 2, unit: 'TB' })
  })
})
