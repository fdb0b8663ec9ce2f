import { describe, expect, it } from 'vitest'
import { sharedUplink } from '#shared/rules/shared-uplink/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

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
