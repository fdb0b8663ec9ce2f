import type { PageMark } from './page.ts'

/** How something is put elsewhere: first scaled about the corner, then moved. */
export interface Placing {
  scale: number
  dx: number
  dy: number
}

/** A mark moved on its page. */
export function moved(mark: PageMark, dx: number, dy: number): PageMark {
  switch (mark.kind) {
    case 'line':
      return { ...mark, x1: mark.x1 + dx, y1: mark.y1 + dy, x2: mark.x2 + dx, y2: mark.y2 + dy }
    case 'path':
      return { ...mark, d: placePath(mark.d, { scale: 1, dx, dy }) }
    case 'window':
      return { ...mark, x: mark.x + dx, y: mark.y + dy, marks: mark.marks.map((one) => moved(one, dx, dy)) }
    default:
      return { ...mark, x: mark.x + dx, y: mark.y + dy }
  }
}

const places = (value: number): number => Math.round(value * 1000) / 1000

/** Path data elsewhere. Knows M, L, H, V, C, Q, S, T, Z, absolute and relative, which is what the drawings are made of. */
export function placePath(d: string, { scale, dx, dy }: Placing): string {
  let placed = ''
  for (const [, command = '', numbers = ''] of d.matchAll(/([MLHVCQSTZ])([^MLHVCQSTZ]*)/gi)) {
    const isRelative = command === command.toLowerCase()
    const values = (numbers.match(/-?\d*\.?\d+(?:e-?\d+)?/gi) ?? []).map(Number)
    const put = values.map((value, i) => {
      if (isRelative) return places(value * scale)
      const isAcross = /h/i.test(command) || (!/v/i.test(command) && i % 2 === 0)
      return places(value * scale + (isAcross ? dx : dy))
    })
    placed += `${command}${put.join(' ')}`
  }
  return placed
}
