import { describe, expect, it } from 'vitest'
import { capacityCeiling } from '#shared/rules/capacity-ceiling/index.ts'
import { controllerMode } from '#shared/rules/controller-mode/index.ts'
import { linkTooLong } from '#shared/rules/link-too-long/index.ts'
import { narrowSlot } from '#shared/rules/narrow-slot/index.ts'
import { sectorFormat } from '#shared/rules/sector-format/index.ts'
import { sharedUplink } from '#shared/rules/shared-uplink/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { figure } from '../../helpers/fixtures/models.ts'
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

describe('narrow-slot', () => {
  const check = (input: Input) => findingsOf(narrowSlot, documentOf(...input))
  const seated = (count: number, board: string): Input => {
    const [parts, joints = []] = direct(count, 'hba-8i', 'sas-4tb')
    return [{ ...parts, K2: board }, [...joints, 'K1.edge K2.slot-1']]
  }

  it('is quiet in a slot as wide and as new as the card', () => expect(check(seated(8, 'board'))).toEqual([]))

  it('notes a narrow slot that still serves its drives', () => {
    // 8 drives at 180 MB/s outside want 1,440 of the 2,000 MB/s.
    const findings = check(seated(8, 'board-narrow'))
    expect(gist(findings)).toEqual(['note K1'])
    expect(findings[0]?.message).toContain('2,000 MB/s of the 7,877 MB/s')
  })

  it('cautions where a scan takes longer for it', () => {
    const [parts, joints = []] = expanded(20, 'sas-4tb')
    const findings = check([{ ...parts, K3: 'board-narrow' }, [...joints, 'K1.edge K3.slot-1']])
    // 20 drives share 2,000 MB/s: 100 each against 180 outside and 90 inside.
    expect(gist(findings)).toEqual(['caution K1'])
    expect(findings[0]?.load).toBeGreaterThan(findings[0]!.limit! * 1.1)
  })

  it('notes a card that sits in no slot', () => {
    expect(check(direct(1, 'hba-8i', 'sas-4tb'))[0]?.message).toContain('sits in no slot')
    expect(check([{ K1: 'hba-8i' }, []])).toEqual([])
  })
})

describe('shared-uplink', () => {
  const check = (input: Input) => findingsOf(sharedUplink, documentOf(...input))

  it('is quiet where the link gives each drive what it can read', () => {
    // 13 x 180 MB/s = 2,340 of 2,400 MB/s.
    expect(check(expanded(13, 'sas-4tb'))).toEqual([])
  })

  it('is quiet about less than one in a hundred of the time, notes more, cautions from one in ten', () => {
    // 14 drives: 171 MB/s each against 180 at the outer track only: under 1 %.
    expect(check(expanded(14, 'sas-4tb'))).toEqual([])
    // 16 drives: 150 MB/s each.
    expect(gist(check(expanded(16, 'sas-4tb')))).toEqual(['note K2'])
    // 20 drives at 3 Gb/s: 60 MB/s each, below the inner track; 18.5 h instead of 8.2 h.
    const findings = check(expanded(20, 'sas-4tb', 'cable-8087-3g'))
    expect(gist(findings)).toEqual(['caution K2'])
    expect(findings[0]?.message).toContain('18.5 h instead of 8.2 h: 10.3 h are lost at the 4-lane link to K2')
  })
})

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

describe('controller-mode', () => {
  const withMode = (hba: string, mode?: 'pass-through' | 'combined'): Input => {
    const [parts, joints] = direct(1, hba, 'sas-4tb')
    return [{ ...parts, K1: mode ? { model: hba, mode } : hba }, joints]
  }
  const check = (input: Input, needsPassThrough = true) =>
    gist(findingsOf(controllerMode, documentOf(input[0], input[1], { settings: { array: { needsPassThrough } } })))

  it.each([
    ['hba-8i', undefined, []],
    ['raid-8i', 'pass-through', []],
    ['raid-8i', 'combined', ['fault K1']],
    ['raid-8i', undefined, ['note K1']],
    ['raid-only', undefined, ['fault K1']],
    ['raid-only', 'pass-through', ['fault K1']],
  ] as const)('%s set to %s', (hba, mode, expected) => {
    expect(check(withMode(hba, mode))).toEqual(expected)
    expect(check(withMode(hba, mode), false)).toEqual([])
  })

  it('is quiet on a controller without drives of the array', () => {
    expect(check([{ K1: 'raid-only' }, []])).toEqual([])
  })
})

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
