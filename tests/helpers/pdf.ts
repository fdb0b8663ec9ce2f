import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/* PDFs opened by another program than the one that wrote them: poppler-utils (Debian package). Lengths in millimetres. */

const point_mm = 25.4 / 72

function withPdf<T>(pdf: Buffer, read: (file: string, folder: string) => T): T {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-pdf-'))
  try {
    const file = join(folder, 'paper.pdf')
    writeFileSync(file, pdf)
    return read(file, folder)
  } finally {
    rmSync(folder, { recursive: true })
  }
}

export interface PdfWord {
  text: string
  left: number
  top: number
  right: number
  bottom: number
}

/** Every word with its rectangle, by page. */
export function pdfWords(pdf: Buffer): PdfWord[][] {
  return withPdf(pdf, (file) => {
    const found = execFileSync('pdftotext', ['-bbox', file, '-'], { encoding: 'utf8' })
    return found
      .split('<page ')
      .slice(1)
      .map((page) =>
        [...page.matchAll(/<word xMin="([\d.]+)" yMin="([\d.]+)" xMax="([\d.]+)" yMax="([\d.]+)">([^<]*)</g)].map(
          ([, left, top, right, bottom, text = '']) => ({
            text,
            left: Number(left) * point_mm,
            top: Number(top) * point_mm,
            right: Number(right) * point_mm,
            bottom: Number(bottom) * point_mm,
          }),
        ),
      )
  })
}

export interface PdfBoxes {
  width_mm: number
  height_mm: number
  boxes: { x: number; y: number; width: number; height: number }[]
}

/** The outlined rectangles of the first page, in the order in which they are drawn. */
export function pdfBoxes(pdf: Buffer): PdfBoxes[] {
  return withPdf(pdf, (file, folder) => {
    const drawn = join(folder, 'page.svg')
    execFileSync('pdftocairo', ['-svg', '-noshrink', '-nocenter', '-f', '1', '-l', '1', file, drawn])
    return [boxesOf(readFileSync(drawn, 'utf8'))]
  })
}

function boxesOf(svg: string): PdfBoxes {
  const [, width, height] = /viewBox="0 0 ([\d.]+) ([\d.]+)"/.exec(svg) ?? []
  return {
    width_mm: Number(width) * point_mm,
    height_mm: Number(height) * point_mm,
    boxes: [
      ...svg.matchAll(/<path style="fill:none;[^"]*" d="([^"]+) Z[^"]*"(?: transform="matrix\(([^)]+)\)")?/g),
    ].flatMap(([, d = '', matrix = '1, 0, 0, 1, 0, 0']) => {
      const [a = 1, b = 0, c = 0, e = 1, f = 0, g = 0] = matrix.split(',').map(Number)
      const numbers = (d.match(/-?[\d.]+/g) ?? []).map(Number)
      const xs: number[] = []
      const ys: number[] = []
      for (let i = 0; i + 1 < numbers.length; i += 2) {
        const [x = 0, y = 0] = numbers.slice(i)
        xs.push((a * x + c * y + f) * point_mm)
        ys.push((b * x + e * y + g) * point_mm)
      }
      if (xs.length < 4) return []
      const [left, top] = [Math.min(...xs), Math.min(...ys)]
      return [{ x: left, y: top, width: Math.max(...xs) - left, height: Math.max(...ys) - top }]
    }),
  }
}
