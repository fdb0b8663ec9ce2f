import { describe, expect, it } from 'vitest'
import { wrongMating } from '#shared/rules/wrong-mating/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

const check = (...input: Parameters<typeof documentOf>) => findingsOf(wrongMating, documentOf(...input))

describe('wrong-mating', () => {
  it.each([
    ['nothing joined', { C1: 'sas-4tb' }, []],
    [
      'a SATA drive on a data and a power receptacle at once',
      { W1: 'cable-sata', W2: 'lead', C1: 'sata-4tb' },
      ['W1.a C1.plug', 'W2.out-1 C1.plug'],
    ],
    ['a SATA drive in a SAS receptacle', { W1: 'breakout-sas', C1: 'sata-4tb' }, ['W1.leg-1 C1.plug']],
    ['a card in a slot', { K1: 'hba-8i', K2: 'board' }, ['K1.edge K2.slot-1']],
  ])('takes %s', (_, parts, joints) => {
    expect(check(parts, joints)).toEqual([])
  })

  it('a SAS drive does not go into SATA receptacles', () => {
    const findings = check({ W1: 'cable-sata', C1: 'sas-4tb' }, ['W1.a C1.plug'])
    expect(gist(findings)).toEqual(['fault C1'])
    expect(findings[0]?.message).toContain('do not mate')
  })

  it('finds each wrong joint of a build', () => {
    const joints = ['W1.a C1.plug', 'W1.b K1.port-a']
    expect(check({ W1: 'cable-sata', C1: 'sas-4tb', K1: 'hba-4i' }, joints)).toHaveLength(2)
  })

  it('a connector takes one partner for data and one for power', () => {
    const parts = { W1: 'cable-sata', W2: 'cable-sata', C1: 'sata-4tb' }
    const findings = check(parts, ['W1.a C1.plug', 'W2.a C1.plug'])
    expect(gist(findings)).toEqual(['fault C1.plug'])
    expect(findings[0]?.message).toContain('W1 a and W2 a')
    expect(gist(check({ W1: 'lead', W2: 'lead', C1: 'sata-4tb' }, ['W1.out-1 C1.plug', 'W2.out-1 C1.plug']))).toEqual([
      'fault C1.plug',
    ])
  })

  it('a part does not join to itself', () => {
    expect(check({ W1: 'lead' }, ['W1.out-1 W1.out-2'])[0]?.message).toContain('two ends of the same part')
  })

  it('one joint drawn twice is one too many', () => {
    const found = check({ K1: 'hba-4i', W1: 'cable-8087' }, ['K1.port-a W1.a', 'W1.a K1.port-a'])
    expect(found.map(({ message }) => message)).toEqual(['K1 port a and W1 a are joined 2 times over.'])
  })
})
