import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import jsQrModule from 'jsqr'
import { PNG } from 'pngjs'

/* What a page holds for the eye: drawn by poppler-utils, its code read as a phone reads it. */

// The package is made for both module systems and answers under either name.
const readCode = (jsQrModule as unknown as { default?: typeof jsQrModule }).default ?? jsQrModule

/** The pages of a PDF as pictures. */
export function pdfPictures(pdf: Buffer, dotsPerInch: number, last = 99): PNG[] {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-scan-'))
  try {
    const file = join(folder, 'paper.pdf')
    writeFileSync(file, pdf)
    execFileSync('pdftoppm', ['-r', String(dotsPerInch), '-l', String(last), '-png', file, join(folder, 'page')])
    return readdirSync(folder)
      .filter((name) => name.endsWith('.png'))
      .sort()
      .map((name) => PNG.sync.read(readFileSync(join(folder, name))))
  } finally {
    rmSync(folder, { recursive: true })
  }
}

/** What the code on a picture opens; null where none is found. */
export function codeOn({ data, width, height }: PNG): string | null {
  return readCode(new Uint8ClampedArray(data), width, height)?.data ?? null
}

/** What one of the programs of poppler-utils says about a PDF. */
export function askPoppler(program: 'pdfinfo' | 'pdffonts' | 'pdftotext', pdf: Buffer): string {
  const folder = mkdtempSync(join(tmpdir(), 'bayloom-scan-'))
  try {
    const file = join(folder, 'paper.pdf')
    writeFileSync(file, pdf)
    return execFileSync(program, [file, ...(program === 'pdftotext' ? ['-'] : [])], { encoding: 'utf8' })
  } finally {
    rmSync(folder, { recursive: true })
  }
}

/** Text without any white space: lines may break anywhere. */
export const squeezed = (text: string): string => text.replace(/\s+/g, '')
