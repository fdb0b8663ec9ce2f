import type { LedgerRow } from '#shared/check/result.ts'

const decimals = { A: 1, W: 0, V: 2 } as const

export const number = (value: number, unit: LedgerRow['unit']): string => value.toFixed(decimals[unit])

/** "6.0 of 4.5 A", "11.62 V, at least 11.40", "2.1 A, limit unknown". */
export function measureWords(row: LedgerRow): string {
  const about = row.about ? 'about ' : ''
  const load = number(row.load, row.unit)
  if (row.limit === null) return `${about}${load} ${row.unit}, limit unknown`
  const limit = number(row.limit, row.unit)
  return row.unit === 'V' ? `${about}${load} V, at least ${limit}` : `${about}${load} of ${limit} ${row.unit}`
}
