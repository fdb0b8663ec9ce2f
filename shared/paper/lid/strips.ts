import type { PageLine, PageMark, PageText } from '../page.ts'
import { pt_mm } from '../page.ts'
import type { Weight } from '../text/notoSans.ts'
import { fitText, textWidth } from '../text/textWidth.ts'
import type { Look } from './style.ts'

/** A piece of a sheet that is never cut: a row of a table, a row of bays, a paragraph. */
export interface Strip {
  height: number
  draw(x: number, y: number): PageMark[]
}

/** Strips under one title. What heads its columns stands again on every page that it goes on to. */
export interface Section {
  title: string
  head?: Strip
  strips: readonly Strip[]
  /** Moves to the next page whole, where it fits on one. */
  isWhole?: boolean
}

/** Sections are made for the width that they get. */
export type SectionMaker = (width: number) => Section[]

interface Style {
  weight?: Weight
  anchor?: 'start' | 'middle' | 'end'
  colour?: string
  /** Cut with an ellipsis beyond this. */
  width?: number
}

/** One line of text; nothing where there is none. */
export function line(x: number, y: number, words: string, size_pt: number, style: Style = {}): PageText[] {
  const { weight = 400, anchor = 'start', colour, width } = style
  const text = width === undefined ? words : fitText(words, width, size_pt * pt_mm, weight)
  if (text === '') return []
  return [{ kind: 'text', x, y, text, size_pt, weight, anchor, ...(colour !== undefined && { colour }) }]
}

export const widthOf = (words: string, size_pt: number, weight: Weight = 400): number =>
  textWidth(words, size_pt * pt_mm, weight)

export const rule = (x: number, y: number, width: number, width_mm: number, colour: string): PageLine => ({
  kind: 'line',
  x1: x,
  y1: y,
  x2: x + width,
  y2: y,
  width_mm,
  colour,
})

/** Where the letters of a line stand in it, from its top: a little above the foot. */
export const baseline = (line_mm: number, size_pt: number): number => line_mm / 2 + size_pt * pt_mm * 0.36

/** A word longer than the line, in pieces that fit. */
function pieces(word: string, width: number, size_pt: number, weight: Weight): string[] {
  if (widthOf(word, size_pt, weight) <= width) return [word]
  const all: string[] = []
  let piece = ''
  for (const character of word) {
    if (piece !== '' && widthOf(piece + character, size_pt, weight) > width) {
      all.push(piece)
      piece = ''
    }
    piece += character
  }
  return [...all, piece]
}

/** Breaks words into lines of a width; nothing is left out. */
export function wrapAll(words: string, width: number, size_pt: number, weight: Weight = 400): string[] {
  const lines: string[] = []
  let current = ''
  for (const word of words.split(/[^\S\u00a0]+/).filter(Boolean))
    for (const piece of pieces(word, width, size_pt, weight)) {
      const longer = current === '' ? piece : `${current} ${piece}`
      if (current === '' || widthOf(longer, size_pt, weight) <= width) current = longer
      else {
        lines.push(current)
        current = piece
      }
    }
  if (current !== '') lines.push(current)
  return lines
}

/** A paragraph with something in front of its first line: a number, a severity. */
export function paragraph(
  look: Look,
  width: number,
  words: string,
  lead: { words: string; width: number; weight?: Weight } = { words: '', width: 0 },
  style: { weight?: Weight; colour?: string; after_mm?: number } = {},
): Strip {
  const { body_pt, line_mm } = look.density
  const { weight = 400, colour = look.inks.ink, after_mm = 0.6 } = style
  const lines = wrapAll(words, width - lead.width, body_pt, weight)
  return {
    height: Math.max(1, lines.length) * line_mm + after_mm,
    draw: (x, y) => [
      ...line(x, y + baseline(line_mm, body_pt), lead.words, body_pt, { weight: lead.weight ?? 600, colour }),
      ...lines.flatMap((text, i) =>
        line(x + lead.width, y + i * line_mm + baseline(line_mm, body_pt), text, body_pt, { weight, colour }),
      ),
    ],
  }
}
