import type { Page, PageMark, PaperDocument } from '../page.ts'
import { flagLabel, plainLabel, wrapLabel, type Cell, type LabelForm, type LabelLayout } from './forms.ts'
import { moved } from '../place.ts'
import type { Label } from './label.ts'
import { cellCorner, cellsOf, type LabelSheet } from './sheet.ts'
import { readable_pt } from './textBlock.ts'

/** How labels are put on a sheet. */
export interface PrintOptions {
  sheet: LabelSheet
  /** For cable ends; trays and bags are always plain. */
  form: LabelForm
  diameter_mm: number
  /** First free label of the first sheet, from 0. */
  start: number
  /** What this printer has to be moved by. */
  offsetX_mm: number
  offsetY_mm: number
  /** Draws the edges of the labels: for a trial on plain paper, held against the sheet. */
  edges: boolean
}

/** Where a label did not come out as it should. */
export interface LabelWarning {
  label: string
  name: string
  kind: 'small' | 'cut' | 'open'
  size_pt: number
}

/** Labels on their sheets. */
export interface LabelPrint {
  document: PaperDocument
  warnings: readonly LabelWarning[]
  /** Where each label is: sheet and cell, both from 0. */
  places: readonly { label: string; sheet: number; cell: number }[]
}

/** Lays labels out on sheets, in order, from the first free one on. */
export function printLabels(labels: readonly Label[], options: PrintOptions, title: string): LabelPrint {
  const { sheet } = options
  const perSheet = cellsOf(sheet)
  const start = Math.min(Math.max(0, options.start), perSheet - 1)
  const laid = labels.map((label) => ({ label, layout: layOut(label, options) }))
  const places = labels.map((label, i) => ({
    label: label.id,
    sheet: Math.floor((start + i) / perSheet),
    cell: (start + i) % perSheet,
  }))
  const count = labels.length === 0 ? 0 : Math.ceil((start + labels.length) / perSheet)
  const pages = Array.from({ length: count }, (_, number): Page => {
    const marks = laid.flatMap(({ layout }, i): PageMark[] => {
      const place = places[i]
      if (place?.sheet !== number) return []
      const corner = cellCorner(sheet, place.cell)
      const [x, y] = [corner.x + options.offsetX_mm, corner.y + options.offsetY_mm]
      return [...(options.edges ? [edge(sheet, x, y)] : []), ...layout.marks.map((mark) => moved(mark, x, y))]
    })
    const of = count === 1 ? '' : `, sheet ${number + 1} of ${count}`
    return { width_mm: sheet.pageWidth_mm, height_mm: sheet.pageHeight_mm, title: `${title}${of}`, marks }
  })
  return {
    document: { title, language: 'en', pages },
    warnings: laid.flatMap(({ label, layout }) => warningsOf(label, layout)),
    places,
  }
}

/** One label on its own, from its upper left corner. */
export function layOut(label: Label, { sheet, form, diameter_mm }: PrintOptions): LabelLayout {
  const cell: Cell = {
    width: sheet.labelWidth_mm,
    height: sheet.labelHeight_mm,
    clearTail_mm: sheet.clearTail_mm,
    diameter_mm,
  }
  const isOnCable = label.group === 'power' || label.group === 'data'
  if (!isOnCable || form === 'plain') return plainLabel(label.lines, cell)
  return form === 'flag' ? flagLabel(label.lines, cell) : wrapLabel(label.lines, cell)
}

function warningsOf({ id, name }: Label, layout: LabelLayout): LabelWarning[] {
  const of = { label: id, name, size_pt: layout.size_pt }
  return [
    ...(layout.closes ? [] : [{ ...of, kind: 'open' as const }]),
    ...(layout.isCut ? [{ ...of, kind: 'cut' as const }] : []),
    ...(!layout.isCut && layout.size_pt < readable_pt ? [{ ...of, kind: 'small' as const }] : []),
  ]
}

const edge = (sheet: LabelSheet, x: number, y: number): PageMark => ({
  kind: 'box',
  x,
  y,
  width: sheet.labelWidth_mm,
  height: sheet.labelHeight_mm,
  stroke: '#000000',
  stroke_mm: 0.1,
})
