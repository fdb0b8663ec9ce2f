import { describe, expect, it } from 'vitest'
import { tooManyDevices } from '#shared/rules/too-many-devices/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

describe('too-many-devices', () => {
  const many = (hba: string, count: number): Input => [
    { K1: hba, W1: 'breakout-sas', ...merged(times(count, (i) => [`C${i}`, 'sas-4tb'] as const)) },
    ['K1.port-a W1.host', ...times(count, (i) => `W1.leg-${i} C${i}.plug`)],
  ]
  const check = (input: Input) => findingsOf(tooManyDevices, documentOf(...input))

  it('takes as many as the controller addresses, and no more', () => {
    expect(check(many('hba-small', 3))).toEqual([])
    expect(check(many('hba-small', 4))[0]).toMatchObject({ severity: 'fault', load: 4, limit: 3 })
    expect(check(many('hba-8i', 4))).toEqual([])
  })

  it('counts the drives behind an expander against both', () => {
    const parts = {
      K1: 'hba-small',
      K2: 'expander-few',
      W9: 'cable-8087',
      W1: 'breakout-sas',
      ...merged(times(4, (i) => [`C${i}`, 'sas-4tb'] as const)),
    }
    const joints = [
      'K1.port-a W9.a',
      'W9.b K2.port-1',
      'K2.port-2 W1.host',
      ...times(4, (i) => `W1.leg-${i} C${i}.plug`),
    ]
    expect(gist(check([parts, joints])).sort()).toEqual(['fault K1', 'fault K2'])
  })
})
