import { describe, expect, it } from 'vitest'
import type { AcceptedFinding } from '#shared/build/document.ts'
import { markAccepted } from '#shared/check/accept.ts'
import type { Finding } from '#shared/check/result.ts'
import type { Severity } from '#shared/check/severity.ts'

const finding = (severity: Severity, load?: number, unit = 'A', limit = 10): Finding => ({
  key: 'rule|C1',
  rule: 'rule',
  severity,
  subjects: [],
  ...(load === undefined ? {} : { load, limit, unit }),
  message: '',
  why: '',
  remedy: '',
  source: [],
  decidedBy: [],
  about: false,
})
const entry = (severity: Severity, load?: number): AcceptedFinding => ({
  key: 'rule|C1',
  reason: 'measured, stays cool',
  by: 'Ines',
  on: '2026-11-30',
  severity,
  ...(load === undefined ? {} : { load }),
})
const holds = (now: Finding, accepted: AcceptedFinding) => markAccepted([now], [accepted])[0]?.accepted !== undefined

describe('an accepted finding', () => {
  it('stays listed, with who and why', () => {
    expect(markAccepted([finding('fault')], [entry('fault')])[0]).toMatchObject({
      severity: 'fault',
      accepted: { reason: 'measured, stays cool', by: 'Ines', on: '2026-11-30' },
    })
  })

  it('stays accepted when it gets better', () => {
    expect(holds(finding('caution', 8), entry('fault', 10))).toBe(true)
  })

  it('comes back when it gets graver', () => {
    expect(holds(finding('danger'), entry('fault'))).toBe(false)
  })

  it('comes back when the load is more than 1 % past the accepted one', () => {
    expect(holds(finding('fault', 10.1), entry('fault', 10))).toBe(true)
    expect(holds(finding('fault', 10.11), entry('fault', 10))).toBe(false)
  })

  it('a voltage that is too low gets worse by falling', () => {
    expect(holds(finding('fault', 4.69, 'V', 4.75), entry('fault', 4.7))).toBe(true)
    expect(holds(finding('fault', 4.6, 'V', 4.75), entry('fault', 4.7))).toBe(false)
    expect(holds(finding('fault', 4.74, 'V', 4.75), entry('fault', 4.7))).toBe(true)
  })

  it('is known by its key alone', () => {
    expect(holds(finding('fault'), { ...entry('fault'), key: 'rule|C2' })).toBe(false)
  })
})
