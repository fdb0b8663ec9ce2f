import { describe, expect, it } from 'vitest'
import { capacityCeiling } from '#shared/rules/capacity-ceiling/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** `count` drives on the breakouts of one controller. */
const direct = (count: number, hba: string, drive: string, breakout = 'breakout-sas'): Input => {
  const cables = Math.ceil(count / 4)
  return [
    {
      K1: hba,
      ...merged(times(cables, (i) => [`W${i}`, breakout] as const)),
      ...merged(times(count, (i) => [`C${i}`, drive] as const)),
    },
    [
      ...times(cables, (i) => `K1.port-${'abcd'[i - 1]} W${i}.host`),
      ...times(count, (i) => `W${Math.ceil(i / 4)}.leg-${((i - 1) % 4) + 1} C${i}.plug`),
    ],
  ]
}

describe('capacity-ceiling', () => {
  const check = (...input: Input) => findingsOf(capacityCeiling, documentOf(...input))

  it('takes drives up to what 32-bit block numbers reach: 2^32 x 512 bytes = 2.199 TB', () => {
    expect(check(...direct(2, 'hba-old', 'sas-2tb'))).toEqual([])
    const findings = check(...direct(2, 'hba-old', 'sas-4tb'))
    expect(gist(findings)).toEqual(['fault K1'])
    expect(findings[0]).toMatchObject({ load: 4, limit: 2.2, unit: 'TB' })
    expect(check(...direct(2, 'hba-8i', 'sas-8tb'))).toEqual([])
  })

  it('each controller is judged for itself', () => {
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'K2.port-a W2.host', 'W2.leg-1 C2.plug']
    const parts = { K1: 'hba-old', K2: 'hba-old', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-8tb' }
    expect(gist(check(parts, joints))).toEqual(['fault K1', 'fault K2'])
  })
})
