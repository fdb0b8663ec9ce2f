import type { AcceptedFinding } from '../build/document.ts'
import type { Finding } from './result.ts'
import { severityRank } from './severity.ts'

/** A load may drift by this share before an accepted finding comes back. */
export const acceptedDrift = 0.01

/**
 * Marks findings that a person accepted. An acceptance no longer counts when the finding has become worse: a graver
 * severity, or a load more than 1 % past the one accepted.
 */
export function markAccepted(findings: readonly Finding[], accepted: readonly AcceptedFinding[]): Finding[] {
  if (accepted.length === 0) return [...findings]
  const byKey = new Map(accepted.map((entry) => [entry.key, entry]))
  return findings.map((finding) => {
    const entry = byKey.get(finding.key)
    if (!entry || isWorse(finding, entry)) return finding
    return { ...finding, accepted: { reason: entry.reason, by: entry.by, on: entry.on } }
  })
}

function isWorse(finding: Finding, entry: AcceptedFinding): boolean {
  if (severityRank[finding.severity] < severityRank[entry.severity]) return true
  if (finding.load === undefined || entry.load === undefined) return false
  const drift = Math.abs(entry.load) * acceptedDrift
  return lowerIsWorse(finding) ? finding.load < entry.load - drift : finding.load > entry.load + drift
}

/** A voltage below its lowest allowed value gets worse by falling; every other load by rising. */
function lowerIsWorse({ unit, load, limit }: Finding): boolean {
  return unit === 'V' && load !== undefined && limit !== undefined && load < limit
}
