import type { Finding, JointFlow, MomentId } from '#shared/check/result.ts'
import { severityRank, type Severity } from '#shared/check/severity.ts'

/** Moments that last: above a rating then is heat, not a peak. */
const sustained: ReadonlySet<MomentId> = new Set(['full-scan', 'at-rest'])

export interface Limits {
  derating: number
  shortTimeAllowance: number
}

/** How a joint stands by its share of the limit at one moment. The same steps as the contact rule's. */
export function strainOf(share: number | null | undefined, moment: MomentId, limits: Limits): Severity | null {
  if (share === null || share === undefined || share <= limits.derating + 1e-9) return null
  if (share <= 1 + 1e-9) return 'caution'
  if (sustained.has(moment)) return 'danger'
  return share <= limits.shortTimeAllowance + 1e-9 ? 'caution' : 'fault'
}

export const worse = (a: Severity | null, b: Severity | null): Severity | null =>
  a === null ? b : b === null ? a : severityRank[a] <= severityRank[b] ? a : b

/**
 * The severity at which each joint is drawn at one moment: what its share says, and open findings that hold at every
 * moment or at this one. Notes do not mark a run.
 */
export function markJoints(
  flows: ReadonlyMap<string, JointFlow>,
  findings: readonly Finding[],
  moment: MomentId,
  limits: Limits,
): Map<string, Severity> {
  const marks = new Map<string, Severity>()
  const mark = (joint: string, severity: Severity | null) => {
    const next = worse(marks.get(joint) ?? null, severity)
    if (next && next !== 'note') marks.set(joint, next)
  }
  const accepted = new Set<string>()
  for (const finding of findings)
    for (const { joint } of finding.subjects) {
      if (joint === undefined) continue
      if (finding.accepted) accepted.add(joint)
      else if (finding.moment === undefined || finding.moment === moment) mark(joint, finding.severity)
    }
  for (const [joint, flow] of flows) if (!accepted.has(joint)) mark(joint, strainOf(flow.share, moment, limits))
  return marks
}
