import { describe, expect, it } from 'vitest'
import { sectorFormat } from '#shared/rules/sector-format/index.ts'
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

describe('sector-format', () => {
  const check = (...input: Input) => findingsOf(sectorFormat, documentOf(...input))

  it('takes 512 and 4096 bytes', () => {
    expect(check(...direct(1, 'hba-8i', 'sas-4tb'))).toEqual([])
    expect(check(...direct(1, 'hba-8i', 'sas-4kn'))).toEqual([])
  })

  it('finds 520 bytes, once for all drives', () => {
    const findings = check(...direct(3, 'hba-8i', 'sas-520'))
    expect(gist(findings)).toEqual(['fault C1'])
    expect(findings[0]?.message).toContain('C1 to C3 have sectors of 520 bytes')
  })

  it('finds sectors that the controller does not hand on', () => {
    expect(check(...direct(1, 'hba-old', 'sas-4kn'))[0]?.message).toContain('which K1 does not hand on')
  })

  it('cautions where 512 bytes carry protection information', () => {
    expect(gist(check(...direct(1, 'hba-8i', 'sas-protected')))).toEqual(['caution C1'])
  })
})
