import { pt_mm } from '../page.ts'
import type { Weight } from '../text/notoSans.ts'
import { textWidth, wrapText } from '../text/textWidth.ts'
import type { LabelLine } from './label.ts'

/** Type on paper that an arm's length still reads. */
export const readable_pt = 7
/** Smaller than this nothing is set: what does not fit is cut, and said so. */
export const least_pt = 4.5

const step_pt = 0.25
/** From one baseline to the next, and from the top of a row to its baseline, against the size of the type. */
const rowHeight = 1.2
const baselineAt = 0.92

/** One row as it is set, with its baseline from the top of the block. */
export interface Row {
  text: string
  weight: Weight
  size_pt: number
  baseline: number
}

/** Words set into a rectangle. */
export interface TextBlock {
  /** The smallest type in it. */
  size_pt: number
  rows: readonly Row[]
  width: number
  height: number
  /** True where words had to be left out. */
  isCut: boolean
}

/** Sets lines as large as they go into a rectangle of millimetres, at most `most_pt`, breaking them between words. */
export function fitBlock(lines: readonly LabelLine[], width: number, height: number, most_pt: number): TextBlock {
  for (let size = most_pt; size > least_pt; size -= step_pt) {
    const block = setAt(lines, size, width)
    if (block.height <= height && block.width <= width && !block.isCut) return block
  }
  return cut(setAt(lines, least_pt, width), height)
}

function setAt(lines: readonly LabelLine[], size_pt: number, width: number): TextBlock {
  const rows: Row[] = []
  let top = 0
  let widest = 0
  let isCut = false
  for (const { text, weight, scale } of lines) {
    const size = size_pt * scale
    isCut ||= text.split(/\s+/).some((word) => textWidth(word, size * pt_mm, weight) > width)
    for (const row of wrapText(text, width, size * pt_mm, weight)) {
      rows.push({ text: row, weight, size_pt: size, baseline: top + baselineAt * size * pt_mm })
      top += rowHeight * size * pt_mm
      widest = Math.max(widest, textWidth(row, size * pt_mm, weight))
    }
  }
  return { size_pt, rows, width: widest, height: top, isCut }
}

/** Leaves out the rows that run over the rectangle; the first one always stays. */
function cut(block: TextBlock, height: number): TextBlock {
  if (block.height <= height) return block
  const below = (row: Row) => row.baseline + (rowHeight - baselineAt) * row.size_pt * pt_mm
  const rows = block.rows.filter((row, i) => i === 0 || below(row) <= height)
  return { ...block, rows, height: Math.max(0, ...rows.map(below)), isCut: true }
}
