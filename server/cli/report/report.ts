import type { CheckResult } from '#shared/check/result.ts'
import { amount, counted } from '#shared/check/words.ts'
import { severities } from '#shared/check/severity.ts'
import { findingLines } from './findings.ts'
import { ledgerLines, type LedgerOptions } from './ledger.ts'
import { printable } from './printable.ts'
import { table, wrap } from './table.ts'

/** The answer of the checker as text, as calm as a page of paper. */
export function report(result: CheckResult, options: LedgerOptions): string {
  const { width } = options
  const sections = [
    heading(result),
    wrap(verdict(result), width),
    findingLines(result.findings, width),
    ledgerLines(result.ledger, result.moments, options),
    momentLines(result, width),
    ...scanLines(result, width),
  ]
  return printable(sections.filter((section) => section !== '').join('\n\n'))
}

function heading({ build }: CheckResult): string {
  const machine = build.machine ? ` (${build.machine})` : ''
  return `${build.name}${machine}: ${counted(build.drives, 'drive')}, ${counted(build.parts, 'part')}, ${counted(build.joints, 'joint')}`
}

function verdict({ counts, weakestHop }: CheckResult): string {
  const found = severities.flatMap((severity) => (counts[severity] > 0 ? [counted(counts[severity], severity)] : []))
  const accepted = counts.accepted > 0 ? [`${counts.accepted} accepted`] : []
  const summary = [...found, ...accepted].join(', ')
  return [summary === '' ? 'Within the stated limits.' : `Found: ${summary}.`, weakestHop].filter(Boolean).join(' ')
}

function momentLines({ moments, energy_kWhPerYear, ups_VA }: CheckResult, width: number): string {
  const rows = moments
    .filter((moment) => moment.applies)
    .map(({ label, dc_W, wall_W, wall_VA }) => [
      label,
      amount(dc_W, 'W'),
      wall_W === null ? 'unknown' : amount(wall_W, 'W'),
      wall_VA === null ? 'unknown' : `${Math.round(wall_VA)} VA`,
    ])
  const right = 'right' as const
  const columns = [{ title: 'moment' }, ...['DC', 'at the wall', 'UPS'].map((title) => ({ title, align: right }))]
  const year = energy_kWhPerYear === null ? [] : [`About ${Math.round(energy_kWhPerYear)} kWh a year at rest.`]
  const ups = ups_VA === null ? [] : [`A UPS has to carry ${Math.round(ups_VA)} VA.`]
  return ['Moments', table(columns, rows, width), ...year, ...ups].join('\n')
}

function scanLines({ scan }: CheckResult, width: number): string[] {
  if (scan.hours === null) return []
  const about = scan.about ? 'about ' : ''
  const time = `A full scan of the array takes ${about}${amount(scan.hours, 'h')}`
  if (!scan.bottleneck) return [wrap(`${time}, as long as the drives themselves need.`, width)]
  const alone =
    scan.drivesAlone_hours === null ? '' : `; the drives alone would take ${amount(scan.drivesAlone_hours, 'h')}`
  return [wrap(`${time}${alone}. It is slowed by ${scan.bottleneck}.`, width)]
}
