import { describe, expect, it } from 'vitest'
import { narrowSlot } from '#shared/rules/narrow-slot/index.ts'
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
