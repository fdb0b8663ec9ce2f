import { describe, expect, it } from 'vitest'
import { doubledDataPath } from '#shared/rules/doubled-data-path/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** A SAS controller with a SATA forward breakout: sound. */
const sound: Input = [{ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']]
const behindExpander = (drive: string, hbas: number): Input => [
  {
    ...merged(times(hbas, (i) => [`K${i}`, 'hba-4i'] as const)),
    ...merged(times(hbas, (i) => [`W${i}`, 'cable-8087'] as const)),
    K9: 'expander-6',
    W9: 'breakout-sas',
    C1: drive,
  },
  [
    ...times(hbas, (i) => `K${i}.port-a W${i}.a`),
    ...times(hbas, (i) => `W${i}.b K9.port-${i}`),
    'K9.port-6 W9.host',
    'W9.leg-1 C1.plug',
  ],
]

describe('doubled-data-path', () => {
  const check = (...input: Input) => findingsOf(doubledDataPath, documentOf(...input))

  it('is quiet on one path, and on a SAS drive with each port at its own controller lane', () => {
    expect(check(...sound)).toEqual([])
    expect(
      check({ K1: 'hba-4i', W1: 'cable-8087', U1: 'backplane-dual', C1: 'sas-4tb' }, [
        'K1.port-a W1.a',
        'W1.b U1.data-1',
        'U1.bay-1 C1.plug',
      ]),
    ).toEqual([])
  })

  it('finds a SATA drive that two controllers reach through an expander', () => {
    expect(check(...behindExpander('sata-4tb', 1))).toEqual([])
    expect(gist(check(...behindExpander('sata-4tb', 2)))).toEqual(['fault C1'])
  })

  it('only notes a SAS drive that two controllers share', () => {
    expect(gist(check(...behindExpander('sas-4tb', 2)))).toEqual(['note C1'])
  })

  it('finds two plugs on one drive port', () => {
    const joints = ['K1.sata-1 W1.a', 'W1.b C1.plug', 'K1.sata-2 W2.a', 'W2.b C1.plug']
    expect(gist(check({ K1: 'board', W1: 'cable-sata', W2: 'cable-sata', C1: 'sata-4tb' }, joints))).toEqual([
      'fault C1',
    ])
  })

  it('finds a ring of expanders', () => {
    const parts = {
      K1: 'hba-8i',
      K2: 'expander-6',
      K3: 'expander-6',
      W1: 'cable-8087',
      W2: 'cable-8087',
      W3: 'cable-8087',
    }
    const joints = [
      'K1.port-a W1.a',
      'W1.b K2.port-1',
      'K1.port-b W2.a',
      'W2.b K3.port-1',
      'K2.port-2 W3.a',
      'W3.b K3.port-2',
    ]
    expect(check(parts, joints.slice(0, 4))).toEqual([])
    const findings = check(parts, joints)
    expect(findings.map((finding) => finding.message).join()).toContain('form a ring')
  })
})
