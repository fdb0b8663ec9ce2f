import type { PaperName } from './content.ts'

/** Width and height in millimetres: ISO 216, and the inch size of ANSI/ASME Y14.1. */
export const paperSides_mm: Readonly<Record<PaperName, readonly [number, number]>> = {
  a4: [210, 297],
  a5: [148, 210],
  letter: [215.9, 279.4],
}

export const paperWords: Readonly<Record<PaperName, string>> = { a4: 'A4', a5: 'A5', letter: 'Letter' }

/** Nothing is printed smaller: it is read at arm's length, by torchlight. */
export const smallest_pt = 7

/** How closely a sheet is set. */
export interface Density {
  /** Tables and paragraphs. */
  body_pt: number
  line_mm: number
  /** Space above and below the lines of a table row, together. */
  row_mm: number
  /** Between sections. */
  gap_mm: number
  title_pt: number
  bay_pt: number
}

/** From roomy to close; a sheet takes the first that needs no more pages than the closest. */
export const densities: readonly Density[] = [
  { body_pt: 8.5, line_mm: 3.7, row_mm: 1.5, gap_mm: 5, title_pt: 10.5, bay_pt: 11 },
  { body_pt: 8, line_mm: 3.4, row_mm: 1.1, gap_mm: 4, title_pt: 10, bay_pt: 10 },
  { body_pt: 7.5, line_mm: 3.15, row_mm: 0.7, gap_mm: 3, title_pt: 9, bay_pt: 9.5 },
  { body_pt: 7, line_mm: 2.9, row_mm: 0.5, gap_mm: 2.4, title_pt: 8.5, bay_pt: 9 },
]

/** Inks of a sheet. */
export interface Inks {
  ink: string
  soft: string
  hairline: string
  accent: string
  danger: string
  caution: string
  wash: string
}

export const blackInks: Inks = {
  ink: '#000000',
  soft: '#3d3d3d',
  hairline: '#9a9a9a',
  accent: '#000000',
  danger: '#000000',
  caution: '#000000',
  wash: '#ffffff',
}

export const colourInks: Inks = {
  ink: '#1f2a30',
  soft: '#4a555a',
  hairline: '#a9a69d',
  accent: '#0f6b63',
  danger: '#b3261e',
  caution: '#9a5b00',
  wash: '#e3efed',
}

/** All that the sections of a sheet need to know of its look. */
export interface Look {
  density: Density
  inks: Inks
}
