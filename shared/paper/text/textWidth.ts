import { advances, marks, type Weight } from './notoSans.ts'

/** A character that the shipped font lacks is drawn by another font: taken as wide as the type is high. */
const unknownAdvance = 1000

function advanceOf(code: number, weight: Weight): number {
  const table = advances[weight]
  const index =
    code >= 32 && code < 127 ? code - 32 : code >= 160 && code < 256 ? code - 65 : markIndex(String.fromCodePoint(code))
  return table[index] ?? unknownAdvance
}

const markIndex = (character: string): number => {
  const index = marks.indexOf(character)
  return index < 0 ? -1 : 191 + index
}

/** Width of a line of text in Noto Sans, in the unit of `size`. Without kerning, so never less than it will be. */
export function textWidth(text: string, size: number, weight: Weight = 400): number {
  let thousandths = 0
  for (const character of text) thousandths += advanceOf(character.codePointAt(0) ?? 0, weight)
  return (thousandths * size) / 1000
}

/** The text itself where it fits the width, else its beginning and an ellipsis. */
export function fitText(text: string, width: number, size: number, weight: Weight = 400): string {
  if (textWidth(text, size, weight) <= width) return text
  const ellipsis = '…'
  let room = width - textWidth(ellipsis, size, weight)
  let kept = ''
  for (const character of text) {
    room -= textWidth(character, size, weight)
    if (room < 0) break
    kept += character
  }
  return kept.trimEnd() + ellipsis
}

/** Breaks text at spaces into lines that fit the width, at most `most`; the last one ends in an ellipsis where cut. */
export function wrapText(text: string, width: number, size: number, weight: Weight = 400, most = Infinity): string[] {
  const lines: string[] = []
  let line = ''
  for (const word of text.split(/\s+/).filter(Boolean)) {
    const longer = line === '' ? word : `${line} ${word}`
    if (line === '' || textWidth(longer, size, weight) <= width) line = longer
    else {
      lines.push(line)
      line = word
    }
  }
  if (line !== '') lines.push(line)
  if (lines.length <= most) return lines.map((one) => fitText(one, width, size, weight))
  const kept = lines.slice(0, most - 1)
  return [...kept, lines.slice(most - 1).join(' ')].map((one) => fitText(one, width, size, weight))
}
