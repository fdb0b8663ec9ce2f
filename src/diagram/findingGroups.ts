import type { Finding } from '#shared/check/result.ts'
import { severities, type Severity } from '#shared/check/severity.ts'

/** Findings of one rule and severity, told together where there are many. */
export interface FindingBunch {
  key: string
  rule: string
  findings: Finding[]
  /** Designations of the parts concerned, each once. */
  refs: string[]
}

export interface FindingGroup {
  severity: Severity
  count: number
  bunches: FindingBunch[]
}

/** From this many on, findings of one rule stand behind one line. */
export const manyOfARule = 3

/** Findings by severity, worst first, and within it by rule in the order of the checker. */
export function groupFindings(findings: readonly Finding[]): FindingGroup[] {
  return severities.map((severity) => {
    const own = findings.filter((finding) => finding.severity === severity)
    const bunches = new Map<string, FindingBunch>()
    for (const finding of own) {
      const bunch = bunches.get(finding.rule)
      const ref = finding.subjects.find((subject) => subject.ref !== undefined)?.ref
      const refs = ref === undefined ? [] : [ref]
      if (!bunch)
        bunches.set(finding.rule, { key: `${severity}/${finding.rule}`, rule: finding.rule, findings: [finding], refs })
      else {
        bunch.findings.push(finding)
        if (ref !== undefined && !bunch.refs.includes(ref)) bunch.refs.push(ref)
      }
    }
    return { severity, count: own.length, bunches: [...bunches.values()] }
  })
}
