import { describe, expect, it } from 'vitest'
import type { Finding } from '#shared/check/result.ts'
import { findingLines } from '../../../server/cli/report/findings.ts'

const low = (ref: string, load: number, more: Partial<Finding> = {}): Finding => ({
  key: ref,
  rule: 'voltage-out-of-tolerance',
  severity: 'fault',
  subjects: [{ kind: 'part', ref }],
  moment: 'cold-start',
  load,
  limit: 4.75,
  unit: 'V',
  message: `${ref} sees ${load} V.`,
  why: 'Because.',
  remedy: 'Move devices.',
  source: [],
  decidedBy: [],
  about: false,
  ...more,
})

describe('voltages of many devices with one cause', () => {
  it('are one entry: the lowest in full, the others by name with their range', () => {
    const text = findingLines([low('C1', 4.74), low('C2', 4.7), low('C3', 4.72)], 120)
    expect(text).toContain('C2 sees 4.7 V.')
    expect(text).not.toContain('C1 sees')
    expect(text).toContain('The same holds for C3 and C1: 4.72 to 4.74 V.')
    expect(text.match(/FAULT/g)).toHaveLength(1)
  })

  it('stay apart where moment, limit, remedy or severity differ', () => {
    const text = findingLines(
      [
        low('C1', 4.74),
        low('C2', 4.7, { moment: 'wake' }),
        low('C3', 4.7, { limit: 4.8 }),
        low('C4', 4.7, { remedy: 'Shorter leads.' }),
        low('C5', 4.7, { severity: 'caution' }),
      ],
      120,
    )
    expect(text.match(/FAULT|CAUTION/g)).toHaveLength(5)
  })

  it('leave accepted ones and other units as they are', () => {
    const accepted = { by: 'M. Aster', on: '2026-01-02', reason: 'Measured.' } as Finding['accepted']
    const text = findingLines(
      [low('C1', 4.74), low('C2', 4.7, { accepted }), low('C3', 5, { unit: 'A' }), low('C4', 5, { unit: 'A' })],
      120,
    )
    expect(text.match(/FAULT/g)).toHaveLength(4)
  })
})
