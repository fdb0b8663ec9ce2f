import { amount } from './words.ts'
import type { LedgerRow, MomentResult } from './result.ts'

/**
 * The hop that is nearest to or furthest past its limit, in one sentence; null while every load stays below the
 * derating share of its limit.
 */
export function weakestHop(
  ledger: readonly LedgerRow[],
  moments: readonly MomentResult[],
  derating: number,
): string | null {
  let weakest: LedgerRow | null = null
  for (const row of ledger)
    if (row.kind !== 'device' && row.share !== null && row.share > (weakest?.share ?? derating)) weakest = row
  if (!weakest || weakest.share === null || weakest.limit === null || weakest.unit === 'V') return null
  const { name, load, limit, share, unit, moment, about } = weakest
  const label = moments.find((result) => result.moment === moment)?.label ?? moment
  const measure = `${about ? 'about ' : ''}${amount(load, unit)} of ${amount(limit, unit)} (${amount(share * 100, '%')})`
  return `Weakest hop: ${name} carries ${measure} at ${label.toLowerCase()}.`
}
