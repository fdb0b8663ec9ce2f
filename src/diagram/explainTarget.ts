import type { Finding, LedgerRow } from '#shared/check/result.ts'
import type { ExplainTarget } from '#shared/electrical/explain.ts'
import { rails } from '#shared/quantity/rails.ts'

/** What to ask the engine for, to see how a ledger row was made. Null where it cannot tell. */
export function explainTarget(row: LedgerRow): ExplainTarget | null {
  const { part, joint, conductor, connector, rail } = row.subject
  switch (row.kind) {
    case 'contact':
      return joint !== undefined && row.rail !== undefined ? { kind: 'joint', joint, line: row.rail } : null
    case 'wire':
      return part !== undefined && conductor !== undefined ? { kind: 'conductor', part, conductor } : null
    case 'rail':
      return part !== undefined && rail !== undefined ? { kind: 'rail', part, rail } : null
    case 'device': {
      const line = rails.find((one) => one === row.rail)
      return part !== undefined && connector !== undefined && line
        ? { kind: 'device', part, connector, rail: line }
        : null
    }
    default:
      return null
  }
}

/** The ledger row that a finding speaks of: same subject, moment and load. */
export function rowOfFinding(finding: Finding, ledger: readonly LedgerRow[]): LedgerRow | undefined {
  const { load, moment } = finding
  if (load === undefined || moment === undefined) return undefined
  return ledger.find(
    (row) =>
      row.moment === moment &&
      Math.abs(row.load - load) < 1e-9 &&
      finding.subjects.some(
        (subject) =>
          (subject.joint !== undefined && subject.joint === row.subject.joint) ||
          (subject.part !== undefined && subject.part === row.subject.part),
      ),
  )
}
