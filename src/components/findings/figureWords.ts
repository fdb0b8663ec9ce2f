import type { Figure, Finding } from '#shared/check/result.ts'

const trim = (value: number): string => String(Math.round(value * 100) / 100)

/** "start current of C7 on 12 V, 1.7 to 2.2 A (class default)". */
export function figureSentence(figure: Figure): string {
  const { value, low, high, unit, what, origin } = figure
  const range = low !== undefined && high !== undefined && low !== high ? `${trim(low)} to ${trim(high)} ${unit}` : ''
  const number = value === null ? range || 'unknown' : `${trim(value)} ${unit}${range ? ` (${range})` : ''}`
  return `${what}, ${number}, ${origin}${figure.fromMemory ? ', from memory' : ''}`
}

/** The figures that decided a finding, the first two of them. */
export function decidedWords(finding: Finding): string {
  const shown = finding.decidedBy.slice(0, 2).map(figureSentence)
  const rest = finding.decidedBy.length - shown.length
  return `${shown.join('; ')}${rest > 0 ? `; and ${rest} more` : ''}.`
}
