import type { Severity } from '#shared/check/severity.ts'

/** The word of each severity, as it stands on screen. */
export const severityWords: Readonly<Record<Severity, string>> = {
  danger: 'danger',
  fault: 'fault',
  caution: 'caution',
  note: 'note',
}

/** "1 fault", "2 faults" */
export const countWords = (severity: Severity, count: number): string =>
  `${count} ${severityWords[severity]}${count === 1 ? '' : 's'}`

export const withinWords = 'within the stated limits'
