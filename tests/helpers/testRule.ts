import { describe, expect, it } from 'vitest'
import type { BuildDocument } from '#shared/build/document.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Finding } from '#shared/check/result.ts'
import type { Severity } from '#shared/check/severity.ts'
import { figureSchema } from '#shared/check/result.ts'
import type { Rule } from '#shared/rules/rule.ts'
import { findingsOf } from './findingsOf.ts'

export interface AcceptCase {
  what: string
  document: BuildDocument
}

/** What a finding must at least be. `words` must all stand in message and remedy together. */
export interface Expected {
  severity: Severity
  /** Reference designations among the subjects. */
  refs?: readonly string[]
  words?: readonly (string | RegExp)[]
  moment?: Finding['moment']
  load?: number
  limit?: number
}

export interface RejectCase {
  what: string
  document: BuildDocument
  findings: readonly Expected[]
}

/**
 * Holds a rule against a table of documents that it must accept in silence and of documents that it must reject, with
 * just the findings listed, in any order.
 */
export function testRule(
  rule: Rule,
  { catalog, accept, reject }: { catalog: CatalogIndex; accept: readonly AcceptCase[]; reject: readonly RejectCase[] },
): void {
  describe(rule.meta.id, () => {
    it.each(accept)('accepts $what', ({ document }) => {
      expect(findingsOf(rule, document, catalog).map(({ message }) => message)).toEqual([])
    })

    it.each(reject)('rejects $what', ({ document, findings: expected }) => {
      const found = findingsOf(rule, document, catalog)
      expect(found.map(({ severity, message }) => `${severity}: ${message}`)).toHaveLength(expected.length)
      const left = [...found]
      for (const wanted of expected) {
        const at = left.findIndex((finding) => fits(finding, wanted))
        expect(at, `no finding like ${JSON.stringify(wanted)} among ${JSON.stringify(left)}`).toBeGreaterThanOrEqual(0)
        left.splice(at, 1)
      }
      for (const finding of found) expectWellFormed(rule, finding)
    })
  })
}

function fits(finding: Finding, { severity, refs = [], words = [], moment, load, limit }: Expected): boolean {
  const text = `${finding.message} ${finding.remedy}`
  const near = (seen: number | undefined, wanted: number | undefined) =>
    wanted === undefined || (seen !== undefined && Math.abs(seen - wanted) <= 1e-9 * Math.max(1, Math.abs(wanted)))
  return (
    finding.severity === severity &&
    refs.every((ref) => finding.subjects.some((subject) => subject.ref === ref)) &&
    words.every((word) => (typeof word === 'string' ? text.includes(word) : word.test(text))) &&
    (moment === undefined || finding.moment === moment) &&
    near(finding.load, load) &&
    near(finding.limit, limit)
  )
}

/** What holds for every finding of every rule. */
function expectWellFormed(rule: Rule, finding: Finding): void {
  expect(rule.meta.severities).toContain(finding.severity)
  expect(finding.subjects.length).toBeGreaterThan(0)
  expect(finding.message).not.toMatch(/NaN|undefined|null|Infinity|!/)
  expect(finding.remedy).not.toMatch(/NaN|undefined|null|Infinity|!/)
  expect(finding.message.length).toBeGreaterThan(10)
  expect(finding.remedy.length).toBeGreaterThan(10)
  for (const figure of finding.decidedBy) expect(figureSchema.safeParse(figure).success).toBe(true)
}
