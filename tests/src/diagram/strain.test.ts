import { describe, expect, it } from 'vitest'
import type { Finding, JointFlow } from '#shared/check/result.ts'
import { markJoints, strainOf, worse } from '../../../src/diagram/strain.ts'

const limits = { derating: 0.8, shortTimeAllowance: 1.25 }
const finding = (joint: string, over: Partial<Finding> = {}): Finding => ({
  key: joint,
  rule: 'contact-over-rating',
  severity: 'fault',
  subjects: [{ kind: 'joint', joint }],
  message: '',
  why: '',
  remedy: '',
  source: [],
  decidedBy: [],
  about: false,
  ...over,
})
const flows = (share: number): Map<string, JointFlow> =>
  new Map([['j1', { joint: 'j1', current_A: { '12V': 1 }, share }]])

describe('strainOf', () => {
  it.each([
    [0.8, 'cold-start', null],
    [0.81, 'cold-start', 'caution'],
    [1, 'full-scan', 'caution'],
    [1.01, 'full-scan', 'danger'],
    [1.25, 'cold-start', 'caution'],
    [1.26, 'cold-start', 'fault'],
    [null, 'at-rest', null],
  ] as const)('a share of %s at %s is %s', (share, moment, severity) => {
    expect(strainOf(share, moment, limits)).toBe(severity)
  })

  it('takes the worse of two', () => {
    expect(worse('caution', 'danger')).toBe('danger')
    expect(worse(null, 'note')).toBe('note')
  })
})

describe('markJoints', () => {
  it('marks by what flows at the moment shown', () => {
    expect(markJoints(flows(1.3), [], 'cold-start', limits).get('j1')).toBe('fault')
    expect(markJoints(flows(0.5), [], 'cold-start', limits).size).toBe(0)
  })

  it('leaves a finding of another moment out and keeps one of every moment', () => {
    expect(markJoints(new Map(), [finding('j1', { moment: 'cold-start' })], 'at-rest', limits).size).toBe(0)
    expect(markJoints(new Map(), [finding('j1', { severity: 'danger' })], 'at-rest', limits).get('j1')).toBe('danger')
  })

  it('does not mark what somebody accepted', () => {
    const accepted = { reason: 'measured', by: 'x', on: '2026-12-01' }
    expect(markJoints(flows(1.3), [finding('j1', { accepted })], 'cold-start', limits).size).toBe(0)
  })
})
