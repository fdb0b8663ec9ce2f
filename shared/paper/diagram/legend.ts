import { dataWidth, runWidth } from '../../layout/route.ts'
import { severities } from '../../check/severity.ts'
import { group, line, text } from '../svg.ts'
import type { Block } from './block.ts'
import { connectorMark, openEnd, severityTag } from './marks.ts'
import { palette } from './palette.ts'

const pitch = 22

/** How to read the sheet. */
export function legend(): Block {
  const words = (x: number, y: number, content: string) => text(x, y, content, { size: 11.5, fill: palette.ink })
  const rows: ((x: number, y: number) => string)[] = [
    (x, y) =>
      [2, 6, 10]
        .map((amperes, i) => line(x + i * 34, y - 4, x + i * 34 + 28, y - 4, palette.run, runWidth(amperes)))
        .join('') + words(x + 112, y, 'power: 2, 6 and 10 A; width follows current'),
    (x, y) => line(x, y - 4, x + 96, y - 4, palette.soft, dataWidth) + words(x + 112, y, 'data'),
    (x, y) =>
      connectorMark(x + 8, y - 4, 'plug', palette.ink) +
      words(x + 20, y, 'plug') +
      connectorMark(x + 66, y - 4, 'receptacle', palette.ink) +
      words(x + 112, y, 'receptacle; order as on the real part'),
    (x, y) => openEnd(x, y - 4, 'not fed', 'right') + words(x + 112, y, 'open end: nothing joined'),
    (x, y) => words(x, y, 'Amperes are of the 12 V rail unless another is named.'),
    (x, y) => severities.map((severity, i) => severityTag(x + i * 84, y, severity, 11.5)).join(''),
    (x, y) => words(x, y, 'A caution thickens a run, a fault or danger breaks it.'),
  ]
  return {
    width: 372,
    height: 24 + rows.length * pitch,
    draw: (x, y) =>
      group({}, [
        text(x, y + 14, 'Legend', { size: 13, weight: 700, fill: palette.ink }),
        ...rows.map((row, i) => row(x, y + 38 + i * pitch)),
      ]),
  }
}
