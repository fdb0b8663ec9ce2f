import { useEventListener } from '@vueuse/core'
import type { PaperDocument } from '#shared/paper/page.ts'
import { pageSvg } from '#shared/paper/pageSvg.ts'

/**
 * Prints pages as they are: their own size, no margins, nothing scaled. They stand in the document only while the print
 * window is open, and everything else is left out of it. Gives the way to take them out again.
 */
export function printPages(paper: PaperDocument): () => void {
  const clear = putPages(paper)
  window.addEventListener('afterprint', clear, { once: true })
  window.print()
  return clear
}

/** As `printPages`, where the browser's own command to print is given while `paper` has pages to show. */
export function usePrintCommand(paper: () => PaperDocument | null): void {
  let clear: (() => void) | undefined
  useEventListener(window, 'beforeprint', () => {
    const printed = paper()
    if (printed && !document.querySelector('.print-pages')) clear = putPages(printed)
  })
  useEventListener(window, 'afterprint', () => clear?.())
}

function putPages({ pages, title }: PaperDocument): () => void {
  const [first] = pages
  if (!first) return () => undefined
  const frame = document.createElement('div')
  frame.className = 'print-pages'
  const style = document.createElement('style')
  style.textContent = printStyle(first.width_mm, first.height_mm)
  frame.append(style)
  const parser = new DOMParser()
  for (const page of pages)
    frame.append(document.adoptNode(parser.parseFromString(pageSvg(page), 'image/svg+xml').documentElement))
  const titleBefore = document.title
  const clear = () => {
    frame.remove()
    document.title = titleBefore
  }
  document.title = title
  document.body.append(frame)
  return clear
}

/** The page is as large as the paper and has no margins of its own: a sheet of labels forgives no tenth of a millimetre. */
const printStyle = (width_mm: number, height_mm: number): string => `
@page { size: ${width_mm}mm ${height_mm}mm; margin: 0; }
@media screen { .print-pages { display: none; } }
@media print {
  html, body { height: auto; min-height: 0; margin: 0; background: #fff; }
  body > *:not(.print-pages) { display: none !important; }
  .print-pages > svg { display: block; width: ${width_mm}mm; height: ${height_mm}mm; break-after: page; }
  .print-pages > svg:last-child { break-after: auto; }
}`
