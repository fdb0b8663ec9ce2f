import { z } from 'zod'

const side_mm = z.number().min(3).max(450)

/** A sheet of labels to peel off: its page and its grid, in millimetres. */
export const labelSheetSchema = z.strictObject({
  id: z.string().min(1).max(40),
  name: z.string().min(1).max(80),
  pageWidth_mm: side_mm,
  pageHeight_mm: side_mm,
  columns: z.int().min(1).max(30),
  rows: z.int().min(1).max(60),
  labelWidth_mm: side_mm,
  labelHeight_mm: side_mm,
  /** From the paper's edge to the first label. */
  left_mm: z.number().min(0).max(200),
  top_mm: z.number().min(0).max(200),
  /** From one label's edge to the same edge of the next. */
  pitchX_mm: z.number().min(3).max(450),
  pitchY_mm: z.number().min(3).max(450),
  /** Labels with a clear tail that laminates the print: how much of the height is tail. */
  clearTail_mm: z.number().min(0).max(400).default(0),
})
export type LabelSheet = z.infer<typeof labelSheetSchema>

/** The measures alone, without what a listed sheet carries besides. */
export const measuresOf = (sheet: LabelSheet): LabelSheet => labelSheetSchema.strip().parse(sheet)

/** A sheet that ships with the product, and where its measures come from. */
export interface KnownSheet extends LabelSheet {
  source: string
}

/** Sums of inches turned into millimetres may miss the paper's edge by this much. */
const slack_mm = 0.5

/** What is wrong with a sheet's measures, in words; empty where it can be printed. */
export function sheetProblems(sheet: LabelSheet): string[] {
  const right = sheet.left_mm + (sheet.columns - 1) * sheet.pitchX_mm + sheet.labelWidth_mm
  const bottom = sheet.top_mm + (sheet.rows - 1) * sheet.pitchY_mm + sheet.labelHeight_mm
  const over = (value: number) => `${Math.round(value * 10) / 10} mm`
  return [
    ...(right > sheet.pageWidth_mm + slack_mm
      ? [`The last column ends ${over(right - sheet.pageWidth_mm)} beyond the page.`]
      : []),
    ...(bottom > sheet.pageHeight_mm + slack_mm
      ? [`The last row ends ${over(bottom - sheet.pageHeight_mm)} beyond the page.`]
      : []),
    ...(sheet.columns > 1 && sheet.pitchX_mm < sheet.labelWidth_mm
      ? ['Columns overlap: the pitch is less than the width of a label.']
      : []),
    ...(sheet.rows > 1 && sheet.pitchY_mm < sheet.labelHeight_mm
      ? ['Rows overlap: the pitch is less than the height of a label.']
      : []),
    ...(sheet.clearTail_mm >= sheet.labelHeight_mm ? ['The clear tail leaves nothing to print on.'] : []),
  ]
}

const a4 = { pageWidth_mm: 210, pageHeight_mm: 297, clearTail_mm: 0 }
const letter = { pageWidth_mm: 215.9, pageHeight_mm: 279.4, clearTail_mm: 0 }

/** A grid whose gaps are given: pitch is label and gap. */
function grid(
  page: typeof a4,
  id: string,
  name: string,
  [columns, rows]: readonly [number, number],
  [width, height]: readonly [number, number],
  [left, top]: readonly [number, number],
  [gapX, gapY]: readonly [number, number],
  source: string,
): KnownSheet {
  return {
    ...page,
    id,
    name,
    columns,
    rows,
    labelWidth_mm: width,
    labelHeight_mm: height,
    left_mm: left,
    top_mm: top,
    pitchX_mm: width + gapX,
    pitchY_mm: height + gapY,
    source,
  }
}

const fromMemory = 'common grid, from memory: measure your sheet'

/** Usual sheets. Makers differ by tenths: the name says the grid, the measures stand beside it to be held against the sheet. */
export const labelSheets: readonly KnownSheet[] = [
  grid(
    a4,
    'a4-21',
    'A4, 3 x 7, 63.5 x 38.1 mm',
    [3, 7],
    [63.5, 38.1],
    [7.2, 15.15],
    [2.5, 0],
    'printreadykit.pages.dev/label-templates/address-labels',
  ),
  grid(a4, 'a4-24', 'A4, 3 x 8, 63.5 x 33.9 mm', [3, 8], [63.5, 33.9], [7.2, 12.9], [2.5, 0], fromMemory),
  grid(a4, 'a4-14', 'A4, 2 x 7, 99.1 x 38.1 mm', [2, 7], [99.1, 38.1], [4.65, 15.15], [2.5, 0], fromMemory),
  grid(a4, 'a4-65', 'A4, 5 x 13, 38.1 x 21.2 mm', [5, 13], [38.1, 21.2], [4.75, 10.7], [2.5, 0], fromMemory),
  grid(a4, 'a4-189', 'A4, 7 x 27, 25.4 x 10 mm', [7, 27], [25.4, 10], [8.6, 13.5], [2.5, 0], fromMemory),
  grid(
    letter,
    'letter-30',
    'Letter, 3 x 10, 2 5/8 x 1 in',
    [3, 10],
    [66.675, 25.4],
    [4.7625, 12.7],
    [3.175, 0],
    fromMemory,
  ),
]

/** Cells of one sheet. */
export const cellsOf = (sheet: LabelSheet): number => sheet.columns * sheet.rows

/** Upper left corner of a cell, counted in rows from the first one on the sheet, from 0. */
export function cellCorner(sheet: LabelSheet, cell: number): { x: number; y: number } {
  return {
    x: sheet.left_mm + (cell % sheet.columns) * sheet.pitchX_mm,
    y: sheet.top_mm + Math.floor(cell / sheet.columns) * sheet.pitchY_mm,
  }
}
