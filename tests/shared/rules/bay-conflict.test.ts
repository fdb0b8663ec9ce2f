import { describe, expect, it } from 'vitest'
import { bayConflict } from '#shared/rules/bay-conflict/index.ts'
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
