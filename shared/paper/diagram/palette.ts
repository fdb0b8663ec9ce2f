import type { Severity } from '../../check/severity.ts'

/** Colours of the light drawing sheet, the same as on the screen. */
export const palette = {
  paper: '#fbfaf6',
  card: '#ffffff',
  frame: '#f3f0e9',
  ink: '#1f2a30',
  soft: '#5f6b70',
  hairline: '#c9c6bd',
  run: '#44535a',
  accent: '#0f6b63',
  danger: '#b3261e',
  caution: '#9a5b00',
} as const

export const severityColour: Readonly<Record<Severity, string>> = {
  danger: palette.danger,
  fault: palette.danger,
  caution: palette.caution,
  note: palette.soft,
}
