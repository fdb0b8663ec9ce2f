import type { Weight } from './text/notoSans.ts'

/*
 * A printed page as data, in millimetres from its upper left corner: what screen, print and PDF draw alike. Layouts make
 * pages; `pageSvg.ts` draws them.
 */

/** One line of text with its baseline at `y`. Already cut to its place: nothing is measured when it is drawn. */
export interface PageText {
  kind: 'text'
  x: number
  y: number
  text: string
  size_pt: number
  weight?: Weight
  anchor?: 'start' | 'middle' | 'end'
  colour?: string
  /** Clockwise degrees about (x, y). */
  turn?: number
  /** Outline behind the letters, where text stands over runs. */
  halo?: { colour: string; width_mm: number }
  /** Heads a section: an entry in the table of contents of a PDF. */
  isHeading?: boolean
}

export interface PageLine {
  kind: 'line'
  x1: number
  y1: number
  x2: number
  y2: number
  width_mm: number
  colour?: string
  /** Stroke and gap in millimetres, as "1 1". */
  dash?: string
}

export interface PageBox {
  kind: 'box'
  x: number
  y: number
  width: number
  height: number
  fill?: string
  stroke?: string
  stroke_mm?: number
  radius?: number
  /** Stroke and gap in millimetres, as "1 1". */
  dash?: string
}

/** Any other shape: path data in the words of SVG, in millimetres. */
export interface PagePath {
  kind: 'path'
  d: string
  fill?: string
  stroke?: string
  stroke_mm?: number
  dash?: string
  round?: boolean
}

/** A window: nothing of its marks shows outside. */
export interface PageWindow {
  kind: 'window'
  x: number
  y: number
  width: number
  height: number
  marks: readonly PageMark[]
}

/** A code to scan: dark modules as rows of booleans, drawn `size` millimetres wide. */
export interface PageCode {
  kind: 'code'
  x: number
  y: number
  size: number
  modules: readonly (readonly boolean[])[]
}

export type PageMark = PageText | PageLine | PageBox | PagePath | PageCode | PageWindow

export interface Page {
  width_mm: number
  height_mm: number
  /** Words for whoever cannot see the page, and its entry in the table of contents of a PDF. */
  title: string
  marks: readonly PageMark[]
}

/** What is printed: pages in order. */
export interface PaperDocument {
  title: string
  /** As an IETF tag, "en". */
  language: string
  pages: readonly Page[]
}

/** One point (1/72 inch) in millimetres. */
export const pt_mm = 25.4 / 72

/** Ink on paper. */
export const ink = '#000000'
