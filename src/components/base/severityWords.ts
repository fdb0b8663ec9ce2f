import type { Severity } from '#shared/check/severity.ts'

/** The word of each severity, as it stands on screen. */
export const severityWords: Readonly<Record<Severity, string>> = {
  danger: 'danger',
  fault: 'fault',
  caution: 'caution',
  note: 'note',
}

export const withinWords = 'within the stated limits'
