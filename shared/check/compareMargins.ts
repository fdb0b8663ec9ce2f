import type { MarginChange, WorstOfRow } from './compareResults.ts'
import type { LedgerRow } from './result.ts'

/**
 * Each row of the ledger at its worst moment, before and after, where they differ by what can be read in a tenth of an
 * ampere, a watt or a hundredth of a volt. The row with the least left now comes first; what is gone comes last.
 */
export function compareMargins(before: readonly LedgerRow[], after: readonly LedgerRow[]): MarginChange[] {
  const [old, now] = [worstRows(before), worstRows(after)]
  const changes: MarginChange[] = []
  for (const key of new Set([...now.keys(), ...old.keys()])) {
    const [was, is] = [old.get(key), now.get(key)]
    const row = is ?? was
    if (!row || (was && is && readsAlike(was, is))) continue
    const { kind, name, unit, subject } = row
    changes.push({ kind, name, unit, subject, before: worstOf(was), after: worstOf(is) })
  }
  return changes.sort((a, b) => strainOf(b.after, b.unit) - strainOf(a.after, a.unit))
}

type Limited = LedgerRow & { limit: number; margin: number }

/** Rows by what they are called: names are made of designations, which are given once. */
function worstRows(rows: readonly LedgerRow[]): Map<string, Limited> {
  const worst = new Map<string, Limited>()
  for (const row of rows) {
    if (!isLimited(row)) continue
    const key = `${row.kind}|${row.name}|${row.rail ?? ''}`
    const known = worst.get(key)
    if (!known || strainOf(row, row.unit) > strainOf(known, known.unit)) worst.set(key, row)
  }
  return worst
}

const isLimited = (row: LedgerRow): row is Limited => row.limit !== null && row.margin !== null

/** A twentieth below nominal, as ATX allows: what a voltage may lose, for the order of the rows alone. */
const band = 1 / 0.95 - 1

/** How near to the limit: 1 is on it. A voltage strains by what it has lost of its band. */
function strainOf(row: { load: number; limit: number } | null, unit: LedgerRow['unit']): number {
  if (!row) return -Infinity
  const room = Math.max(row.limit, 1e-9)
  return unit === 'V' ? 1 - (row.load - row.limit) / (band * room) : row.load / room
}

const decimals: Readonly<Record<LedgerRow['unit'], number>> = { A: 1, W: 0, V: 2 }

function readsAlike(a: Limited, b: Limited): boolean {
  const read = (value: number) => value.toFixed(decimals[a.unit])
  return read(a.load) === read(b.load) && read(a.limit) === read(b.limit)
}

const worstOf = (row: Limited | undefined): WorstOfRow | null =>
  row ? { moment: row.moment, load: row.load, limit: row.limit, margin: row.margin, about: row.about } : null
