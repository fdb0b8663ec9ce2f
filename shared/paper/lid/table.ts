import type { PageMark } from '../page.ts'
import type { Weight } from '../text/notoSans.ts'
import { baseline, line, rule, widthOf, wrapAll, type Strip } from './strips.ts'
import { smallest_pt, type Look } from './style.ts'

export interface Column {
  title: string
  width: number
  weight?: Weight
  size_pt?: number
  isRight?: boolean
}

export interface Cell {
  words: string
  isStrong?: boolean
  /** Drawn over the cell's place instead of words, within `width` and `height`. */
  draw?: (x: number, y: number, width: number, height: number) => PageMark[]
}

const between_mm = 2.5

/** Titles of the columns over a rule. */
export function tableHead(look: Look, columns: readonly Column[]): Strip {
  const size = smallest_pt
  const width = columns.reduce((sum, column) => sum + column.width, 0)
  const lines = columns.map((column) => wrapAll(column.title, column.width - between_mm, size))
  const most = Math.max(1, ...lines.map(({ length }) => length))
  const pitch = 2.9
  const height = most * pitch + 0.9
  return {
    height: height + 0.4,
    draw: (x, y) => [
      ...atColumns(columns, x).flatMap(({ column, left }, i) =>
        (lines[i] ?? []).flatMap((words, at, all) =>
          line(
            edgeOf(column, left),
            y + (most - all.length + at) * pitch + baseline(pitch, size),
            words,
            size,
            style(column, look.inks.soft),
          ),
        ),
      ),
      rule(x, y + height, width, 0.3, look.inks.ink),
    ],
  }
}

/** Rows of a table. One that is taller than a page may be goes on in further strips. */
export function tableRow(look: Look, columns: readonly Column[], cells: readonly Cell[], most_mm = 90): Strip[] {
  const { body_pt, line_mm, row_mm } = look.density
  const set = columns.map((column, i) => {
    const size = column.size_pt ?? body_pt
    const weight = cells[i]?.isStrong ? 700 : (column.weight ?? 400)
    return { size, weight, lines: wrapAll(cells[i]?.words ?? '', column.width - between_mm, size, weight) }
  })
  const lines = Math.max(1, ...set.map((one) => one.lines.length))
  const chunk = Math.max(1, Math.floor(most_mm / line_mm))
  const width = columns.reduce((sum, column) => sum + column.width, 0)
  return Array.from({ length: Math.ceil(lines / chunk) }, (_, part) => {
    const shown = Math.min(chunk, lines - part * chunk)
    const isLast = (part + 1) * chunk >= lines
    const height = shown * line_mm + row_mm
    return {
      height,
      draw: (x, y) => [
        ...atColumns(columns, x).flatMap(({ column, left }, i) => {
          const one = set[i]
          const drawn = part === 0 ? cells[i]?.draw : undefined
          if (drawn) return drawn(left, y + row_mm / 2, column.width - between_mm, line_mm)
          return (one?.lines.slice(part * chunk, part * chunk + shown) ?? []).flatMap((words, at) =>
            line(
              edgeOf(column, left),
              y + row_mm / 2 + at * line_mm + baseline(line_mm, one?.size ?? body_pt),
              words,
              one?.size ?? body_pt,
              { ...style(column, look.inks.ink), weight: one?.weight ?? 400 },
            ),
          )
        }),
        ...(isLast ? [rule(x, y + height, width, 0.12, look.inks.hairline)] : []),
      ],
    }
  })
}

const style = (column: Column, colour: string) =>
  ({ anchor: column.isRight ? ('end' as const) : 'start', colour }) as const

const edgeOf = (column: Column, left: number): number => (column.isRight ? left + column.width - between_mm : left)

function atColumns(columns: readonly Column[], x: number): { column: Column; left: number }[] {
  let left = x
  return columns.map((column) => {
    const at = left
    left += column.width
    return { column, left: at }
  })
}

/** Width that the longest of some words wants as a column. */
export const wish = (words: readonly string[], size_pt: number, weight: Weight = 400): number =>
  Math.max(0, ...words.map((one) => widthOf(one, size_pt, weight))) + between_mm

/** Gives columns what they wish, or less to those that wish most; what is left goes to all that may grow. */
export function shareWidth(wishes: readonly number[], width: number, least = 18): number[] {
  const total = wishes.reduce((sum, one) => sum + one, 0)
  if (total <= width) return wishes.map((one) => one + (width - total) / wishes.length)
  const sorted = wishes.map((one, i) => ({ one, i })).sort((a, b) => a.one - b.one)
  const given = new Array<number>(wishes.length).fill(0)
  let left = width
  sorted.forEach(({ one, i }, at) => {
    const even = left / (sorted.length - at)
    given[i] = Math.max(Math.min(least, even), Math.min(one, even))
    left -= given[i]!
  })
  return given
}
