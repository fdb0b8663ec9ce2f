import { describe, expect, it } from 'vitest'
import { linkTooLong } from '#shared/rules/link-too-long/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { figure } from '../../helpers/fixtures/models.ts'
import { findingsOf } from '../../helpers/findingsOf.ts'

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

/** `count` drives behind one expander, linked by one cable. */
const expanded = (count: number, drive: string, cable = 'cable-8087'): Input => {
  const cables = Math.ceil(count / 4)
  return [
    {
      K1: 'hba-8i',
      K2: 'expander-6',
      W99: cable,
      ...merged(times(cables, (i) => [`W${i}`, 'breakout-sas'] as const)),
      ...merged(times(count, (i) => [`C${i}`, drive] as const)),
    },
    [
      'K1.port-a W99.a',
      'W99.b K2.port-1',
      ...times(cables, (i) => `K2.port-${i + 1} W${i}.host`),
      ...times(count, (i) => `W${Math.ceil(i / 4)}.leg-${((i - 1) % 4) + 1} C${i}.plug`),
    ],
  ]
}

describe('link-too-long', () => {
  const check = (input: Input) => findingsOf(linkTooLong, documentOf(...input))

  it('a SATA link may be 1 m, not more (a drive maker’s support article)', () => {
    expect(check(direct(1, 'hba-4i', 'sata-4tb', 'breakout-sata-1m'))).toEqual([])
    expect(check(direct(1, 'hba-4i', 'sata-4tb', 'breakout-sata-long'))[0]).toMatchObject({
      severity: 'fault',
      load: 1001,
      limit: 1000,
      unit: 'mm',
    })
  })

  it('says it once for all drives of one cable, and once a cable', () => {
    expect(check(direct(4, 'hba-4i', 'sata-4tb', 'breakout-sata-long'))).toHaveLength(1)
    expect(check(direct(8, 'hba-8i', 'sata-4tb', 'breakout-sata-long'))).toHaveLength(2)
  })

  it('adds up the cables of one link, and starts anew at an expander', () => {
    const parts = { K1: 'hba-4i', U1: 'backplane', W1: 'cable-8087-long', C1: 'sas-4tb' }
    const long = check([parts, ['K1.port-a W1.a', 'W1.b U1.data-1', 'U1.bay-1 C1.plug']])
    expect(long[0]).toMatchObject({ severity: 'caution', load: 1200, limit: 1000 })
    // Two cables of 0.5 m with an expander between: each link is short.
    expect(check(expanded(4, 'sata-4tb'))).toEqual([])
  })

  it('external SAS goes further', () => {
    const parts = {
      K1: 'hba-4i',
      W1: 'cable-8087',
      W2: 'bracket',
      W3: 'cable-8088-6m',
      W4: 'bracket',
      W5: 'cable-8087',
      U1: 'backplane',
      C1: 'sas-4tb',
    }
    const joints = [
      'K1.port-a W1.a',
      'W2.a W1.b',
      'W2.b W3.a',
      'W3.b W4.b',
      'W4.a W5.a',
      'W5.b U1.data-1',
      'U1.bay-1 C1.plug',
    ]
    expect(check([parts, joints])).toEqual([])
    // The same cables before a SATA drive are far too long.
    expect(check([{ ...parts, C1: 'sata-4tb' }, joints])[0]).toMatchObject({
      severity: 'fault',
      load: 7000,
      limit: 2000,
    })
  })

  it('does not guess a length that nobody knows', () => {
    const [parts, joints] = direct(1, 'hba-4i', 'sata-4tb', 'breakout-sata')
    const unknown = { ...parts, W1: { model: 'breakout-sata', overrides: { 'cable.length_mm': figure(null) } } }
    expect(check([unknown, joints])).toEqual([])
  })
})
