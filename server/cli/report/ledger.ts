import type { LedgerRow, MomentId, MomentResult } from '#shared/check/result.ts'
import { table, type Column } from './table.ts'

/** Rows printed without `--all`. */
const mostRows = 25

/** One thing that carries or sees something, with all its moments. */
interface Entry {
  name: string
  rows: LedgerRow[]
  /** The moment nearest to its limit. */
  worst: LedgerRow
  strain: number
}

export interface LedgerOptions {
  width: number
  all: boolean
}

/** The power ledger: a line for each rail, group, contact and wire, a column for each moment; then the voltages. */
export function ledgerLines(
  ledger: readonly LedgerRow[],
  moments: readonly MomentResult[],
  options: LedgerOptions,
): string {
  const shown = moments.filter((moment) => moment.applies)
  const loads = entries(ledger.filter((row) => row.unit !== 'V'))
  const volts = entries(ledger.filter((row) => row.unit === 'V'))
  return [
    section('Power ledger: load at each moment, most loaded first', loads, shown, options),
    section('Voltage at each device, least margin first', volts, shown, options),
  ]
    .filter((text) => text !== '')
    .join('\n\n')
}

function entries(rows: readonly LedgerRow[]): Entry[] {
  const found = new Map<string, Entry>()
  for (const row of rows) {
    const { kind, part, connector, joint, conductor, rail } = row.subject
    const key = [row.kind, kind, part, connector, joint, conductor, rail, row.rail].join('|')
    const strain = strainOf(row)
    const known = found.get(key)
    if (!known) found.set(key, { name: row.name, rows: [row], worst: row, strain })
    else {
      known.rows.push(row)
      if (strain > known.strain) Object.assign(known, { worst: row, strain })
    }
  }
  return [...found.values()].sort((a, b) => b.strain - a.strain)
}

/** How near to its limit: share of a load, or how little of the margin a voltage has left. */
function strainOf({ unit, share, margin }: LedgerRow): number {
  if (unit === 'V') return margin === null ? -Infinity : -margin
  return share ?? -Infinity
}

function section(title: string, all: Entry[], moments: readonly MomentResult[], { width, all: every }: LedgerOptions) {
  if (all.length === 0) return ''
  const shown = every ? all : all.slice(0, mostRows)
  const columns: Column[] = [
    { title: 'what' },
    ...moments.map(({ label }): Column => ({ title: label.toLowerCase(), align: 'right' })),
    { title: 'limit', align: 'right' },
    { title: 'margin', align: 'right' },
  ]
  const rows = shown.map(({ name, rows: own, worst }) => [
    name,
    ...moments.map(({ moment }) => loadAt(own, moment)),
    worst.limit === null ? 'unknown' : number(worst.limit, worst),
    marginOf(worst),
  ])
  const rest = all.length - shown.length
  const more = rest > 0 ? `\n${rest} more with a wider margin; --all prints them.` : ''
  return `${title}\n${table(columns, rows, width)}${more}`
}

function loadAt(rows: readonly LedgerRow[], moment: MomentId): string {
  const row = rows.find((candidate) => candidate.moment === moment)
  return row ? `${row.about ? '~' : ''}${number(row.load, row)}` : ''
}

function marginOf({ margin, limit, unit }: LedgerRow): string {
  if (margin === null || limit === null) return 'unknown'
  return unit === 'V' ? `${margin.toFixed(2)} V` : limit === 0 ? '' : `${Math.round((margin / limit) * 100)} %`
}

const decimals = { A: 2, W: 0, V: 2 } as const
const number = (value: number, { unit }: LedgerRow): string => `${value.toFixed(decimals[unit])} ${unit}`
