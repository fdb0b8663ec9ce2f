import pdfmake from 'pdfmake'
import type { PaperDocument } from '#shared/paper/page.ts'
import { drawPage } from './drawPage.ts'
import { defaultFamily, paperFontFiles, paperFonts } from './paperFonts.ts'

const points = 72 / 25.4

/**
 * Pages drawn on screen as they are, as a PDF: real text, embedded fonts, bookmarks, title, language, tags. The library
 * makes the file; every mark is put where the page says, since nothing of it is left to be laid out.
 */
export async function paperPdf(paper: PaperDocument): Promise<Buffer> {
  pdfmake.setFonts(paperFonts)
  pdfmake.setUrlAccessPolicy(() => false)
  pdfmake.setLocalAccessPolicy((path) => paperFontFiles.has(path))
  const [first, ...others] = paper.pages
  const file = await pdfmake
    .createPdf({
      version: '1.7',
      tagged: true,
      info: { title: paper.title, creator: 'Bayloom', producer: 'Bayloom' },
      language: paper.language,
      displayTitle: true,
      defaultStyle: { font: defaultFamily },
      pageMargins: 0,
      pageSize: { width: (first?.width_mm ?? 210) * points, height: (first?.height_mm ?? 297) * points },
      content: [],
    })
    .getStream()

  const chunks: Buffer[] = []
  const whole = new Promise<Buffer>((done, fail) => {
    file.on('data', (chunk: Buffer) => chunks.push(chunk))
    file.on('end', () => done(Buffer.concat(chunks)))
    file.on('error', fail)
  })
  const root = file.struct('Document')
  file.addStructure(root)
  if (first) drawPage(file, first, root)
  for (const page of others) {
    file.addPage({ size: [page.width_mm * points, page.height_mm * points], margin: 0 })
    drawPage(file, page, root)
  }
  root.end()
  file.end()
  return whole
}
