import type { LedgerRow, MomentId } from '#shared/check/result.ts'

/** What a row is known by, whatever its moment and figures. */
export const ledgerKey = (row: LedgerRow): string =>
  [
    row.kind,
    row.subject.part,
    row.subject.joint,
    row.subject.connector,
    row.subject.conductor,
    row.subject.rail,
    row.rail,
    row.name,
  ]
    .join('|')
    .slice(0, 400)

/** How near a row is to its limit; a voltage counts by how little is left above the lowest allowed. */
export function strainOfRow(row: LedgerRow): number {
  if (row.unit === 'V') return row.margin === null || row.limit === null ? -1 : row.limit / Math.max(row.load, 1e-9)
  return row.share ?? -1
}

/** One row a thing: at the moment given, or at its own worst moment. The most strained first. */
export function worstRows(rows: readonly LedgerRow[], moment: MomentId | null): LedgerRow[] {
  const best = new Map<string, LedgerRow>()
  for (const row of rows) {
    if (moment !== null && row.moment !== moment) continue
    const key = ledgerKey(row)
    const known = best.get(key)
    if (!known || strainOfRow(row) > strainOfRow(known)) best.set(key, row)
  }
  return [...best.values()].sort((a, b) => strainOfRow(b) - strainOfRow(a))
}
