import { textExtent } from '#shared/paper/extent.ts'
import { ink, pt_mm, type Page, type PageBox, type PageCode, type PageMark, type PageText } from '#shared/paper/page.ts'
import { codePath } from '#shared/paper/pageSvg.ts'
import { fontRuns } from './paperFonts.ts'

type Pdf = PDFKit.PDFDocument

/** Draws the marks of a page where they say, in millimetres; text in tags, everything else as decoration. */
export function drawPage(pdf: Pdf, page: Page, root: PDFKit.PDFStructureElement): void {
  const chapter = pdf.struct('Sect', { title: page.title })
  root.add(chapter)
  const bookmark = pdf.outline.addItem(page.title)
  pdf.save().scale(72 / 25.4)
  drawMarks(pdf, page.marks, chapter, bookmark)
  pdf.restore()
  chapter.end()
}

function drawMarks(
  pdf: Pdf,
  marks: readonly PageMark[],
  chapter: PDFKit.PDFStructureElement,
  bookmark: PDFKit.PDFOutline,
): void {
  for (let i = 0; i < marks.length;) {
    const mark = marks[i]
    if (mark?.kind === 'text') {
      const row = rowFrom(marks, i)
      const contents = row.map((one) => {
        const content = pdf.markStructureContent('Span')
        drawText(pdf, one)
        pdf.endMarkedContent()
        return content
      })
      chapter.add(pdf.struct(mark.isHeading ? 'H2' : 'P', {}, contents))
      if (mark.isHeading) bookmark.addItem(mark.text)
      i += row.length
    } else if (mark?.kind === 'window') {
      pdf.save().rect(mark.x, mark.y, mark.width, mark.height).clip()
      drawMarks(pdf, mark.marks, chapter, bookmark)
      pdf.restore()
      i++
    } else {
      pdf.markContent('Artifact', { type: 'Layout' })
      for (; i < marks.length && isShape(marks[i]); i++) drawShape(pdf, marks[i]!)
      pdf.endMarkedContent()
    }
  }
}

const isShape = (mark: PageMark | undefined): boolean =>
  mark !== undefined && mark.kind !== 'text' && mark.kind !== 'window'

/** Text that stands in one line, as the cells of a table's row do, is read as one paragraph. */
function rowFrom(marks: readonly PageMark[], from: number): PageText[] {
  const row: PageText[] = []
  for (let i = from; i < marks.length; i++) {
    const mark = marks[i]
    const [first] = row
    if (mark?.kind !== 'text' || (first && Math.abs(mark.y - first.y) > 0.05)) break
    row.push(mark)
  }
  return row
}

function drawText(pdf: Pdf, mark: PageText): void {
  const { x, y, text, size_pt, weight = 400, anchor = 'start', turn = 0, colour = ink, halo } = mark
  const size = size_pt * pt_mm
  if (halo) {
    const { left, top, right, bottom } = textExtent({ ...mark, turn: 0 })
    pdf.rect(left - 0.2, top, right - left + 0.4, bottom - top).fill(halo.colour)
  }
  const runs = fontRuns(text, weight).map((run) => {
    pdf.font(run.file, size)
    return { ...run, width: pdf.widthOfString(run.text) }
  })
  const width = runs.reduce((sum, run) => sum + run.width, 0)
  if (turn !== 0) pdf.save().rotate(turn, { origin: [x, y] })
  let at = anchor === 'end' ? x - width : anchor === 'middle' ? x - width / 2 : x
  for (const run of runs) {
    pdf.font(run.file, size).fillColor(colour).text(run.text, at, y, { lineBreak: false, baseline: 'alphabetic' })
    at += run.width
  }
  if (turn !== 0) pdf.restore()
}

function drawShape(pdf: Pdf, mark: PageMark): void {
  switch (mark.kind) {
    case 'line':
      pdf.moveTo(mark.x1, mark.y1).lineTo(mark.x2, mark.y2)
      return paint(pdf, { stroke: mark.colour ?? ink, stroke_mm: mark.width_mm, dash: mark.dash })
    case 'box':
      outline(pdf, mark)
      return paint(pdf, mark)
    case 'path':
      pdf.path(mark.d)
      return paint(pdf, mark)
    case 'code':
      return drawCode(pdf, mark)
  }
}

function outline(pdf: Pdf, { x, y, width, height, radius = 0 }: PageBox): void {
  if (radius > 0) pdf.roundedRect(x, y, width, height, radius)
  else pdf.rect(x, y, width, height)
}

interface Paint {
  fill?: string | undefined
  stroke?: string | undefined
  stroke_mm?: number | undefined
  dash?: string | undefined
  round?: boolean | undefined
}

function paint(pdf: Pdf, { fill, stroke, stroke_mm = 0.2, dash, round }: Paint): void {
  if (stroke !== undefined) {
    pdf.lineWidth(stroke_mm).lineCap(round ? 'round' : 'butt')
    const [length = 0, space = length] = (dash ?? '').split(/[ ,]+/).map(Number)
    if (length > 0 && space > 0) pdf.dash(length, { space })
    else pdf.undash()
  }
  if (fill !== undefined && stroke !== undefined) pdf.fillAndStroke(fill, stroke)
  else if (fill !== undefined) pdf.fill(fill)
  else if (stroke !== undefined) pdf.stroke(stroke)
  else pdf.rect(0, 0, 0, 0).fill('#ffffff')
}

function drawCode(pdf: Pdf, { x, y, size, modules }: PageCode): void {
  pdf
    .save()
    .translate(x, y)
    .scale(size / Math.max(1, modules.length))
  pdf.path(codePath(modules)).fill(ink)
  pdf.restore()
}
