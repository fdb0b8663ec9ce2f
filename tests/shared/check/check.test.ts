import { describe, expect, it } from 'vitest'
import { check } from '#shared/check/check.ts'
import { checkResultSchema } from '#shared/check/result.ts'
import { defineRule, type RawFinding, type Rule } from '#shared/rules/rule.ts'
import { catalog, documentOf } from '../../helpers/fixtures/build.ts'

const fourDrives = documentOf(
  { K1: 'hba-4i', W1: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb', C10: 'sas-4tb', C3: 'sas-520' },
  ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'W1.leg-2 C2.plug'],
)

const rule = (id: string, find: () => RawFinding<null>[]): Rule =>
  defineRule<null>({
    meta: {
      id,
      title: id,
      severities: ['caution'],
      finds: '',
      why: 'because',
      needs: [],
      sources: [],
      commonPractice: true,
    },
    check: find,
    words: () => ({ message: id, remedy: '' }),
  })

describe('the answer of the checker', () => {
  const result = check(fourDrives, catalog, { strict: true })

  it('has the agreed shape and goes through JSON unchanged', () => {
    const copy: unknown = JSON.parse(JSON.stringify(result))
    expect(checkResultSchema.parse(copy)).toEqual(copy)
    expect(copy).toEqual(result)
  })

  it('counts what the build holds', () => {
    expect(result.build).toEqual({ name: 'test', parts: 6, joints: 3, drives: 4 })
  })

  it('lists the worst first, then by designation as people count', () => {
    const ranks = result.findings.map(({ severity }) => ['danger', 'fault', 'caution', 'note'].indexOf(severity))
    expect(ranks).toEqual([...ranks].sort())
    const lost = result.findings.filter((finding) => finding.rule === 'no-data-path')
    expect(lost.map((finding) => finding.subjects[0]?.ref)).toEqual(['C3', 'C10'])
  })

  it('names the worst and counts each severity, accepted ones apart', () => {
    const { key, severity } = result.findings.find((finding) => finding.rule === 'no-data-path')!
    const accepted = [{ key, severity, reason: 'comes later', by: 'Ines', on: '2026-11-30' }]
    const after = check({ ...fourDrives, accepted }, catalog)
    expect(result.worst).toBe('fault')
    expect(after.counts).toEqual({ ...result.counts, fault: result.counts.fault - 1, accepted: 1 })
    expect(after.findings).toHaveLength(result.findings.length)
  })

  it('has nothing to say of an empty build', () => {
    expect(check(documentOf({}), catalog, { strict: true })).toMatchObject({
      worst: null,
      findings: [],
      weakestHop: null,
      dataPaths: [],
      scan: { hours: null },
    })
  })

  it('tells data paths in the words of the contract', () => {
    expect(result.dataPaths[0]).toEqual({
      drive: 'C1',
      driveConnector: 'plug',
      drivePort: 0,
      controllerPart: 'K1',
      controller: 'c0',
      port: 'port-a',
      lane: 0,
      joints: ['j1', 'j2'],
      expanders: [],
      rate_Gbps: 6,
      limitedBy: 'K1',
      share_MBps: 180,
      works: true,
    })
  })
})

describe('a rule that breaks', () => {
  const broken = rule('broken', () => {
    throw new Error('lost its way')
  })
  const working = rule('working', () => [{ severity: 'note', subjects: [], facts: null }])

  it('takes only itself down, and the answer says that its check was not made', () => {
    const { findings } = check(fourDrives, catalog, { rules: [broken, working] })
    expect(findings.map(({ rule: id, severity }) => [id, severity])).toEqual([
      ['broken', 'caution'],
      ['working', 'note'],
    ])
    expect(findings[0]?.message).toContain('could not be carried out')
  })

  it('is not hidden from tests', () => {
    expect(() => check(fourDrives, catalog, { rules: [broken], strict: true })).toThrow('lost its way')
  })
})

describe('keys', () => {
  it('are told apart where one rule finds the same twice', () => {
    const twice = rule('twice', () => [1, 2].map(() => ({ severity: 'note', subjects: [], facts: null })))
    expect(check(fourDrives, catalog, { rules: [twice] }).findings.map((finding) => finding.key)).toEqual([
      'twice|build',
      'twice|build#2',
    ])
  })

  it('go by designations, not by ids', () => {
    const key = (id: string) =>
      check({ ...documentOf({ C1: 'sas-4tb' }), parts: [{ id, model: 'sas-4tb', ref: 'C1' }] }, catalog).findings.map(
        (finding) => finding.key,
      )
    expect(key('one')).toEqual(key('two'))
  })
})
