import pdfmake from 'pdfmake'
import type { PaperDocument } from '#shared/paper/page.ts'
import { pageSvg } from '#shared/paper/pageSvg.ts'
import { defaultFamily, fontOf, paperFontFiles, paperFonts } from './paperFonts.ts'

const points = 72 / 25.4

/** Pages drawn on screen as they are, as a PDF: real text, embedded fonts, title, language. */
export async function paperPdf(paper: PaperDocument): Promise<Buffer> {
  pdfmake.setFonts(paperFonts)
  pdfmake.setUrlAccessPolicy(() => false)
  pdfmake.setLocalAccessPolicy((path) => paperFontFiles.has(path))
  const [first] = paper.pages
  const made = pdfmake.createPdf({
    info: { title: paper.title, creator: 'Bayloom', producer: 'Bayloom' },
    language: paper.language,
    displayTitle: true,
    defaultStyle: { font: defaultFamily },
    pageMargins: 0,
    pageSize: { width: (first?.width_mm ?? 210) * points, height: (first?.height_mm ?? 297) * points },
    content: paper.pages.map((page, i) => ({
      svg: pageSvg(page, { fontOf }),
      width: page.width_mm * points,
      height: page.height_mm * points,
      absolutePosition: { x: 0, y: 0 },
      ...(i > 0 && { pageBreak: 'before' as const }),
    })),
  })
  return made.getBuffer()
}
