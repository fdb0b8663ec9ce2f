import { describe, expect, it } from 'vitest'
import { noDataPath } from '#shared/rules/no-data-path/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** A SAS controller with a SATA forward breakout: sound. */
const sound: Input = [{ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']]
const reversedAtController: Input = [
  { K1: 'hba-4i', W1: 'breakout-reverse', C1: 'sata-4tb', C2: 'sata-4tb' },
  ['K1.port-a W1.device', 'W1.leg-1 C1.plug', 'W1.leg-2 C2.plug'],
]

describe('no-data-path', () => {
  const check = (...input: Input) => findingsOf(noDataPath, documentOf(...input))

  it('is quiet where a controller reaches the drive, and leaves dark links to their own rules', () => {
    expect(check(...sound)).toEqual([])
    expect(check(...reversedAtController)).toEqual([])
  })

  it.each([
    ['nothing joined', { C1: 'sas-4tb' }, [], 'has no data connection yet'],
    ['power alone', { W1: 'lead', C1: 'sata-4tb' }, ['W1.out-1 C1.plug'], 'has no data connection yet'],
    ['a receptacle that does not fit', { W1: 'cable-sata', C1: 'sas-4tb' }, ['W1.a C1.plug'], 'does not mate'],
    ['a cable that ends in the air', { W1: 'cable-sata', C1: 'sata-4tb' }, ['W1.a C1.plug'], 'ends at W1 b'],
    [
      'an expander without a controller',
      { K1: 'expander-6', W1: 'breakout-sas', C1: 'sas-4tb' },
      ['K1.port-1 W1.host', 'W1.leg-1 C1.plug'],
      'no controller reaches that expander',
    ],
    [
      'another drive',
      { W1: 'cable-sata', C1: 'sata-4tb', C2: { model: 'sata-4tb', role: 'spare' as const } },
      ['W1.a C1.plug', 'W1.b C2.plug'],
      'leads to C2',
    ],
  ])('finds %s', (_, parts, joints, words) => {
    const findings = check(parts, joints)
    expect(findings[0]).toMatchObject({ severity: 'fault' })
    expect(findings[0]?.message).toContain(words)
  })

  it('says so for each drive', () => {
    expect(gist(check({ C1: 'sas-4tb', C2: 'sas-4tb' }))).toEqual(['fault C1', 'fault C2'])
  })

  it('only notes a spare on the shelf', () => {
    expect(gist(check({ C1: { model: 'sas-4tb', role: 'spare' } }))).toEqual(['note C1'])
  })
})
