import { pt_mm, type PageMark, type PageText } from './page.ts'
import { textWidth } from './text/textWidth.ts'

/** The upright box that a mark lies in. */
export interface Extent {
  left: number
  top: number
  right: number
  bottom: number
}

/** Where the letters of a line of text are: from the height of capitals with accents to the depth of descenders. */
export function textExtent(mark: PageText): Extent {
  const { x, y, text, size_pt, weight = 400, anchor = 'start', turn = 0 } = mark
  const size = size_pt * pt_mm
  const width = textWidth(text, size, weight)
  const left = anchor === 'end' ? -width : anchor === 'middle' ? -width / 2 : 0
  const radians = (turn * Math.PI) / 180
  const [cos, sin] = [Math.cos(radians), Math.sin(radians)]
  const corners = [left, left + width].flatMap((across) =>
    [-0.77 * size, 0.24 * size].map((down) => [x + across * cos - down * sin, y + across * sin + down * cos] as const),
  )
  return around(corners)
}

const around = (points: readonly (readonly [number, number])[]): Extent => ({
  left: Math.min(...points.map(([x]) => x)),
  top: Math.min(...points.map(([, y]) => y)),
  right: Math.max(...points.map(([x]) => x)),
  bottom: Math.max(...points.map(([, y]) => y)),
})

/** The box around any mark; around a path that of its control points, which holds all of it. */
export function extentOf(mark: PageMark): Extent {
  switch (mark.kind) {
    case 'text':
      return textExtent(mark)
    case 'line':
      return around([
        [mark.x1, mark.y1],
        [mark.x2, mark.y2],
      ])
    case 'path':
      return around(pathPoints(mark.d))
    case 'code':
      return { left: mark.x, top: mark.y, right: mark.x + mark.size, bottom: mark.y + mark.size }
    case 'box':
    case 'window':
      return { left: mark.x, top: mark.y, right: mark.x + mark.width, bottom: mark.y + mark.height }
  }
}

/** Every point that path data names. */
export function pathPoints(d: string): [number, number][] {
  const points: [number, number][] = []
  let [x, y] = [0, 0]
  for (const [, command = '', numbers = ''] of d.matchAll(/([MLHVCQSTZ])([^MLHVCQSTZ]*)/gi)) {
    const values = (numbers.match(/-?\d*\.?\d+(?:e-?\d+)?/gi) ?? []).map(Number)
    const isRelative = command === command.toLowerCase()
    const [fromX, fromY] = isRelative ? [x, y] : [0, 0]
    if (/h/i.test(command)) for (const value of values) points.push([(x = (isRelative ? x : 0) + value), y])
    else if (/v/i.test(command)) for (const value of values) points.push([x, (y = (isRelative ? y : 0) + value)])
    else
      for (let i = 0; i + 1 < values.length; i += 2) {
        const isPair = isRelative && /[ml]/i.test(command)
        x = (isPair ? x : fromX) + (values[i] ?? 0)
        y = (isPair ? y : fromY) + (values[i + 1] ?? 0)
        points.push([x, y])
      }
  }
  return points
}

export const touches = (a: Extent, b: Extent): boolean =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
