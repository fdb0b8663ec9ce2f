import { amount } from './words.ts'
import { atMoment } from '../electrical/names.ts'
import type { PowerResult } from '../electrical/result.ts'
import { weakestRow } from './ledger.ts'

/**
 * The hop that is nearest to or furthest past its limit, in one sentence; null while every load stays below the
 * derating share of its limit.
 */
export function weakestHop(power: PowerResult, derating: number): string | null {
  const weakest = weakestRow(power, derating)
  if (!weakest || weakest.share === null || weakest.limit === null || weakest.unit === 'V') return null
  const { name, load, limit, share, unit, moment, about } = weakest
  const measure = `${about ? 'about ' : ''}${amount(load, unit)} of ${amount(limit, unit)} (${amount(share * 100, '%')})`
  return `Weakest hop: ${name} carries ${measure} ${atMoment(moment)}.`
}
