import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { pt_mm, type PageMark } from '#shared/paper/page.ts'
import { labelForms } from '#shared/paper/labels/forms.ts'
import { printLabels, type PrintOptions } from '#shared/paper/labels/labelPages.ts'
import { cellCorner, cellsOf, labelSheets, labelSheetSchema, sheetProblems } from '#shared/paper/labels/sheet.ts'
import { labelsOf } from '#shared/paper/labels/spareLabels.ts'
import { least_pt, readable_pt } from '#shared/paper/labels/textBlock.ts'
import { textWidth } from '#shared/paper/text/textWidth.ts'
import { tenDrives } from '../../layout/sampleBuilds.ts'

const labels = labelsOf(tenDrives())
const sheetOf = (id: string) => labelSheets.find((sheet) => sheet.id === id)!
const options = (more: Partial<PrintOptions> = {}): PrintOptions => ({
  sheet: sheetOf('a4-21'),
  form: 'wrap',
  diameter_mm: 6.5,
  start: 0,
  offsetX_mm: 0,
  offsetY_mm: 0,
  edges: false,
  ...more,
})

/** The rectangle that a mark covers. */
function extent(mark: PageMark): [left: number, top: number, right: number, bottom: number] {
  if (mark.kind === 'line') return [mark.x1, mark.y1, mark.x2, mark.y2]
  if (mark.kind !== 'text') throw new Error('only text and lines stand on a label')
  const width = textWidth(mark.text, mark.size_pt * pt_mm, mark.weight ?? 400)
  const [up, down] = [0.75 * mark.size_pt * pt_mm, 0.25 * mark.size_pt * pt_mm]
  if (mark.turn === 90) return [mark.x - down, mark.y, mark.x + up, mark.y + width]
  if (mark.turn === 180) return [mark.x - width, mark.y - down, mark.x, mark.y + up]
  return [mark.x, mark.y - up, mark.x + width, mark.y + down]
}

describe('sheets', () => {
  it.each(labelSheets.map((sheet) => [sheet.name, sheet] as const))('%s closes on its page', (_, sheet) => {
    expect(sheetProblems(sheet)).toEqual([])
    const last = cellCorner(sheet, cellsOf(sheet) - 1)
    // Left and top margin come back on the right and at the bottom: the tables of makers are symmetrical.
    expect(last.x + sheet.labelWidth_mm + sheet.left_mm).toBeCloseTo(sheet.pageWidth_mm, 0)
    expect(last.y + sheet.labelHeight_mm + sheet.top_mm).toBeCloseTo(sheet.pageHeight_mm, 0)
  })

  it('refuses own sizes that run over the page or into each other', () => {
    const { source: _, ...own } = sheetOf('a4-21')
    expect(labelSheetSchema.safeParse(own).success).toBe(true)
    expect(sheetProblems({ ...own, columns: 4 })).toEqual([expect.stringContaining('last column ends 58.7 mm')])
    expect(sheetProblems({ ...own, pitchY_mm: 38 })).toEqual([expect.stringContaining('Rows overlap')])
    expect(sheetProblems({ ...own, clearTail_mm: 38.1 })).toEqual([expect.stringContaining('clear tail')])
  })
})

describe('labels on a sheet', () => {
  const cases = labelSheets.flatMap((sheet) => labelForms.map((form) => [sheet.id, form] as const))
  it.each(cases)('%s, %s: nothing leaves its cell', (id, form) => {
    const sheet = sheetOf(id)
    const print = printLabels(labels, options({ sheet, form, start: 3 }), 'Labels')
    expect(print.places.map(({ label }) => label)).toEqual(labels.map((label) => label.id))
    expect(print.places[0]).toEqual({ label: labels[0]?.id, sheet: 0, cell: 3 })
    const used = new Set(print.places.map(({ sheet: on, cell }) => `${on}/${cell}`))
    print.document.pages.forEach((page, on) => {
      for (const mark of page.marks) {
        const [left, top, right, bottom] = extent(mark)
        const column = Math.floor((left - sheet.left_mm + 0.01) / sheet.pitchX_mm)
        const row = Math.floor((top - sheet.top_mm + 0.01) / sheet.pitchY_mm)
        const corner = cellCorner(sheet, row * sheet.columns + column)
        expect(used.has(`${on}/${row * sheet.columns + column}`)).toBe(true)
        expect(right).toBeLessThanOrEqual(corner.x + sheet.labelWidth_mm + 0.01)
        expect(bottom).toBeLessThanOrEqual(corner.y + sheet.labelHeight_mm + 0.01)
      }
    })
  })

  it.each(['wrap', 'flag'] as const)("reads at arm's length on a usual sheet, as %s, without a warning", (form) => {
    const print = printLabels(labels, options({ form }), 'Labels')
    expect(print.warnings).toEqual([])
    const texts = print.document.pages.flatMap(({ marks }) => marks.filter((mark) => mark.kind === 'text'))
    expect(Math.min(...texts.map((mark) => (mark.kind === 'text' ? mark.size_pt : 0)))).toBeGreaterThanOrEqual(
      readable_pt,
    )
  })

  it('says what came out small, cut or too short to go round, and sets nothing below the limit', () => {
    const print = printLabels(labels, options({ sheet: sheetOf('a4-189') }), 'Labels')
    expect(new Set(print.warnings.map(({ kind }) => kind)).size).toBeGreaterThan(1)
    for (const page of print.document.pages)
      for (const mark of page.marks) if (mark.kind === 'text') expect(mark.size_pt).toBeGreaterThanOrEqual(least_pt)
  })

  it('repeats the words round the cable, clear of the overlap', () => {
    const leg = labels.filter(({ id }) => id === 'W8#leg-2')
    const { marks } = printLabels(leg, options(), 'Labels').document.pages[0]!
    const copies = marks.filter((mark) => mark.kind === 'text' && mark.text === 'here: C2, bay 2')
    expect(copies).toHaveLength(2)
    const covered = cellCorner(sheetOf('a4-21'), 0).y + 38.1 - Math.PI * 6.5
    for (const mark of marks) if (mark.kind === 'text') expect(extent(mark)[1]).toBeGreaterThanOrEqual(covered - 0.01)
  })

  it('leaves the width of the cable free in the middle of a flag', () => {
    const { marks } = printLabels(labels.slice(0, 1), options({ form: 'flag' }), 'Labels').document.pages[0]!
    const middle = cellCorner(sheetOf('a4-21'), 0).x + 63.5 / 2
    const half = (Math.PI * 6.5) / 2
    const texts = marks.filter((mark) => mark.kind === 'text')
    expect(texts.length % 2).toBe(0)
    for (const mark of texts) {
      const [left, , right] = extent(mark)
      expect(right < middle - half || left > middle + half).toBe(true)
    }
  })

  it('prints in front of a clear tail and wraps the tail over it', () => {
    const sheet = { ...sheetOf('a4-14'), clearTail_mm: 25 }
    const print = printLabels(labels.slice(0, 1), options({ sheet }), 'Labels')
    expect(print.warnings.filter(({ kind }) => kind === 'open')).toEqual([])
    for (const mark of print.document.pages[0]!.marks)
      if (mark.kind === 'text') expect(extent(mark)[3]).toBeLessThanOrEqual(sheet.top_mm + 38.1 - 25)
  })

  it('moves everything by what the printer is off, and begins where the sheet is free', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 20 }), fc.double({ min: -3, max: 3, noNaN: true }), (start, offset) => {
        const still = printLabels(labels, options({ start }), 'Labels').document.pages
        const moved = printLabels(labels, options({ start, offsetX_mm: offset }), 'Labels').document.pages
        expect(moved).toHaveLength(Math.ceil((start + labels.length) / 21))
        const [a, b] = [still[0]!.marks[0]!, moved[0]!.marks[0]!]
        expect(extent(b)[0] - extent(a)[0]).toBeCloseTo(offset, 9)
      }),
      { numRuns: 20 },
    )
  })
})
