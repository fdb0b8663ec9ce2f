import { amount } from './words.ts'
import { atMoment } from '../electrical/names.ts'
import type { LedgerRow } from './result.ts'

/**
 * The hop that is nearest to or furthest past its limit, in one sentence; null while every load stays below the
 * derating share of its limit.
 */
export function weakestHop(ledger: readonly LedgerRow[], derating: number): string | null {
  let weakest: LedgerRow | null = null
  for (const row of ledger)
    if (row.kind !== 'device' && row.share !== null && row.share > (weakest?.share ?? derating)) weakest = row
  if (!weakest || weakest.share === null || weakest.limit === null || weakest.unit === 'V') return null
  const { name, load, limit, share, unit, moment, about } = weakest
  const measure = `${about ? 'about ' : ''}${amount(load, unit)} of ${amount(limit, unit)} (${amount(share * 100, '%')})`
  return `Weakest hop: ${name} carries ${measure} ${atMoment(moment)}.`
}
