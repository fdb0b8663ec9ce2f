import { describe, expect, it } from 'vitest'
import { identity } from '#shared/rules/identity/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

describe('identity', () => {
  const named = (serial: string) => ({ model: 'sas-4tb', serial })
  const check = (...input: Input) => findingsOf(identity, documentOf(...input))

  it('takes drives with serials of their own', () => {
    expect(check({ C1: named('RV001'), C2: named('RV002') })).toEqual([])
    expect(check({ K1: 'hba-8i' })).toEqual([])
  })

  it('finds one serial twice, however it is written', () => {
    const findings = check({ C1: named('RV001'), C2: named(' rv001 '), C3: named('RV002') })
    expect(gist(findings)).toEqual(['fault C1'])
    expect(findings[0]?.message).toBe('C1 and C2 carry the same serial, RV001.')
  })

  it('lists the missing ones in one note', () => {
    const findings = check({ C1: named('RV001'), C2: 'sas-4tb', C3: named('  ') })
    expect(gist(findings)).toEqual(['note build'])
    expect(findings[0]?.message).toBe('C2 and C3 have no serial on the plan.')
    expect(check({ C1: 'sas-4tb' })[0]?.message).toBe('C1 has no serial on the plan.')
  })
})
