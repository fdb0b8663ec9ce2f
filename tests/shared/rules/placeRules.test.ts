import { describe, expect, it } from 'vitest'
import { bayConflict } from '#shared/rules/bay-conflict/index.ts'
import { baySize } from '#shared/rules/bay-size/index.ts'
import { identity } from '#shared/rules/identity/index.ts'
import { parityTooSmall } from '#shared/rules/parity-too-small/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>
const at = (model: string, slot: number) => ({ model, bay: { case: 'A1', slot } })

describe('bay-conflict', () => {
  const check = (...input: Input) => findingsOf(bayConflict, documentOf(...input))

  it('takes one drive a bay, also in two cases', () => {
    expect(check({ A1: 'case', C1: at('sas-4tb', 1), C2: at('sas-4tb', 2), C3: 'sas-4tb' })).toEqual([])
    expect(
      check({ A1: 'case', A2: 'case', C1: at('sas-4tb', 1), C2: { model: 'sas-4tb', bay: { case: 'A2', slot: 1 } } }),
    ).toEqual([])
  })

  it('finds bays with two drives, each once', () => {
    const findings = check({
      A1: 'case',
      C1: at('sas-4tb', 1),
      C2: at('sas-4tb', 1),
      C3: at('sas-4tb', 3),
      C4: at('sas-4tb', 3),
    })
    expect(findings).toHaveLength(2)
    expect(findings[0]?.message).toBe('C1 and C2 share bay 1 of A1.')
  })

  it('finds a drive that is plugged in at another bay than it sits in', () => {
    const parts = { A1: 'case', U1: at('backplane', 1), C1: at('sas-4tb', 2) }
    expect(check(parts, ['U1.bay-2 C1.plug'])).toEqual([])
    expect(check(parts, ['U1.bay-3 C1.plug'])[0]?.message).toContain(
      'C1 is in bay 2, but plugged into the receptacle of U1 that serves bay 3',
    )
  })

  it('finds two backplanes behind the same bays, once', () => {
    expect(gist(check({ A1: 'case', U1: at('backplane', 1), U2: at('backplane', 3) }))).toEqual(['fault U1'])
    expect(check({ A1: 'case', U1: at('backplane', 1), U2: at('backplane', 5) })).toEqual([])
  })
})

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
    expect(check({ C1: 'sas-4tb' })[0]?.message).toBe('None of the 1 drive has a serial on the plan.')
  })
})
