import { compareRefs } from '../build/refOrder.ts'
import type { CheckResult, Finding } from './result.ts'
import { severities, severityRank } from './severity.ts'

/** Worst first, then by the designation of the first subject, then by rule and key: an order that lists cannot shift. */
export function sortFindings(findings: readonly Finding[]): Finding[] {
  return [...findings].sort(
    (a, b) =>
      severityRank[a.severity] - severityRank[b.severity] ||
      compareRefs(a.subjects[0]?.ref ?? '', b.subjects[0]?.ref ?? '') ||
      compareText(a.rule, b.rule) ||
      compareText(a.key, b.key),
  )
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0)

/** How many findings of each severity nobody accepted, how many are accepted, and the worst left. */
export function summarise(findings: readonly Finding[]): Pick<CheckResult, 'worst' | 'counts'> {
  const counts = { danger: 0, fault: 0, caution: 0, note: 0, accepted: 0 }
  for (const finding of findings) counts[finding.accepted ? 'accepted' : finding.severity]++
  return { worst: severities.find((severity) => counts[severity] > 0) ?? null, counts }
}
