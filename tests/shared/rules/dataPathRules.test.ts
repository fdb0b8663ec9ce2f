import { describe, expect, it } from 'vitest'
import { breakoutReversed } from '#shared/rules/breakout-reversed/index.ts'
import { doubledDataPath } from '#shared/rules/doubled-data-path/index.ts'
import { noDataPath } from '#shared/rules/no-data-path/index.ts'
import { protocolMismatch } from '#shared/rules/protocol-mismatch/index.ts'
import { tooManyDevices } from '#shared/rules/too-many-devices/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** A SAS controller with a SATA forward breakout: sound. */
const sound: Input = [{ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']]
const reversedAtController: Input = [
  { K1: 'hba-4i', W1: 'breakout-reverse', C1: 'sata-4tb', C2: 'sata-4tb' },
  ['K1.port-a W1.device', 'W1.leg-1 C1.plug', 'W1.leg-2 C2.plug'],
]
const forwardAtBoard: Input = [
  { K1: 'board', W1: 'breakout-sata', U1: 'backplane', C1: 'sata-4tb' },
  ['K1.sata-1 W1.leg-1', 'K1.sata-2 W1.leg-2', 'W1.host U1.data-1', 'U1.bay-1 C1.plug'],
]
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

describe('breakout-reversed', () => {
  const check = (input: Input) => findingsOf(breakoutReversed, documentOf(...input))

  it('is quiet on a forward breakout at a controller', () => expect(check(sound)).toEqual([]))

  it('finds a reverse breakout at a controller, once for all its drives', () => {
    const findings = check(reversedAtController)
    expect(gist(findings)).toEqual(['fault W1'])
    expect(findings[0]?.subjects.map((subject) => subject.ref)).toEqual(['W1', 'C1', 'C2', 'W1'])
    expect(findings[0]?.remedy).toContain('forward breakout')
  })

  it('finds a forward breakout between board ports and a backplane', () => {
    const findings = check(forwardAtBoard)
    expect(gist(findings)).toEqual(['fault W1'])
    expect(findings[0]?.remedy).toContain('reverse breakout')
  })

  it('finds it before any drive is there', () => {
    expect(gist(check([{ K1: 'hba-4i', W1: 'breakout-reverse' }, ['K1.port-a W1.device']]))).toEqual(['fault W1'])
  })
})

describe('protocol-mismatch', () => {
  const check = (...input: Input) => findingsOf(protocolMismatch, documentOf(...input))

  it('is quiet on SATA drives behind SAS', () => expect(check(...sound)).toEqual([]))

  it('names the controller and all its drives once', () => {
    const findings = check({ K1: 'sata-8i', W1: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' }, [
      'K1.port-a W1.host',
      'W1.leg-1 C1.plug',
      'W1.leg-2 C2.plug',
    ])
    expect(gist(findings)).toEqual(['fault K1'])
    expect(findings[0]?.message).toBe('K1 does not speak SAS, which C1 and C2 need.')
  })

  it('is quiet on a drive that has another way that works', () => {
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'K2.port-a W2.host', 'W2.leg-1 C1.plug']
    expect(
      check({ K1: 'sata-8i', K2: 'hba-4i', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb' }, joints),
    ).toEqual([])
  })

  it('two controllers give two findings', () => {
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'K2.port-a W2.host', 'W2.leg-1 C2.plug']
    expect(
      check(
        { K1: 'sata-8i', K2: 'sata-8i', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' },
        joints,
      ),
    ).toHaveLength(2)
  })
})

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
